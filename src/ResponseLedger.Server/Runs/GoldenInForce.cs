using Microsoft.EntityFrameworkCore;
using ResponseLedger.Server.Http;
using ResponseLedger.Store;

namespace ResponseLedger.Server.Runs;

/// <summary>Keeps a golden run in its place: while others are judged by it, it is neither invalidated nor moved.</summary>
internal static class GoldenInForce
{
    /// <summary>Refuses a change of a run that is the golden run of a condition now.</summary>
    public static async Task RefuseAsync(ResponseLedgerContext db, Guid runId, CancellationToken cancellationToken)
    {
        var condition = await (
            from choice in db.GoldenChoices
            join named in db.Conditions on choice.ConditionId equals named.Id
            where choice.RunId == runId && !db.GoldenChoices.Any(later => later.ConditionId == choice.ConditionId && later.Number > choice.Number)
            select named.Name).FirstOrDefaultAsync(cancellationToken);
        if (condition is not null)
            throw new RefusedException(new RunIsGolden(condition));
    }
}

using Microsoft.AspNetCore.Http.HttpResults;
using Microsoft.EntityFrameworkCore;
using ResponseLedger.Store;
using ResponseLedger.Store.Reevaluation;

namespace ResponseLedger.Server.Masks;

/// <summary>Conditions with stale verdicts.</summary>
/// <param name="Pending">Runs that wait, over all conditions.</param>
/// <param name="Items">One a condition that has any.</param>
/// <param name="Next">Always null: the list is whole.</param>
internal sealed record ReevaluationView(int Pending, IReadOnlyList<ReevaluationItem> Items, string? Next);

/// <summary>A condition with stale verdicts.</summary>
internal sealed record ReevaluationItem(Guid ConditionId, string Condition, Guid DeviceId, int MaskRevision, Guid BasisId, int Pending);

/// <summary>How far re-evaluation has come.</summary>
internal static class ReevaluationReport
{
    public static async Task<Ok<ReevaluationView>> GetAsync(Reevaluator reevaluator, ResponseLedgerContext db, CancellationToken cancellationToken)
    {
        var pending = await reevaluator.PendingAsync(cancellationToken);
        var ids = pending.Select(p => p.Basis.ConditionId).ToList();
        var names = await db.Conditions.Where(c => ids.Contains(c.Id)).ToDictionaryAsync(c => c.Id, c => c.Name, cancellationToken);
        return TypedResults.Ok(new ReevaluationView(
            pending.Sum(p => p.Pending),
            [.. pending.Select(p => new ReevaluationItem(p.Basis.ConditionId, names[p.Basis.ConditionId], p.Basis.DeviceId, p.Basis.MaskRevision, p.Basis.BasisId!.Value, p.Pending))],
            null));
    }
}

using Microsoft.EntityFrameworkCore;
using ResponseLedger.Records.Verdicts;
using ResponseLedger.Store.Acts;
using ResponseLedger.Store.Model;

namespace ResponseLedger.Store.Judging;

/// <summary>What runs of a condition are judged by now.</summary>
/// <param name="BasisId">The basis row.</param>
/// <param name="ConditionId">The condition.</param>
/// <param name="MaskId">The newest released mask.</param>
/// <param name="MaskRevision">Its number.</param>
/// <param name="GoldenReadingId">The reading of the golden run in force, or null.</param>
public sealed record CurrentBasis(Guid BasisId, Guid ConditionId, Guid MaskId, int MaskRevision, Guid? GoldenReadingId);

/// <summary>
/// Finds and makes the basis in force of a condition. It is made (once) by the act that changes what it names: a release, a
/// golden unit, a device's rule, or the start of a server with a newer engine; intake and screens only look it up.
/// </summary>
public static class CurrentBases
{
    /// <summary>The basis in force, or null where the condition has no released mask.</summary>
    public static async Task<CurrentBasis?> FindAsync(ResponseLedgerContext db, Guid conditionId, CancellationToken cancellationToken)
    {
        ArgumentNullException.ThrowIfNull(db);
        return await Query(db, db.Conditions.Where(c => c.Id == conditionId)).SingleOrDefaultAsync(cancellationToken);
    }

    /// <summary>The bases in force of these conditions; those without a released mask are left out. To be composed: one round trip.</summary>
    public static IQueryable<CurrentBasis> Query(ResponseLedgerContext db, IQueryable<Condition> conditions)
    {
        ArgumentNullException.ThrowIfNull(db);
        return
            from condition in conditions
            from mask in db.MaskRevisions.Where(m => m.ConditionId == condition.Id).OrderByDescending(m => m.Number).Take(1)
            let golden = db.GoldenChoices.Where(g => g.ConditionId == condition.Id).OrderByDescending(g => g.Number).Select(g => (Guid?)g.ReadingId).FirstOrDefault()
            let rule = db.DeviceSettings.Where(s => s.DeviceId == condition.DeviceId).OrderByDescending(s => s.Number).Select(s => s.DecisionRule).First()
            from basis in db.Bases.Where(b => b.ConditionId == condition.Id && b.MaskId == mask.MaskId && b.GoldenReadingId == golden
                && b.DecisionRule == rule && b.EngineVersion == Judge.EngineVersion)
            select new CurrentBasis(basis.Id, condition.Id, mask.MaskId, mask.Number, basis.GoldenReadingId);
    }

    /// <summary>Makes the basis row that is in force after what the act has added; null where no mask is released. Saves what the act has added so far.</summary>
    public static async Task<CurrentBasis?> EnsureAsync(Act act, Guid conditionId, CancellationToken cancellationToken)
    {
        ArgumentNullException.ThrowIfNull(act);
        await act.Db.SaveChangesAsync(cancellationToken);
        var found = await FindAsync(act.Db, conditionId, cancellationToken);
        var named = found is null ? await NamedAsync(act.Db, conditionId, cancellationToken) : null;
        if (found is not null || named is null)
            return found;

        await act.Db.Database.ExecuteSqlAsync(
            $"""
             insert into basis (id, condition_id, mask_id, golden_reading_id, decision_rule, engine_version, at)
             values ({act.NewId()}, {conditionId}, {named.MaskId}, {named.GoldenReadingId}, {named.DecisionRule}, {Judge.EngineVersion}, {act.At})
             on conflict do nothing
             """,
            cancellationToken);
        return await FindAsync(act.Db, conditionId, cancellationToken);
    }

    private static async Task<Named?> NamedAsync(ResponseLedgerContext db, Guid conditionId, CancellationToken cancellationToken)
        => await db.MaskRevisions
            .Where(m => m.ConditionId == conditionId)
            .OrderByDescending(m => m.Number)
            .Select(m => new Named(
                m.MaskId,
                m.Number,
                db.GoldenChoices.Where(g => g.ConditionId == conditionId).OrderByDescending(g => g.Number).Select(g => (Guid?)g.ReadingId).FirstOrDefault(),
                db.DeviceSettings.Where(s => s.DeviceId == m.DeviceId).OrderByDescending(s => s.Number).Select(s => s.DecisionRule).First()))
            .FirstOrDefaultAsync(cancellationToken);

    private sealed record Named(Guid MaskId, int MaskRevision, Guid? GoldenReadingId, string DecisionRule);
}

using Microsoft.EntityFrameworkCore;
using ResponseLedger.Store.Queries;

namespace ResponseLedger.Store.Reevaluation;

/// <summary>Whether a lot's verdicts are those of the basis in force: what a decision asks before it rests on them.</summary>
public static class StaleVerdicts
{
    /// <summary>
    /// How many counting runs of an open lot have no verdict on their condition's basis in force. Conditions without a released
    /// mask have no verdicts to be stale; a decided lot keeps what it was signed on, so it counts 0.
    /// </summary>
    public static async Task<int> CountAsync(ResponseLedgerContext db, Guid lotId, CancellationToken cancellationToken)
    {
        ArgumentNullException.ThrowIfNull(db);
        var open = await db.Lots.Where(l => l.Id == lotId && !LotGate.Standing(db).Any(d => d.LotId == lotId))
            .Select(l => (Guid?)l.DeviceId).SingleOrDefaultAsync(cancellationToken);
        if (open is not { } deviceId)
            return 0;

        var inForce = await BasesInForce.OfDeviceAsync(db, deviceId, cancellationToken);
        var judged = inForce.Select(b => b.ConditionId).ToList();
        var basisIds = inForce.Where(b => b.BasisId is not null).Select(b => b.BasisId!.Value).ToList();

        // The counting run of a unit in a condition: of the valid production runs that now belong there, the one received first.
        var valid =
            from assigned in db.RunAssignments
            join run in db.Runs on assigned.RunId equals run.Id
            where assigned.LotId == lotId && run.Purpose == "production" && judged.Contains(assigned.ConditionId)
                && !db.RunAssignments.Any(later => later.RunId == assigned.RunId && later.Number > assigned.Number)
                && !db.RunInvalidations.Any(i => i.RunId == run.Id)
            select new { run.Id, run.ReceivedNo, assigned.UnitId, assigned.ConditionId };
        return await valid
            .Where(run => !valid.Any(other => other.UnitId == run.UnitId && other.ConditionId == run.ConditionId && other.ReceivedNo < run.ReceivedNo))
            .Where(run => !db.Verdicts.Any(v => basisIds.Contains(v.BasisId)
                && v.ReadingId == db.Readings.Where(r => r.RunId == run.Id).OrderByDescending(r => r.Number).Select(r => r.Id).First()
                && db.Bases.Any(b => b.Id == v.BasisId && b.ConditionId == run.ConditionId)))
            .CountAsync(cancellationToken);
    }
}

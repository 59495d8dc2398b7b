using Microsoft.EntityFrameworkCore;
using ResponseLedger.Server.Http;
using ResponseLedger.Store.Acts;
using ResponseLedger.Store.Model;
using ResponseLedger.Store.Queries;
using ResponseLedger.Store.Reevaluation;

namespace ResponseLedger.Server.Runs;

/// <summary>A run and where it belongs, inside an act that changes one of them.</summary>
/// <param name="Run">The run.</param>
/// <param name="Assignment">The assignment in force.</param>
/// <param name="Serial">Serial number of its unit.</param>
/// <param name="IsInvalidated">Whether it was invalidated.</param>
internal sealed record RunPlacement(Run Run, RunAssignment Assignment, string Serial, bool IsInvalidated)
{
    /// <summary>Takes the turn at the run, so that nobody else places or invalidates it meanwhile, and reads where it stands.</summary>
    /// <exception cref="RefusedException">There is no such run.</exception>
    public static async Task<RunPlacement> TakeAsync(Act act, Guid runId, CancellationToken cancellationToken)
    {
        await Turn.TakeAsync(act.Db, runId, cancellationToken);
        return await (
            from run in act.Db.Runs.Where(r => r.Id == runId)
            from assignment in act.Db.RunAssignments.Where(a => a.RunId == run.Id).OrderByDescending(a => a.Number).Take(1)
            join unit in act.Db.Units on assignment.UnitId equals unit.Id
            select new RunPlacement(run, assignment, unit.Serial, act.Db.RunInvalidations.Any(i => i.RunId == run.Id)))
            .AsNoTracking().SingleOrDefaultAsync(cancellationToken)
            ?? throw new RefusedException(new NothingThere("run"));
    }

    /// <summary>Closes the lots, always in the same order, and refuses where one is decided.</summary>
    /// <exception cref="RefusedException">A lot is decided.</exception>
    public static async Task CloseLotsAsync(Act act, IEnumerable<Guid?> lotIds, CancellationToken cancellationToken)
    {
        // Two at most: where the run is and where it goes.
        foreach (var lotId in lotIds.OfType<Guid>().Distinct().Order())
        {
            var gated = await LotGate.CloseAsync(act, lotId, cancellationToken);
            if (gated is { Standing: not null })
                throw new RefusedException(new LotIsDecided(gated.Lot.Number));
        }
    }
}

using System.Security.Claims;
using System.Text.Json.Nodes;
using Microsoft.AspNetCore.Http.HttpResults;
using Microsoft.EntityFrameworkCore;
using ResponseLedger.Server.Http;
using ResponseLedger.Server.People;
using ResponseLedger.Store.Acts;
using ResponseLedger.Store.Intake;
using ResponseLedger.Store.Model;

namespace ResponseLedger.Server.Runs;

/// <summary>
/// POST /api/runs/{id}/invalidation. Everything is kept; what counts after it is derived: the next valid run of the unit in the
/// condition, so many times as the device allows.
/// </summary>
internal static class InvalidateRun
{
    public static async Task<Created<RunView>> HandleAsync(
        Guid id, InvalidationAsked asked, ClaimsPrincipal user, ActRunner acts, RunViews views, CancellationToken cancellationToken)
    {
        await acts.RunAsync(CurrentActor.Of(user), (act, token) => InvalidateAsync(act, id, asked, token), cancellationToken);
        return TypedResults.Created($"/api/runs/{id}", await views.OneAsync(id, cancellationToken));
    }

    private static async Task<bool> InvalidateAsync(Act act, Guid id, InvalidationAsked asked, CancellationToken cancellationToken)
    {
        var placement = await RunPlacement.TakeAsync(act, id, cancellationToken);
        await RunPlacement.CloseLotsAsync(act, [placement.Assignment.LotId], cancellationToken);
        if (placement.IsInvalidated)
            throw new RefusedException(new AlreadyInvalidated());
        if (placement.Run.Purpose == RunPurposes.Production)
            await RefuseUsedUpAsync(act, placement, cancellationToken);

        var (cause, reason) = (asked.Cause!.Trim(), asked.Reason!.Trim());
        act.Db.RunInvalidations.Add(new RunInvalidation { RunId = id, Cause = cause, Reason = reason, At = act.At, ById = act.ById });
        act.Record(
            "run.invalidated",
            new JsonObject
            {
                ["runId"] = id.ToString(),
                ["serial"] = placement.Serial,
                ["lotId"] = placement.Assignment.LotId?.ToString(),
                ["conditionId"] = placement.Assignment.ConditionId.ToString(),
            },
            new JsonObject { ["cause"] = cause, ["reason"] = reason });
        return true;
    }

    // Only the invalidation of the run that counts lets a retest come to count; then all runs before it are invalidated.
    private static async Task RefuseUsedUpAsync(Act act, RunPlacement placement, CancellationToken cancellationToken)
    {
        var (run, place) = (placement.Run, placement.Assignment);
        var earlier =
            from assignment in act.Db.RunAssignments
            join other in act.Db.Runs on assignment.RunId equals other.Id
            where assignment.LotId == place.LotId && assignment.UnitId == place.UnitId && assignment.ConditionId == place.ConditionId
                && other.Purpose == RunPurposes.Production && other.ReceivedNo < run.ReceivedNo
                && !act.Db.RunAssignments.Any(later => later.RunId == assignment.RunId && later.Number > assignment.Number)
            select new { IsInvalidated = act.Db.RunInvalidations.Any(i => i.RunId == other.Id) };
        var counted = await (
            from setting in act.Db.DeviceSettings.Where(s => s.DeviceId == run.DeviceId).OrderByDescending(s => s.Number).Take(1)
            select new { setting.RetestsAllowed, Valid = earlier.Count(e => !e.IsInvalidated), Invalidated = earlier.Count(e => e.IsInvalidated) })
            .SingleAsync(cancellationToken);
        if (counted is { RetestsAllowed: { } allowed, Valid: 0 } && counted.Invalidated >= allowed)
            throw new RefusedException(new RetestsUsedUp(allowed));
    }
}

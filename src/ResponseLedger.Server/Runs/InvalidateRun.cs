using System.Security.Claims;
using System.Text.Json.Nodes;
using Microsoft.AspNetCore.Http.HttpResults;
using ResponseLedger.Server.Http;
using ResponseLedger.Server.People;
using ResponseLedger.Store.Acts;
using ResponseLedger.Store.Model;

namespace ResponseLedger.Server.Runs;

/// <summary>
/// POST /api/runs/{id}/invalidation. Everything is kept; what counts after it is derived: the next valid run of the unit in the
/// condition, so many times as the device allows. A run with an assignable cause can be taken out however often that was
/// (ISO/IEC 17025:2017 7.10).
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
        await GoldenInForce.RefuseAsync(act.Db, id, cancellationToken);

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
}

using System.Security.Claims;
using System.Text.Json.Nodes;
using Microsoft.AspNetCore.Http.HttpResults;
using Microsoft.EntityFrameworkCore;
using ResponseLedger.Server.Devices;
using ResponseLedger.Server.Http;
using ResponseLedger.Server.Masks;
using ResponseLedger.Server.People;
using ResponseLedger.Store;
using ResponseLedger.Store.Acts;
using ResponseLedger.Store.Model;
using ResponseLedger.Store.Queries;

namespace ResponseLedger.Server.SignOff;

/// <summary>Opens a decided lot again. The decision and its record stay; from now on the lot follows the masks in force.</summary>
internal static class ReopenLot
{
    public static async Task<Created<ReopeningView>> HandleAsync(
        Guid id,
        NewReopening request,
        ClaimsPrincipal user,
        ActRunner acts,
        PasswordAsked password,
        ReevaluationAfterChange reevaluation,
        ResponseLedgerContext db,
        CancellationToken cancellationToken)
    {
        var conditions = await db.Conditions.Where(c => db.Lots.Any(l => l.Id == id && l.DeviceId == c.DeviceId)).Select(c => c.Id).ToListAsync(cancellationToken);
        if (conditions.Count == 0)
            throw new RefusedException(new NothingThere("lot"));
        await SignerStanding.RequireAsync(db, user, [Roles.Quality], cancellationToken);
        await password.CheckAsync(user, request.Password, cancellationToken);

        var reopening = await acts.RunAsync(CurrentActor.Of(user), (act, token) => ReopenAsync(act, id, request.Reason!.Trim(), token), cancellationToken);

        // A device has a handful of conditions; what a release passed over while the lot was decided is evaluated now.
        foreach (var condition in conditions)
            await reevaluation.RunAsync(condition, cancellationToken);
        return TypedResults.Created(
            $"/api/lots/{id}", new ReopeningView(reopening.DecisionId, id, reopening.DecisionId, reopening.Reason, reopening.At, reopening.ById, CurrentActor.Of(user).Name));
    }

    private static async Task<Reopening> ReopenAsync(Act act, Guid lotId, string reason, CancellationToken cancellationToken)
    {
        var gated = await LotGate.CloseAsync(act, lotId, cancellationToken) ?? throw new RefusedException(new NothingThere("lot"));
        await SignerStanding.RequireAsync(act, [Roles.Quality], cancellationToken);
        if (gated.Standing is not { } standing)
            throw new RefusedException(new LotOpen(gated.Lot.Number));

        var reopening = new Reopening { DecisionId = standing.Id, LotId = lotId, Reason = reason, At = act.At, ById = act.ById };
        act.Db.Reopenings.Add(reopening);
        act.Record(
            "lot.reopened",
            new JsonObject { ["lotId"] = lotId.ToString("D"), ["number"] = gated.Lot.Number, ["decisionId"] = standing.Id.ToString("D") },
            new JsonObject { ["reason"] = reason, ["decision"] = standing.Kind, ["recordSha256"] = Convert.ToHexStringLower(standing.Sha256) });
        await act.SaveOrRefuseAsync(() => new LotOpen(gated.Lot.Number), cancellationToken);
        return reopening;
    }
}

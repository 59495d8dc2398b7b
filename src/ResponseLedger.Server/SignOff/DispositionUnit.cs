using System.Security.Claims;
using System.Text.Json.Nodes;
using Microsoft.AspNetCore.Http.HttpResults;
using Microsoft.EntityFrameworkCore;
using ResponseLedger.Server.Http;
using ResponseLedger.Server.People;
using ResponseLedger.Store.Acts;
using ResponseLedger.Store.Model;
using ResponseLedger.Store.Queries;

namespace ResponseLedger.Server.SignOff;

/// <summary>Says what becomes of a unit that does not pass.</summary>
internal static class DispositionUnit
{
    public static async Task<Created<NewDispositionView>> HandleAsync(
        Guid id, Guid unitId, NewDisposition request, ClaimsPrincipal user, ActRunner acts, CancellationToken cancellationToken)
    {
        var made = await acts.RunAsync(
            CurrentActor.Of(user), (act, token) => DispositionAsync(act, id, unitId, request.Disposition!, request.Reason!.Trim(), token), cancellationToken);
        return TypedResults.Created(
            $"/api/lots/{id}/units", new NewDispositionView(made.Id, id, unitId, made.Kind, made.Reason, made.Number, made.At, made.ById));
    }

    private static async Task<Disposition> DispositionAsync(
        Act act, Guid lotId, Guid unitId, string kind, string reason, CancellationToken cancellationToken)
    {
        // Alone in the lot: it changes what a decision rests on, and its number is the next one.
        var gated = await LotGate.CloseAsync(act, lotId, cancellationToken) ?? throw new RefusedException(new NothingThere("lot"));
        if (gated.Standing is not null)
            throw new RefusedException(new LotDecided(gated.Lot.Number));

        await SignerStanding.RequireAsync(act, [Roles.Engineer, Roles.Quality], cancellationToken);
        var units = (await LotStanding.ReadAsync(act.Db, lotId, cancellationToken)).Units;
        var unit = units.FirstOrDefault(u => u.UnitId == unitId) ?? throw new RefusedException(new NothingThere("unit of this lot"));
        if (unit.Passes)
            throw new RefusedException(new UnitPasses(unit.Serial));

        var before = await act.Db.Dispositions.AsNoTracking().Where(d => d.LotId == lotId && d.UnitId == unitId)
            .OrderByDescending(d => d.Number).FirstOrDefaultAsync(cancellationToken);
        var made = new Disposition
        {
            Id = act.NewId(),
            LotId = lotId,
            UnitId = unitId,
            Number = (before?.Number ?? 0) + 1,
            Kind = kind,
            Reason = reason,
            At = act.At,
            ById = act.ById,
        };
        act.Db.Dispositions.Add(made);
        act.Record(
            "unit.dispositioned",
            new JsonObject { ["lotId"] = lotId.ToString("D"), ["unitId"] = unitId.ToString("D"), ["serial"] = unit.Serial },
            new JsonObject { ["disposition"] = kind, ["reason"] = reason, ["before"] = before?.Kind });
        return made;
    }
}

using System.Security.Claims;
using System.Text.Json.Nodes;
using Microsoft.AspNetCore.Http.HttpResults;
using Microsoft.EntityFrameworkCore;
using ResponseLedger.Records.Masks;
using ResponseLedger.Server.Devices;
using ResponseLedger.Server.Http;
using ResponseLedger.Server.People;
using ResponseLedger.Store;
using ResponseLedger.Store.Acts;
using ResponseLedger.Store.Model;

namespace ResponseLedger.Server.Lots;

/// <summary>Opens lots.</summary>
internal static class WriteLots
{
    public static async Task<Created<LotView>> CreateAsync(
        NewLot request, ClaimsPrincipal user, ActRunner acts, ResponseLedgerContext db, CancellationToken cancellationToken)
    {
        var deviceId = request.DeviceId!.Value;
        var number = request.Number!.Trim();
        var serials = (request.Serials ?? []).Select(s => s!.Trim()).ToArray();
        var id = await acts.RunAsync(CurrentActor.Of(user), async (act, token) =>
        {
            var known = await act.Db.Devices.Where(d => d.Id == deviceId)
                .Select(d => new { Taken = act.Db.Lots.Any(l => l.DeviceId == deviceId && l.Number == number) })
                .SingleOrDefaultAsync(token)
                ?? throw new RefusedException(new FieldRefused("deviceId", "There is no device under this id."));
            if (known.Taken)
                throw new RefusedException(new LotExists(number));

            var lot = new Lot { Id = act.NewId(), DeviceId = deviceId, Number = number, Size = request.Size!.Value, At = act.At, ById = act.ById };
            act.Db.Lots.Add(lot);
            act.Record(
                "lot.created",
                new JsonObject { ["lotId"] = lot.Id.ToString("D"), ["deviceId"] = deviceId.ToString("D"), ["number"] = number },
                new JsonObject { ["size"] = lot.Size, ["serials"] = new JsonArray([.. serials.Select(s => JsonValue.Create(s))]) });
            await act.SaveOrRefuseAsync(() => new LotExists(number), token);
            if (serials.Length > 0)
                await DeclareAsync(act, lot, serials, token);
            return lot.Id;
        }, cancellationToken);

        // A lot that was opened just now has no verdicts, and so no masks to read them by.
        return TypedResults.Created($"/api/lots/{id}", LotView.Of(await ReadLots.FindAsync(db, id, cancellationToken), new Dictionary<Guid, MaskDocument>()));
    }

    // A serial number that the device knows already keeps its unit; the second statement sees what somebody else added at the same time.
    private static async Task DeclareAsync(Act act, Lot lot, string[] serials, CancellationToken cancellationToken)
    {
        var ids = serials.Select(_ => act.NewId()).ToArray();
        await act.Db.Database.ExecuteSqlAsync(
            $"""
             insert into unit (id, device_id, serial, at)
             select id, {lot.DeviceId}, serial, {act.At} from unnest({ids}, {serials}) as declared (id, serial)
             order by serial collate "C"
             on conflict (device_id, serial) do nothing
             """,
            cancellationToken);
        await act.Db.Database.ExecuteSqlAsync(
            $"""
             insert into lot_unit (lot_id, unit_id, at)
             select {lot.Id}, id, {act.At} from unit where device_id = {lot.DeviceId} and serial = any({serials})
             """,
            cancellationToken);
    }
}

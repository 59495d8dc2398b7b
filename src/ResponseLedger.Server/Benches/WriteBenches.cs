using System.Security.Claims;
using System.Text.Json.Nodes;
using Microsoft.AspNetCore.Http.HttpResults;
using Microsoft.EntityFrameworkCore;
using ResponseLedger.Server.Devices;
using ResponseLedger.Server.Http;
using ResponseLedger.Server.People;
using ResponseLedger.Store;
using ResponseLedger.Store.Acts;
using ResponseLedger.Store.Model;

namespace ResponseLedger.Server.Benches;

/// <summary>Makes and changes benches.</summary>
internal static class WriteBenches
{
    public static async Task<Created<BenchView>> CreateAsync(
        NewBench request, ClaimsPrincipal user, ActRunner acts, ResponseLedgerContext db, CancellationToken cancellationToken)
    {
        var name = request.Name!.Trim();
        var id = await acts.RunAsync(CurrentActor.Of(user), async (act, token) =>
        {
            if (await act.Db.Benches.AnyAsync(b => b.Name == name, token))
                throw new RefusedException(new BenchExists(name));

            var bench = new Bench { Id = act.NewId(), Name = name, At = act.At, ById = act.ById };
            act.Db.Add(bench);
            act.Record("bench.created", new JsonObject { ["benchId"] = bench.Id.ToString("D") }, new JsonObject { ["name"] = name });
            await act.SaveOrRefuseAsync(() => new BenchExists(name), token);
            return bench.Id;
        }, cancellationToken);
        return TypedResults.Created($"/api/benches/{id}", await ReadBenches.ViewAsync(db, id, cancellationToken));
    }

    public static async Task<Ok<BenchView>> ChangeAsync(
        Guid id, BenchChange request, ClaimsPrincipal user, ActRunner acts, ResponseLedgerContext db, CancellationToken cancellationToken)
    {
        if ((request.NoiseFloorDb.IsGiven || request.Remark.IsGiven) && !CurrentActor.Holds(user, Roles.Manager))
            throw new RefusedException(new NotAllowed("An engineer may change a bench's serial pattern; the other settings are a manager's."));

        var view = await ReadBenches.ViewAsync(db, id, cancellationToken);
        var present = await db.BenchSettings.AsNoTracking().Where(s => s.BenchId == id).OrderByDescending(s => s.Number).FirstOrDefaultAsync(cancellationToken);
        var before = Told(present?.SerialPattern, present?.NoiseFloorDb, present?.Remark);
        var pattern = request.SerialPattern.Or(present?.SerialPattern);
        var noiseFloorDb = request.NoiseFloorDb.Or(present?.NoiseFloorDb);
        var remark = request.Remark.Or(present?.Remark);
        var after = Told(pattern, noiseFloorDb, remark);
        if (JsonNode.DeepEquals(before, after))
            return TypedResults.Ok(view);

        await acts.RunAsync(CurrentActor.Of(user), async (act, token) =>
        {
            act.Db.Add(new BenchSetting
            {
                Id = act.NewId(),
                BenchId = id,
                Number = (present?.Number ?? 0) + 1,
                SerialPattern = pattern,
                NoiseFloorDb = noiseFloorDb,
                Remark = remark,
                At = act.At,
                ById = act.ById,
            });
            act.Record(
                "bench.changed",
                new JsonObject { ["benchId"] = id.ToString("D"), ["name"] = view.Name },
                new JsonObject { ["before"] = before.DeepClone(), ["after"] = after.DeepClone() });
            await act.SaveOrRefuseAsync(() => new BenchChanged(), token);
            return true;
        }, cancellationToken);
        return TypedResults.Ok(await ReadBenches.ViewAsync(db, id, cancellationToken));
    }

    private static JsonObject Told(string? serialPattern, double? noiseFloorDb, string? remark) => new()
    {
        ["serialPattern"] = serialPattern,
        ["noiseFloorDb"] = noiseFloorDb,
        ["remark"] = remark,
    };
}

using System.Security.Claims;
using System.Text.Json.Nodes;
using Microsoft.EntityFrameworkCore;
using Npgsql;
using ResponseLedger.Ledger;
using ResponseLedger.Server.Http;
using ResponseLedger.Server.People;
using ResponseLedger.Store;
using ResponseLedger.Store.Acts;
using ResponseLedger.Store.Intake;
using ResponseLedger.Store.Model;

namespace ResponseLedger.Server.Runs.Upload;

/// <summary>The bench that an upload is from.</summary>
/// <param name="Id">The bench.</param>
/// <param name="Name">Its name.</param>
/// <param name="SerialPattern">Its pattern for serial numbers, or null.</param>
/// <param name="NoiseFloorDb">Its noise floor in dB, or null.</param>
/// <param name="IsNew">Whether this upload made it.</param>
internal sealed record UploadBench(Guid Id, string Name, string? SerialPattern, double? NoiseFloorDb, bool IsNew);

/// <summary>Settles the bench: a person's first use of a name makes it; a token has its own, and its first upload says which.</summary>
internal sealed class UploadBenches(ResponseLedgerContext db, ActRunner acts)
{
    public async Task<UploadBench> OfAsync(ClaimsPrincipal user, string? name, IReadOnlyList<FoundBench> found, CancellationToken cancellationToken)
    {
        var named = found.FirstOrDefault(b => b.IsNamed);
        if (CurrentActor.TokenId(user) is { } tokenId)
            return await OfTokenAsync(user, tokenId, name, named, found.FirstOrDefault(b => b.IsBound), cancellationToken);
        if (named is not null)
            return Known(named);
        if (name is null)
            throw new RefusedException(new FieldRefused("bench", "Name the bench that measured: its id or its name. A new name makes the bench."));
        if (Guid.TryParse(name, out _))
            throw new RefusedException(new FieldRefused("bench", $"There is no bench {name}."));
        return await MakeAsync(CurrentActor.Of(user), name, cancellationToken);
    }

    private async Task<UploadBench> OfTokenAsync(
        ClaimsPrincipal user, Guid tokenId, string? name, FoundBench? named, FoundBench? bound, CancellationToken cancellationToken)
    {
        if (bound is not null)
            return name is null || named?.Id == bound.Id ? Known(bound) : throw new RefusedException(new TokenOfAnotherBench(bound.Name));
        if (named is null)
        {
            throw new RefusedException(new FieldRefused(
                "bench", name is null ? "This token is not bound yet: its first upload names its bench." : $"There is no bench {name}; a token does not make one."));
        }

        await BindAsync(CurrentActor.Of(user), tokenId, named, cancellationToken);
        return Known(named);
    }

    private async Task<UploadBench> MakeAsync(Actor actor, string name, CancellationToken cancellationToken)
    {
        try
        {
            return await acts.RunAsync(
                actor,
                (act, _) =>
                {
                    var bench = new Bench { Id = act.NewId(), Name = name, At = act.At, ById = act.ById };
                    act.Db.Benches.Add(bench);
                    act.Record(
                        "bench.created",
                        new JsonObject { ["benchId"] = bench.Id.ToString(), ["bench"] = name },
                        new JsonObject { ["by"] = "upload" });
                    return Task.FromResult(new UploadBench(bench.Id, name, null, null, IsNew: true));
                },
                cancellationToken);
        }
        catch (DbUpdateException exception) when (IsTaken(exception))
        {
            var id = await db.Benches.Where(b => b.Name == name).Select(b => b.Id).SingleAsync(cancellationToken);
            return new UploadBench(id, name, null, null, IsNew: false);
        }
    }

    private async Task BindAsync(Actor actor, Guid tokenId, FoundBench bench, CancellationToken cancellationToken)
    {
        try
        {
            await acts.RunAsync(
                actor,
                (act, _) =>
                {
                    act.Db.TokenBindings.Add(new TokenBinding { TokenId = tokenId, BenchId = bench.Id, At = act.At });
                    act.Record(
                        "token.bound",
                        new JsonObject { ["tokenId"] = tokenId.ToString(), ["token"] = actor.Name },
                        new JsonObject { ["benchId"] = bench.Id.ToString(), ["bench"] = bench.Name });
                    return Task.FromResult(true);
                },
                cancellationToken);
        }
        catch (DbUpdateException exception) when (IsTaken(exception))
        {
            var bound = await (
                from binding in db.TokenBindings
                join other in db.Benches on binding.BenchId equals other.Id
                where binding.TokenId == tokenId
                select new { other.Id, other.Name }).SingleAsync(cancellationToken);
            if (bound.Id != bench.Id)
                throw new RefusedException(new TokenOfAnotherBench(bound.Name));
        }
    }

    private static UploadBench Known(FoundBench bench) => new(bench.Id, bench.Name, bench.SerialPattern, bench.NoiseFloorDb, IsNew: false);

    private static bool IsTaken(DbUpdateException exception)
        => exception.InnerException is PostgresException { SqlState: PostgresErrorCodes.UniqueViolation };
}

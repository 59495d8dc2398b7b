using Microsoft.AspNetCore.Http.HttpResults;
using Microsoft.EntityFrameworkCore;
using ResponseLedger.Server.Http;
using ResponseLedger.Store;

namespace ResponseLedger.Server.Benches;

/// <summary>Looks benches up.</summary>
internal static class ReadBenches
{
    public static async Task<Ok<Page<BenchView>>> ListAsync(ResponseLedgerContext db, string? cursor, int? limit, CancellationToken cancellationToken)
    {
        var count = Paging.Limit(limit);
        var after = Paging.Key<BenchKey>(cursor);
        var found = db.Benches.AsNoTracking();
        if (after is not null)
            found = found.Where(b => string.Compare(b.Name, after.Name) > 0);

        var keys = await found.OrderBy(b => b.Name).Select(b => new { b.Id, b.Name }).Take(count + 1).ToListAsync(cancellationToken);
        var views = await BenchViews.OfAsync(db, [.. keys.Select(k => k.Id)], cancellationToken);
        return TypedResults.Ok(Paging.Cut(keys, count, k => views[k.Id], k => new BenchKey(k.Name)));
    }

    public static async Task<Ok<BenchView>> GetAsync(ResponseLedgerContext db, Guid id, CancellationToken cancellationToken)
        => TypedResults.Ok(await ViewAsync(db, id, cancellationToken));

    /// <summary>The view of one bench.</summary>
    /// <exception cref="RefusedException">There is no such bench.</exception>
    public static async Task<BenchView> ViewAsync(ResponseLedgerContext db, Guid id, CancellationToken cancellationToken)
        => (await BenchViews.OfAsync(db, [id], cancellationToken)).GetValueOrDefault(id)
            ?? throw new RefusedException(new NothingThere("bench"));

    private sealed record BenchKey(string Name);
}

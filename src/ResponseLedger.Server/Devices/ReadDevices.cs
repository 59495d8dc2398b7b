using Microsoft.AspNetCore.Http.HttpResults;
using Microsoft.EntityFrameworkCore;
using ResponseLedger.Server.Http;
using ResponseLedger.Store;

namespace ResponseLedger.Server.Devices;

/// <summary>Looks devices and their conditions up.</summary>
internal static class ReadDevices
{
    private const int LongestSearch = 100;

    public static async Task<Ok<Page<DeviceView>>> ListAsync(
        ResponseLedgerContext db, string? search, string? cursor, int? limit, CancellationToken cancellationToken)
    {
        var count = Paging.Limit(limit);
        var after = Paging.Key<DeviceKey>(cursor);
        var found = db.Devices.AsNoTracking();
        if (!string.IsNullOrWhiteSpace(search))
        {
            if (search.Length > LongestSearch)
                throw new RefusedException(new FieldRefused("search", $"Search for at most {LongestSearch} characters."));
            var pattern = $"%{Literal(search.Trim())}%";
            found = found.Where(d => EF.Functions.ILike(d.PartNumber, pattern, Escape)
                || EF.Functions.ILike(d.Revision, pattern, Escape)
                || EF.Functions.ILike(db.DeviceSettings.Where(s => s.DeviceId == d.Id).OrderByDescending(s => s.Number).First().Title, pattern, Escape));
        }

        if (after is not null)
        {
            found = found.Where(d => EF.Functions.GreaterThan(
                ValueTuple.Create(d.PartNumber, d.Revision), ValueTuple.Create(after.PartNumber, after.Revision)));
        }

        var keys = await found.OrderBy(d => d.PartNumber).ThenBy(d => d.Revision)
            .Select(d => new { d.Id, d.PartNumber, d.Revision }).Take(count + 1).ToListAsync(cancellationToken);
        var views = await DeviceViews.OfAsync(db, [.. keys.Select(k => k.Id)], cancellationToken);
        return TypedResults.Ok(Paging.Cut(keys, count, k => views[k.Id], k => new DeviceKey(k.PartNumber, k.Revision)));
    }

    public static async Task<Ok<DeviceView>> GetAsync(ResponseLedgerContext db, Guid id, CancellationToken cancellationToken)
        => TypedResults.Ok(await ViewAsync(db, id, cancellationToken));

    public static async Task<Ok<Page<DeviceConditionView>>> ConditionsAsync(ResponseLedgerContext db, Guid id, CancellationToken cancellationToken)
    {
        var conditions = await DeviceViews.ConditionsAsync(db, [id], cancellationToken);
        if (!conditions.Contains(id))
            throw new RefusedException(new NothingThere("device"));
        return TypedResults.Ok(new Page<DeviceConditionView>([.. conditions[id]], null));
    }

    /// <summary>The view of one device.</summary>
    /// <exception cref="RefusedException">There is no such device.</exception>
    public static async Task<DeviceView> ViewAsync(ResponseLedgerContext db, Guid id, CancellationToken cancellationToken)
        => (await DeviceViews.OfAsync(db, [id], cancellationToken)).GetValueOrDefault(id)
            ?? throw new RefusedException(new NothingThere("device"));

    private const string Escape = "\\";

    private static string Literal(string text)
        => text.Replace("\\", "\\\\", StringComparison.Ordinal).Replace("%", "\\%", StringComparison.Ordinal).Replace("_", "\\_", StringComparison.Ordinal);

    private sealed record DeviceKey(string PartNumber, string Revision);
}

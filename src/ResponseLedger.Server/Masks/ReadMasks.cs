using Microsoft.AspNetCore.Http.HttpResults;
using Microsoft.EntityFrameworkCore;
using ResponseLedger.Server.Http;
using ResponseLedger.Store;
using ResponseLedger.Store.Model;

namespace ResponseLedger.Server.Masks;

/// <summary>Looks masks up.</summary>
internal static class ReadMasks
{
    public static async Task<Ok<Page<MaskView>>> ListAsync(
        Guid id, ResponseLedgerContext db, string? condition, string? cursor, int? limit, CancellationToken cancellationToken)
    {
        var count = Paging.Limit(limit);
        var after = Paging.Key<MaskKey>(cursor);
        if (!await db.Devices.AnyAsync(d => d.Id == id, cancellationToken))
            throw new RefusedException(new NothingThere("device"));

        var found = MaskViews.Rows(db).Where(m => m.Head.DeviceId == id);
        if (!string.IsNullOrEmpty(condition))
        {
            var wanted = await ConditionAsync(db, id, condition, cancellationToken);
            found = found.Where(m => m.Head.ConditionId == wanted.Id);
        }

        if (after is not null)
            found = found.Where(m => m.Head.Id < after.Id);

        // A mask's id is given in the order of time, and a condition has one draft at a time: newest first is highest id first.
        var rows = await found.OrderByDescending(m => m.Head.Id).Take(count + 1).ToListAsync(cancellationToken);
        return TypedResults.Ok(Paging.Cut(rows, count, MaskViews.Of, m => new MaskKey(m.Head.Id)));
    }

    public static async Task<Ok<MaskView>> GetAsync(Guid id, ResponseLedgerContext db, HttpResponse response, CancellationToken cancellationToken)
        => Shown(await ViewAsync(db, id, cancellationToken), response);

    /// <summary>The view of one mask.</summary>
    /// <exception cref="RefusedException">There is no such mask.</exception>
    public static async Task<MaskView> ViewAsync(ResponseLedgerContext db, Guid id, CancellationToken cancellationToken)
        => await MaskViews.Rows(db).SingleOrDefaultAsync(m => m.Head.Id == id, cancellationToken) is { } row
            ? MaskViews.Of(row)
            : throw new RefusedException(new NothingThere("mask"));

    /// <summary>Answers with a mask and, for a draft, its ETag.</summary>
    public static Ok<MaskView> Shown(MaskView view, HttpResponse response)
    {
        if (view.Etag is not null)
            response.Headers.ETag = view.Etag;
        return TypedResults.Ok(view);
    }

    /// <summary>A condition of a device by name or id.</summary>
    /// <exception cref="RefusedException">The device has no such condition.</exception>
    public static async Task<Condition> ConditionAsync(ResponseLedgerContext db, Guid deviceId, string? nameOrId, CancellationToken cancellationToken)
    {
        var conditions = await db.Conditions.AsNoTracking().Where(c => c.DeviceId == deviceId).OrderBy(c => c.Ordinal).ToListAsync(cancellationToken);
        var wanted = nameOrId?.Trim();
        return (wanted is null
                ? conditions.FirstOrDefault()
                : conditions.FirstOrDefault(c => c.Name == wanted) ?? (Guid.TryParse(wanted, out var id) ? conditions.FirstOrDefault(c => c.Id == id) : null))
            ?? throw new RefusedException(new FieldRefused("condition", $"The device has no such condition; it has {string.Join(", ", conditions.Select(c => $"\"{c.Name}\""))}."));
    }

    private sealed record MaskKey(Guid Id);
}

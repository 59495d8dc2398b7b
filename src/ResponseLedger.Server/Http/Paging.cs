using System.Buffers.Text;
using System.Text.Json;

namespace ResponseLedger.Server.Http;

/// <summary>A page of a list: the items and the cursor of the next page, null on the last one.</summary>
internal sealed record Page<T>(IReadOnlyList<T> Items, string? Next);

/// <summary>What a list is asked for: how many, and after which key.</summary>
internal static class Paging
{
    public const int UsualLimit = 50;
    public const int HighestLimit = 500;

    /// <summary>The number of items to give.</summary>
    /// <exception cref="RefusedException">The limit is outside 1..500.</exception>
    public static int Limit(int? limit) => limit switch
    {
        null => UsualLimit,
        >= 1 and <= HighestLimit => limit.Value,
        _ => throw new RefusedException(new FieldRefused("limit", $"A page holds 1 to {HighestLimit} items.")),
    };

    /// <summary>Reads an opaque cursor; null when none was sent.</summary>
    /// <exception cref="RefusedException">It is not one that this list gave.</exception>
    public static T? Key<T>(string? cursor)
        where T : class
    {
        if (string.IsNullOrEmpty(cursor))
            return null;
        try
        {
            return JsonSerializer.Deserialize<T>(Base64Url.DecodeFromChars(cursor)) ?? throw new JsonException();
        }
        catch (Exception exception) when (exception is FormatException or JsonException)
        {
            throw new RefusedException(new FieldRefused("cursor", "This cursor was not given by this list. Leave it out to begin at the first page."));
        }
    }

    /// <summary>Cuts a list of up to limit + 1 rows to a page and makes the cursor of the next one out of the last row kept.</summary>
    public static Page<TItem> Cut<TRow, TItem>(IReadOnlyList<TRow> rows, int limit, Func<TRow, TItem> show, Func<TRow, object> key)
    {
        var kept = rows.Take(limit).ToList();
        var next = rows.Count > limit ? Base64Url.EncodeToString(JsonSerializer.SerializeToUtf8Bytes(key(kept[^1]))) : null;
        return new Page<TItem>([.. kept.Select(show)], next);
    }
}

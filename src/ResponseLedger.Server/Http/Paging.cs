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

    // A cursor that somebody made up may say anything; one that a list gave has every member, and says it in exactly these bytes.
    private static readonly JsonSerializerOptions Strict = new() { RespectNullableAnnotations = true, RespectRequiredConstructorParameters = true };

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
            var bytes = Base64Url.DecodeFromChars(cursor);
            var key = JsonSerializer.Deserialize<T>(bytes, Strict) ?? throw new JsonException();
            return Write(key).AsSpan().SequenceEqual(bytes) && !HoldsZero(bytes) ? key : throw new JsonException();
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
        var next = rows.Count > limit ? Base64Url.EncodeToString(Write(key(kept[^1]))) : null;
        return new Page<TItem>([.. kept.Select(show)], next);
    }

    private static byte[] Write(object key) => JsonSerializer.SerializeToUtf8Bytes(key, key.GetType(), Strict);

    // The database's text has no zero character.
    private static bool HoldsZero(byte[] json)
    {
        using var document = JsonDocument.Parse(json);
        return document.RootElement.ValueKind == JsonValueKind.Object
            ? document.RootElement.EnumerateObject().Any(member => HoldsZero(member.Value))
            : HoldsZero(document.RootElement);
    }

    private static bool HoldsZero(JsonElement value)
        => value.ValueKind == JsonValueKind.String && value.GetString()!.Contains('\0', StringComparison.Ordinal);
}

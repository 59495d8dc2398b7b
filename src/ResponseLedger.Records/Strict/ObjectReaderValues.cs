using System.Security.Cryptography;
using System.Text.Json;
using ResponseLedger.Ledger;

namespace ResponseLedger.Records.Strict;

/// <summary>Reads values that JSON writes as text: words, ids, times and hashes. Wrong ones are told; the value is then null.</summary>
internal static class ObjectReaderValues
{
    public static T? Word<T>(this ObjectReader reader, string name, IReadOnlyDictionary<string, T> words)
        where T : struct
    {
        if (reader.Text(name, ObjectReader.LongestName) is not { } word)
            return null;
        if (words.TryGetValue(word, out var value))
            return value;
        reader.Add(name, $"Expected one of {string.Join(", ", words.Keys)}.");
        return null;
    }

    public static T? OptionalWord<T>(this ObjectReader reader, string name, IReadOnlyDictionary<string, T> words)
        where T : struct
        => reader.Has(name) ? reader.Word(name, words) : null;

    public static Guid? Id(this ObjectReader reader, string name)
    {
        if (reader.Text(name, ObjectReader.LongestName) is not { } text)
            return null;
        if (Guid.TryParseExact(text, "D", out var id))
            return id;
        reader.Add(name, "Expected an id such as 01890a5d-ac96-774b-bcce-b302099a8057.");
        return null;
    }

    public static Guid? OptionalId(this ObjectReader reader, string name) => reader.Has(name) ? reader.Id(name) : null;

    public static DateTimeOffset? Time(this ObjectReader reader, string name)
    {
        if (reader.Text(name, ObjectReader.LongestName) is not { } text)
            return null;
        if (Microseconds.TryParse(text, out var at))
            return at;
        reader.Add(name, "Expected a time in UTC with six decimals, such as 2026-03-01T09:30:00.000000Z.");
        return null;
    }

    public static byte[]? Sha256(this ObjectReader reader, string name)
    {
        if (reader.Text(name, ObjectReader.LongestName) is not { } text)
            return null;
        if (Sha256Of(text) is { } hash)
            return hash;
        reader.Add(name, HashExpected);
        return null;
    }

    /// <summary>Reads an item of an array of hashes.</summary>
    public static byte[]? Sha256(JsonElement json, string path, ProblemList problems)
    {
        if (json.ValueKind == JsonValueKind.String && Sha256Of(ObjectReader.TextOf(json)) is { } hash)
            return hash;
        problems.Add(path, HashExpected);
        return null;
    }

    private const string HashExpected = "Expected a SHA-256 as 64 hexadecimal digits in lower case.";

    private static byte[]? Sha256Of(string? text)
        => text is { Length: 2 * SHA256.HashSizeInBytes } && text.All(char.IsAsciiHexDigitLower) ? Convert.FromHexString(text) : null;
}

using System.Globalization;

namespace ResponseLedger.Ledger;

/// <summary>Times as the ledger and signed documents write them: RFC 3339, UTC, six decimals, always <c>Z</c>.</summary>
public static class Microseconds
{
    private const string Pattern = "yyyy-MM-dd'T'HH:mm:ss.ffffff'Z'";

    /// <summary>The same instant in UTC with everything under a microsecond cut off, as the database keeps it.</summary>
    public static DateTimeOffset Cut(DateTimeOffset at)
    {
        var utc = at.ToUniversalTime();
        return utc.AddTicks(-(utc.Ticks % TimeSpan.TicksPerMicrosecond));
    }

    /// <summary>Writes an instant, cut to microseconds, such as <c>2026-03-01T09:30:00.000120Z</c>.</summary>
    public static string Format(DateTimeOffset at) => Cut(at).UtcDateTime.ToString(Pattern, CultureInfo.InvariantCulture);

    /// <summary>Reads exactly what <see cref="Format"/> writes; any other notation of a time is refused.</summary>
    public static bool TryParse(string? text, out DateTimeOffset at)
        => DateTimeOffset.TryParseExact(
            text,
            Pattern,
            CultureInfo.InvariantCulture,
            DateTimeStyles.AssumeUniversal | DateTimeStyles.AdjustToUniversal,
            out at);
}

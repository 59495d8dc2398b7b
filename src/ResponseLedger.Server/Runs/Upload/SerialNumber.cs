using System.Text.RegularExpressions;
using ResponseLedger.Records;

namespace ResponseLedger.Server.Runs.Upload;

/// <summary>Serial numbers: what one may look like, and how one is found in a file's name.</summary>
internal static class SerialNumber
{
    public const string Rule = "A serial number has 1 to 100 characters, none of them a control character or one that changes the direction of writing.";

    private const int Longest = 100;
    private static readonly TimeSpan PatternPatience = TimeSpan.FromMilliseconds(100);

    /// <summary>Whether a text can be a serial number.</summary>
    public static bool IsSound(string serial) => serial.Trim() is { Length: >= 1 and <= Longest } text && TextRules.AgainstName(text) is null;

    /// <summary>
    /// The serial number in a file's name: by the bench's pattern (its group "serial", or the whole match), else the part before
    /// the first underscore, else the name without its extension. Null when there is none: one has a letter or a digit.
    /// </summary>
    public static string? In(string fileName, string? benchPattern)
    {
        if (fileName == PartFileName.Nameless)
            return null;
        var cut = fileName.IndexOf('_', StringComparison.Ordinal);
        var serial = benchPattern is not null ? ByPattern(fileName, benchPattern)
            : cut < 0 ? Path.GetFileNameWithoutExtension(fileName)
            : fileName[..cut];
        return serial is not null && IsSound(serial) && serial.Any(char.IsLetterOrDigit) ? serial.Trim() : null;
    }

    private static string? ByPattern(string fileName, string pattern)
    {
        try
        {
            var match = Regex.Match(fileName, pattern, RegexOptions.CultureInvariant, PatternPatience);
            return !match.Success ? null : match.Groups["serial"] is { Success: true } group ? group.Value : match.Value;
        }
        catch (Exception exception) when (exception is RegexMatchTimeoutException or ArgumentException)
        {
            // A pattern that takes too long or does not parse finds nothing; the refusal names it.
            return null;
        }
    }
}

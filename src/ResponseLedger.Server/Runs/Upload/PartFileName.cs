using System.Text;
using Microsoft.Net.Http.Headers;
using ResponseLedger.Records;

namespace ResponseLedger.Server.Runs.Upload;

/// <summary>The name of a file as it was sent, without folders, control characters and changes of direction, and with whole characters only.</summary>
internal static class PartFileName
{
    private const int Longest = 255;

    /// <summary>Stands for a file that came without a name; no serial number is read from it.</summary>
    public const string Nameless = "file";

    /// <summary>The name of a part; the extended notation (RFC 5987) goes before the plain one.</summary>
    public static string Of(ContentDispositionHeaderValue disposition)
        => Clean(disposition.FileNameStar.HasValue ? disposition.FileNameStar.ToString() : HeaderUtilities.RemoveQuotes(disposition.FileName).ToString());

    /// <summary>The last component of a path of any system, shortened to what a file system takes.</summary>
    public static string Clean(string? sent)
    {
        var name = string.Concat((sent ?? "").Where(c => !char.IsControl(c) && c is not ('\u2028' or '\u2029') && !TextRules.TurnsDirection(c)));
        name = Cut(name[(name.LastIndexOfAny(['/', '\\']) + 1)..].Trim());
        return name is "" or "." or ".." ? Nameless : name;
    }

    // Rune by rune: half of a surrogate pair, cut or sent, has no form in UTF-8.
    private static string Cut(string name)
    {
        var kept = new StringBuilder(Math.Min(name.Length, Longest));
        foreach (var rune in name.EnumerateRunes())
        {
            if (kept.Length + rune.Utf16SequenceLength > Longest)
                break;
            kept.Append(rune);
        }

        return kept.ToString();
    }
}

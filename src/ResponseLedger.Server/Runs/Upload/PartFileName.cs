using Microsoft.Net.Http.Headers;

namespace ResponseLedger.Server.Runs.Upload;

/// <summary>The name of a file as it was sent, without folders and control characters.</summary>
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
        var name = string.Concat((sent ?? "").Where(c => !char.IsControl(c)));
        name = name[(name.LastIndexOfAny(['/', '\\']) + 1)..].Trim();
        if (name.Length > Longest)
            name = name[..Longest];
        return name is "" or "." or ".." ? Nameless : name;
    }
}

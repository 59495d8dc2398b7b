using System.Text.RegularExpressions;

namespace ResponseLedger.Formats.Delimited;

/// <summary>Arithmetic in heads: a square makes a power ratio, any other leaves the column open.</summary>
internal static partial class HeadOperators
{
    /// <summary>Takes the square of "|H|^2" and "|H|²" out of the words.</summary>
    public static string TakeSquare(string words, out bool squared)
    {
        Match square = Square().Match(words);
        squared = square.Success;
        return squared ? words.Remove(square.Index, square.Length) : words;
    }

    /// <summary>"20*log10" and "20 log" as one word, which stands for dB.</summary>
    public static string JoinTwentyLog(string head) => TwentyLog().Replace(head, "20");

    /// <summary>The first sign of arithmetic, such as "x 1000", "*1e3", "+180"; null where there is none.</summary>
    public static string? Unread(string words, List<HeadToken> tokens, Said said)
    {
        if (Sign().Match(words) is { Success: true } sign)
            return sign.Value.Trim();
        foreach (HeadToken token in tokens)
        {
            // A number of two digits and more is arithmetic right behind a minus that follows the quantity, and beside a frequency.
            bool number = token.Word.Length >= 2 && token.Word.All(char.IsAsciiDigit);
            if (number && (said == Said.Frequency || Behind().IsMatch(words[..token.Start])))
                return token.Whole;
        }

        return null;
    }

    [GeneratedRegex(@"(?<=[\p{L}|)])\s*(\^\s*2(?!\d)|\u00B2)")]
    private static partial Regex Square();

    [GeneratedRegex(@"[*\u00D7\u00B7^\u00B2\u00B3]\s*-?\w*|\bx\s+\d+|\+\s*\d+|/\s*\d{2,}|\bx\d+")]
    private static partial Regex Sign();

    [GeneratedRegex(@"(?i)\b20\s*[*\u00D7\u00B7]?\s*(?=lo?g)")]
    private static partial Regex TwentyLog();

    [GeneratedRegex(@"(?i)(phase|phi|\u03C6|\u03D5|angle|winkel|gain|\)|\|)\s*[-\u2212]\s*$")]
    private static partial Regex Behind();
}

using System.Text.RegularExpressions;

namespace ResponseLedger.Formats.Delimited;

/// <summary>Which way round a head names the two channels or writes the quantity.</summary>
internal enum Turn
{
    /// <summary>Output minus input, output over input, or nothing said.</summary>
    None,

    /// <summary>Plainly the other way round: input over output, one over the gain, minus the phase.</summary>
    Opposite,

    /// <summary>The input is named first, but benches mean either by that.</summary>
    Uncertain,
}

/// <summary>Reads the order of the channels around - and /, and a sign or 1/ before the quantity.</summary>
internal static partial class HeadDirection
{
    /// <summary>Reads the direction of a head's words.</summary>
    /// <param name="words">The head without its unit.</param>
    /// <param name="tokens">Its words.</param>
    /// <param name="difference">Whether the channels are parted by a minus.</param>
    public static Turn Of(string words, List<HeadToken> tokens, out bool difference)
    {
        Turn order = Order(words, tokens, out difference);
        bool prefixed = Prefix().IsMatch(words);
        if (tokens.Exists(t => t.Said?.HasFlag(Said.Lag) == true))
            return Turn.Uncertain;
        return !prefixed ? order : order == Turn.None ? Turn.Opposite : Turn.Uncertain;
    }

    private static Turn Order(string words, List<HeadToken> tokens, out bool difference)
    {
        difference = false;
        int first = tokens.FindIndex(t => Channel(t) != Said.None);
        int second = first < 0 ? -1 : tokens.FindIndex(first, t => Channel(t) != Said.None && Channel(t) != Channel(tokens[first]));
        if (second < 0)
            return Numbered(words, tokens, out difference);
        string between = words[tokens[first].End..tokens[second].Start];
        bool arrow = between.Contains('>', StringComparison.Ordinal) || between.Contains('\u2192', StringComparison.Ordinal);
        bool quotient = between.Contains('/', StringComparison.Ordinal) || between.Contains('\u00F7', StringComparison.Ordinal);
        difference = !arrow && !quotient && Minus().IsMatch(between);
        bool Says(string word) => tokens.Skip(first + 1).Take(second - first - 1).Any(t => t.Word == word);
        if (Channel(tokens[first]) == Said.Output)
            return arrow ? Turn.Uncertain : Turn.None;
        if (quotient || Says("over") || Says("minus") || Says("durch"))
            return Turn.Opposite;
        return arrow || Says("to") || Says("zu") || Says("zum") || Says("nach") ? Turn.None : Turn.Uncertain;
    }

    // "Phase 1-2", "Phase A/B", "Phase C1-C2": two names that end in 1 and 2, or a and b.
    private static Turn Numbered(string words, List<HeadToken> tokens, out bool difference)
    {
        difference = false;
        for (int i = 0; i + 1 < tokens.Count; i++)
        {
            (string left, string right) = (tokens[i].Word, tokens[i + 1].Word);
            string between = words[tokens[i].End..tokens[i + 1].Start].Trim();
            if (between is not ("-" or "\u2013" or "\u2212" or "/" or "->" or ">" or "\u2192") || left[..^1] != right[..^1])
                continue;
            bool forward = (left[^1], right[^1]) is ('1', '2') or ('a', 'b');
            bool arrow = between is "->" or ">" or "\u2192";
            if (!forward && (left[^1], right[^1]) is not (('2', '1') or ('b', 'a')))
                continue;
            difference = !arrow && between != "/";
            return forward == arrow ? Turn.None : Turn.Uncertain;
        }

        return Turn.None;
    }

    private static Said Channel(HeadToken token)
        => ((token.Said ?? Said.None) & (Said.Input | Said.Output)) is var side and (Said.Input or Said.Output) ? side : Said.None;

    // A dash with a blank behind it is a bullet of a list.
    [GeneratedRegex(@"^\s*(1\s*/\s*[\p{L}|]|[-\u2212][\p{L}|])|^\s*[-\u2212]\s*20\s*l")]
    private static partial Regex Prefix();

    [GeneratedRegex(@"[-\u2013\u2212]")]
    private static partial Regex Minus();
}

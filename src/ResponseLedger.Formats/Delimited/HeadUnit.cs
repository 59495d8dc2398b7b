namespace ResponseLedger.Formats.Delimited;

/// <summary>A head in parts.</summary>
/// <param name="Words">Its words.</param>
/// <param name="Unit">Its unit, null where it names none that is known.</param>
/// <param name="Unread">What stands where a unit stands and is none that is known; null where nothing does.</param>
internal readonly record struct HeadParts(string Words, UnitText? Unit, string? Unread);

/// <summary>Parts a head into its words and its unit: "Gain [dB]", "Betrag in dB", "f/kHz", "phase_deg", "frequencyHz".</summary>
internal static class HeadUnit
{
    public static HeadParts Part(string head)
    {
        if (UnitText.Parse(WithoutBrackets(head)) is { } whole && whole.Family is not (UnitFamily.Voltage or UnitFamily.Ratio or UnitFamily.PowerRatio))
            return new("", whole, null);
        return Bracketed(head) ?? Trailing(head, ' ') ?? AfterSlash(head) ?? Trailing(head, '_') ?? AfterCapital(head)
            ?? UnknownBracket(head) ?? UnknownQuotient(head) ?? new(head, Buried(head), null);
    }

    /// <summary>The unit of the row of units stands before the head's; two that differ leave both unread.</summary>
    public static HeadParts Part(string head, string unitBelow)
    {
        HeadParts parts = Part(head);
        string text = WithoutBrackets(unitBelow);
        if (text.Length == 0)
            return parts;
        UnitText? below = UnitText.Parse(text);
        bool agrees = below is not null && (parts.Unit is null || parts.Unit.Name == below.Name);
        return agrees ? new(parts.Words, below, null) : new(parts.Words, null, text);
    }

    private static string WithoutBrackets(string text) => text.Trim().Trim('[', ']', '(', ')').Trim();

    private static HeadParts? Bracketed(string head)
    {
        HeadParts? found = null;
        foreach ((int open, int close) in Brackets(head))
        {
            string inside = head[(open + 1)..close].Trim();
            if (UnitText.Parse(inside) is not { } unit)
                continue;
            if (found is null)
                found = new(head[..open] + " " + head[(close + 1)..], unit, null);
            else if (found.Value.Unit is { } first && first.Name != unit.Name)
                return new(found.Value.Words, null, inside);
        }

        return found;
    }

    private static IEnumerable<(int Open, int Close)> Brackets(string head)
    {
        for (int open = 0; open < head.Length; open++)
        {
            int kind = "([{<".IndexOf(head[open], StringComparison.Ordinal);
            if (kind < 0)
                continue;
            int close = head.IndexOf(")]}>"[kind], open + 1);
            if (close < 0)
                yield break;
            yield return (open, close);
        }
    }

    // The last two words ("V rms") before the last one; a comma or "in" before the unit goes with it.
    private static HeadParts? Trailing(string head, char gap)
    {
        string text = head.TrimEnd();
        int last = text.LastIndexOf(gap);
        if (last <= 0)
            return null;
        int before = text.LastIndexOf(gap, last - 1);
        foreach (int cut in (ReadOnlySpan<int>)[before, last])
        {
            // The 1 of "Channel 1" is no unit.
            if (cut <= 0 || text[(cut + 1)..].Trim() is "1" or "-" || UnitText.Parse(text[(cut + 1)..].Trim()) is not { } unit)
                continue;
            string words = text[..cut].TrimEnd(' ', ',', '/', ':', '-', '_', ';');
            if (words.EndsWith(" in", StringComparison.OrdinalIgnoreCase))
                words = words[..^3];
            return new(words, unit, null);
        }

        return null;
    }

    private static HeadParts? AfterSlash(string head)
    {
        for (int slash = head.IndexOf('/', StringComparison.Ordinal); slash > 0; slash = head.IndexOf('/', slash + 1))
        {
            if (UnitText.Parse(head[(slash + 1)..].Trim()) is not { } unit)
                continue;
            // "Input counts/V": what stands right before the slash belongs to the unit.
            return unit.Family is UnitFamily.Voltage or UnitFamily.Ratio && HeadTokens.Of(head[..slash]) is [.., { Said: null } last] && last.End == slash
                ? new(head[..last.Start], null, head[last.Start..].Trim())
                : new(head[..slash], unit, null);
        }

        return null;
    }

    private static HeadParts? AfterCapital(string head)
    {
        for (int i = 1; i < head.Length; i++)
        {
            bool boundary = (char.IsAsciiLetterLower(head[i - 1]) && char.IsAsciiLetterUpper(head[i])) || (head[i - 1] != ' ' && head[i] == 'k');
            if (boundary && UnitText.Parse(head[i..]) is { Family: not (UnitFamily.Ratio or UnitFamily.PowerRatio) } unit)
                return new(head[..i], unit, null);
        }

        return null;
    }

    // "Gain (counts)", but not "Re(H)" and "Phase (CH2-CH1)", whose words are known.
    private static HeadParts? UnknownBracket(string head)
    {
        foreach ((int open, int close) in Brackets(head))
        {
            string inside = head[(open + 1)..close].Trim();
            if (inside.Length > 0 && !IsKnown(inside))
                return new(head[..open] + " " + head[(close + 1)..], null, inside);
        }

        return null;
    }

    // "Gain/counts", but not "Vout/Vin".
    private static HeadParts? UnknownQuotient(string head)
    {
        int slash = head.IndexOf('/', StringComparison.Ordinal);
        return slash > 0 && !string.IsNullOrWhiteSpace(head[(slash + 1)..]) && !IsKnown(head[(slash + 1)..]) ? new(head[..slash], null, head[(slash + 1)..].Trim()) : null;
    }

    private static bool IsKnown(string text)
        => HeadTokens.Of(text) is { Count: > 0 } tokens && tokens.TrueForAll(t => t.Said is not null && t.Whole != "W" && !char.IsAsciiDigit(t.Word[0]));

    // "dB(S21)", "20log|H|", "deg(H)": the unit is one of the words; only unmistakable ones count.
    private static UnitText? Buried(string head)
    {
        foreach (HeadToken token in HeadTokens.Of(head))
        {
            if (HeadVocabulary.IsTwentyLog(token.Word) || token.Word is "db20" or "vdb")
                return UnitText.Parse("dB");
            if (token.Word is "db" or "deg" or "grad" or "hz" or "khz" or "mhz" or "ghz" or "dbv" or "rad")
                return UnitText.Parse(token.Word == "mhz" ? "MHz" : token.Word);
        }

        return null;
    }
}

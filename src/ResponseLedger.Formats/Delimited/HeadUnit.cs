namespace ResponseLedger.Formats.Delimited;

/// <summary>Parts a head into its words and its unit: "Gain [dB]", "Betrag in dB", "f/kHz", "phase_deg", "frequencyHz".</summary>
internal static class HeadUnit
{
    public static (string Words, UnitText? Unit) Part(string head)
    {
        if (UnitText.Parse(head.Trim().Trim('[', ']', '(', ')')) is { } whole && whole.Family is not (UnitFamily.Voltage or UnitFamily.Ratio))
            return ("", whole);
        return Bracketed(head) ?? Trailing(head, ' ') ?? AfterSlash(head) ?? Trailing(head, '_') ?? AfterCapital(head) ?? (head, Buried(head));
    }

    private static (string, UnitText?)? Bracketed(string head)
    {
        for (int open = 0; open < head.Length; open++)
        {
            int kind = "([{<".IndexOf(head[open], StringComparison.Ordinal);
            if (kind < 0)
                continue;
            int close = head.IndexOf(")]}>"[kind], open + 1);
            if (close < 0)
                return null;
            if (UnitText.Parse(head[(open + 1)..close].Trim()) is { } unit)
                return (head[..open] + " " + head[(close + 1)..], unit);
        }

        return null;
    }

    // The last two words ("V rms") before the last one; a comma or "in" before the unit goes with it.
    private static (string, UnitText?)? Trailing(string head, char gap)
    {
        string text = head.TrimEnd();
        int last = text.LastIndexOf(gap);
        if (last <= 0)
            return null;
        int before = text.LastIndexOf(gap, last - 1);
        foreach (int cut in (ReadOnlySpan<int>)[before, last])
        {
            if (cut <= 0 || UnitText.Parse(text[(cut + 1)..].Trim()) is not { } unit)
                continue;
            string words = text[..cut].TrimEnd(' ', ',', '/', ':', '-', '_', ';');
            if (words.EndsWith(" in", StringComparison.OrdinalIgnoreCase))
                words = words[..^3];
            return (words, unit);
        }

        return null;
    }

    private static (string, UnitText?)? AfterSlash(string head)
    {
        for (int slash = head.IndexOf('/', StringComparison.Ordinal); slash > 0; slash = head.IndexOf('/', slash + 1))
        {
            if (UnitText.Parse(head[(slash + 1)..].Trim()) is { } unit)
                return (head[..slash], unit);
        }

        return null;
    }

    private static (string, UnitText?)? AfterCapital(string head)
    {
        for (int i = 1; i < head.Length; i++)
        {
            bool boundary = (char.IsAsciiLetterLower(head[i - 1]) && char.IsAsciiLetterUpper(head[i])) || (head[i - 1] != ' ' && head[i] == 'k');
            if (boundary && UnitText.Parse(head[i..]) is { Family: not UnitFamily.Ratio } unit)
                return (head[..i], unit);
        }

        return null;
    }

    // "dB(S21)", "20log|H|", "deg(H)": the unit is one of the words; only unmistakable ones count.
    private static UnitText? Buried(string head)
    {
        foreach (string word in HeadWords.Split(head))
        {
            if (word.StartsWith("20log", StringComparison.Ordinal) || word == "db20" || word == "vdb")
                return UnitText.Parse("dB");
            if (word is "db" or "deg" or "grad" or "hz" or "khz" or "mhz" or "ghz" or "dbv" or "rad")
                return UnitText.Parse(word == "mhz" ? "MHz" : word);
        }

        return null;
    }
}

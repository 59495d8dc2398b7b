namespace ResponseLedger.Formats.Delimited;

/// <summary>A word of a head: a run of letters and digits.</summary>
/// <param name="Word">In lower case.</param>
/// <param name="Whole">As it stands in the head; for a part of a compound ("GainPhase") the whole of it.</param>
/// <param name="Start">Where it begins.</param>
/// <param name="End">Where it ends.</param>
/// <param name="Said">What it says; null where it is not known.</param>
internal readonly record struct HeadToken(string Word, string Whole, int Start, int End, Said? Said);

/// <summary>Parts a head into words. A compound in capitals holds several: "CH1Amplitude".</summary>
internal static class HeadTokens
{
    public static List<HeadToken> Of(string text)
    {
        var tokens = new List<HeadToken>();
        int start = -1;
        for (int i = 0; i <= text.Length; i++)
        {
            bool inside = i < text.Length && (char.IsLetterOrDigit(text[i]) || text[i] is '\u00B0' or '\u2220');
            if (inside && start < 0)
                start = i;
            if (inside || start < 0)
                continue;
            AddWord(tokens, text, start, i);
            start = -1;
        }

        return Settled(tokens);
    }

    private static void AddWord(List<HeadToken> tokens, string text, int start, int end)
    {
        string whole = text[start..end];
        if (HeadVocabulary.Meaning(whole.ToLowerInvariant()) is { } said)
        {
            tokens.Add(new HeadToken(whole.ToLowerInvariant(), whole, start, end, said));
            return;
        }

        int from = start;
        for (int i = start + 1; i <= end; i++)
        {
            if (i < end && !(char.IsUpper(text[i]) && (char.IsLower(text[i - 1]) || char.IsDigit(text[i - 1]))))
                continue;
            string piece = text[from..i].ToLowerInvariant();
            tokens.Add(new HeadToken(piece, whole, from, i, HeadVocabulary.Meaning(piece)));
            from = i;
        }
    }

    // Words that depend on their neighbours: "Channel 1", "|H(f)|", "Ausgang in Upm".
    private static List<HeadToken> Settled(List<HeadToken> tokens)
    {
        for (int i = 0; i < tokens.Count; i++)
        {
            HeadToken token = tokens[i];
            string next = i + 1 < tokens.Count ? tokens[i + 1].Word : "";
            switch (token.Word)
            {
                case "ch" or "channel" or "chan" or "kanal" or "k" or "trace" when next is "1" or "a" or "2" or "b":
                    tokens[i] = token with { End = tokens[i + 1].End, Said = next is "1" or "a" ? Said.Input : Said.Output };
                    tokens.RemoveAt(i + 1);
                    break;
                case "f" or "w" when tokens.Count > 1:
                    // A capital W is the watt.
                    tokens[i] = token with { Said = token.Whole == "W" ? null : Said.None };
                    break;
                case "in" or "im" when i > 0 && i + 1 < tokens.Count && tokens[i + 1].Said is null:
                    tokens[i] = token with { Said = Said.None };
                    break;
            }
        }

        return tokens;
    }
}

namespace ResponseLedger.Records;

/// <summary>
/// What may stand in a text that is kept, signed and shown. A zero character has no form in the database's text, a line break or
/// a change of direction inside a name makes it look like another one beside a signature.
/// </summary>
public static class TextRules
{
    /// <summary>What is against a name, title, number or e-mail: one line without control characters. Null where nothing is.</summary>
    public static string? AgainstName(string text)
    {
        ArgumentNullException.ThrowIfNull(text);
        if (HoldsControl(text) || text.AsSpan().ContainsAny('\u2028', '\u2029'))
            return "Line breaks, tabs and other control characters cannot stand here.";
        if (text.Any(TurnsDirection))
            return "Characters that change the direction of writing cannot stand here.";
        return AgainstHalves(text);
    }

    /// <summary>What is against a reason or remark, which may have lines and tabs. Null where nothing is.</summary>
    public static string? AgainstProse(string text)
    {
        ArgumentNullException.ThrowIfNull(text);
        return text.Any(c => char.IsControl(c) && c is not ('\n' or '\r' or '\t'))
            ? "Control characters other than line breaks and tabs cannot stand here."
            : AgainstHalves(text);
    }

    /// <summary>Whether a control character stands in a text.</summary>
    public static bool HoldsControl(string text)
    {
        ArgumentNullException.ThrowIfNull(text);
        return text.Any(char.IsControl);
    }

    /// <summary>Whether a character embeds, overrides or isolates a direction of writing (Unicode Standard Annex 9, 2.1 to 2.5).</summary>
    public static bool TurnsDirection(char character) => character is (>= '\u202A' and <= '\u202E') or (>= '\u2066' and <= '\u2069');

    private static string? AgainstHalves(string text)
    {
        for (var i = 0; i < text.Length; i++)
        {
            if (char.IsHighSurrogate(text[i]) && i + 1 < text.Length && char.IsLowSurrogate(text[i + 1]))
                i++;
            else if (char.IsSurrogate(text[i]))
                return "This text holds half of a surrogate pair.";
        }

        return null;
    }
}

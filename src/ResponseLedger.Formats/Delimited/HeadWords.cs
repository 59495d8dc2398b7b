namespace ResponseLedger.Formats.Delimited;

/// <summary>
/// Reads a head. Its quantity comes from its words, its unit from where units stand; a text that stands there and is no known unit, a
/// word that changes what the numbers are, and, where no unit is named, any word that is not known leave the column open.
/// </summary>
internal static class HeadWords
{
    private const int LongestHead = 256;

    private static readonly string[] ConventionWords = ["rms", "eff", "peak", "pk", "pp", "pkpk", "spitze", "ss"];

    /// <summary>Reads a head, with the unit of the row of units where there is one.</summary>
    public static ColumnMeaning Read(string head, string unitBelow)
    {
        if (head.Length > LongestHead)
            return ColumnMeaning.Unknown;
        HeadParts parts = HeadUnit.Part(HeadOperators.JoinTwentyLog(head), unitBelow);
        string words = HeadOperators.TakeSquare(parts.Words, out bool squared);
        List<HeadToken> tokens = HeadTokens.Of(words);
        Said said = words.Count(c => c == '|') >= 2 ? Said.Magnitude : Said.None;
        foreach (HeadToken token in tokens)
            said |= token.Said ?? Said.None;
        if (squared)
            said |= Said.Power;
        UnitText? unit = WithConvention(parts.Unit, tokens, said);
        Turn turn = HeadDirection.Of(words, tokens, out bool difference);
        var rules = new HeadRules(said, unit, turn, difference);
        string? unread = parts.Unread ?? rules.Unexpected(head) ?? Unread(words, tokens, unit, said);
        ColumnMeaning meaning = rules.Decide() with { IsBare = unit is null };
        if (meaning.Alternatives.Count == 0)
            return meaning;
        if (unread is not null)
            return Doubted(meaning, unread, said);
        if (unit?.Asked.Count > 0)
            return Asked(meaning, unit);
        return turn == Turn.Uncertain && meaning.Ask
            ? meaning with { Doubt = "the head names the input first, or a lag, which is written with either sign; say which way round it is" }
            : meaning;
    }

    private static string? Unread(string words, List<HeadToken> tokens, UnitText? unit, Said said)
    {
        foreach (HeadToken token in tokens)
        {
            if (HeadVocabulary.Changes(token.Word, unit, said) || (unit is null && token.Said is null))
                return token.Whole;
        }

        return HeadOperators.Unread(words, tokens, said);
    }

    // "Vin rms", "Vout peak (mV)": how a voltage is counted may stand among the words.
    private static UnitText? WithConvention(UnitText? unit, List<HeadToken> tokens, Said said)
    {
        bool amplitude = (said & (Said.Input | Said.Output)) is Said.Input or Said.Output && (said & (Said.Phase | Said.Gain)) == 0;
        if (!amplitude || !(unit is null || (unit.Family == UnitFamily.Voltage && !unit.Name.Contains(' ', StringComparison.Ordinal))))
            return unit;
        int at = tokens.FindIndex(t => ConventionWords.Contains(t.Word));
        return at < 0 ? unit : UnitText.Parse((unit?.Stated is { Length: > 0 } stated ? stated : unit?.Name ?? "V") + " " + tokens[at].Word);
    }

    private static ColumnMeaning Doubted(ColumnMeaning meaning, string unread, Said said)
    {
        ColumnQuantity quantity = meaning.Alternatives[0].Quantity;
        bool frequency = quantity == ColumnQuantity.Frequency;
        string? hint = frequency ? unread switch { "k" or "K" => "kHz", "M" => "MHz", "G" => "GHz", "T" => "THz", _ => null } : null;
        IReadOnlyList<(ColumnQuantity, string)> alternatives = hint is not null ? [(quantity, hint)]
            : meaning.IsBare && unread == "ln" ? [(ColumnQuantity.GainDb, "Np")]
            : meaning is { IsBare: true, Alternatives: [(ColumnQuantity.Magnitude, _)] } && !said.HasFlag(Said.Power) ? [(ColumnQuantity.GainDb, "dB"), (quantity, "ratio")]
            : meaning.Alternatives;
        return meaning with
        {
            Alternatives = alternatives,
            Ask = true,
            MustNotBeOffered = hint is null && (frequency || quantity is ColumnQuantity.InputAmplitude or ColumnQuantity.OutputAmplitude),
            Doubt = $"\"{RowTable.Shown(unread)}\" is not understood; units of the {UnitsTaken.Words(quantity)} are {UnitsTaken.Of(quantity)}",
        };
    }

    private static ColumnMeaning Asked(ColumnMeaning meaning, UnitText unit) => meaning with
    {
        Alternatives = [.. meaning.Alternatives.SelectMany(a => a.Unit == unit.Name ? unit.Asked.Select(u => (a.Quantity, u)) : [a])],
        Ask = true,
        Doubt = unit.Asked.Count > 1
            ? $"\"{RowTable.Shown(unit.Stated)}\" may stand for {string.Join(" or ", unit.Asked)}"
            : $"\"{RowTable.Shown(unit.Stated)}\" is relative to something that the head does not name; say {unit.Asked[0]} where the gain itself is meant",
    };
}

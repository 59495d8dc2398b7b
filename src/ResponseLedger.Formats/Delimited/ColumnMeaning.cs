namespace ResponseLedger.Formats.Delimited;

/// <summary>What a column may be: one alternative and not <paramref name="Ask"/> is settled, anything else is asked.</summary>
internal sealed record ColumnMeaning(IReadOnlyList<(ColumnQuantity Quantity, string Unit)> Alternatives, bool Ask)
{
    public static readonly ColumnMeaning Unknown = new([], false);

    /// <summary>Why it is asked, as a clause of a sentence; null where the alternatives alone tell.</summary>
    public string? Doubt { get; init; }

    /// <summary>Whether an alternative would take a text that is not understood for a plain unit, and must therefore come from a person.</summary>
    public bool MustNotBeOffered { get; init; }

    /// <summary>Whether the head names no unit, so that the house settles it.</summary>
    public bool IsBare { get; init; }

    /// <summary>Whether the values must confirm the sign: many write the loss of an attenuation as a negative number.</summary>
    public bool SignIsChecked { get; init; }

    public bool IsSettled => Alternatives.Count == 1 && !Ask;

    public static ColumnMeaning Settled(ColumnQuantity quantity, string unit) => new([(quantity, unit)], false);

    public static ColumnMeaning Open(params (ColumnQuantity, string)[] alternatives) => new(alternatives, true);
}

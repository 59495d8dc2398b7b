using ResponseLedger.Engine.Masks;

namespace ResponseLedger.Records.Masks;

/// <summary>The words of a curve limit.</summary>
internal static class MaskWords
{
    public static Dictionary<string, CurveQuantity> Quantities { get; } = new(StringComparer.Ordinal)
    {
        ["gainDb"] = CurveQuantity.GainDb,
        ["phaseDeg"] = CurveQuantity.PhaseDeg,
        ["delaySeconds"] = CurveQuantity.DelaySeconds,
    };

    public static Dictionary<string, LimitSide> Sides { get; } = new(StringComparer.Ordinal)
    {
        ["upper"] = LimitSide.Upper,
        ["lower"] = LimitSide.Lower,
    };

    public static Dictionary<string, LimitBasis> Bases { get; } = new(StringComparer.Ordinal)
    {
        ["absolute"] = LimitBasis.Absolute,
        ["reference"] = LimitBasis.Reference,
        ["golden"] = LimitBasis.Golden,
    };

    /// <summary>The word for a value.</summary>
    /// <exception cref="InvalidOperationException">The value is not of the enumeration.</exception>
    public static string Of<T>(Dictionary<string, T> words, T value)
        where T : struct, Enum
        => words.First(w => EqualityComparer<T>.Default.Equals(w.Value, value)).Key;
}

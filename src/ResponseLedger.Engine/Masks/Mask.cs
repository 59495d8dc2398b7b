using ResponseLedger.Engine.Measures;

namespace ResponseLedger.Engine.Masks;

/// <summary>An acceptance mask: curve limits and scalar requirements, in the order in which verdicts list them (limits first).</summary>
public sealed record Mask(IReadOnlyList<CurveLimit> Limits, IReadOnlyList<Requirement> Requirements);

/// <summary>The curve that a limit bounds.</summary>
public enum CurveQuantity
{
    /// <summary>Level in dB.</summary>
    GainDb = 1,

    /// <summary>Unwrapped phase in degrees.</summary>
    PhaseDeg = 2,

    /// <summary>Group delay in seconds.</summary>
    DelaySeconds = 3,
}

/// <summary>On which side of the limit the curve must stay.</summary>
public enum LimitSide
{
    /// <summary>The curve must not rise above.</summary>
    Upper = 1,

    /// <summary>The curve must not fall below.</summary>
    Lower = 2,
}

/// <summary>What the values of a limit are counted from.</summary>
public enum LimitBasis
{
    /// <summary>The values stand for themselves.</summary>
    Absolute = 1,

    /// <summary>Relative to a reference level of the same run.</summary>
    Reference = 2,

    /// <summary>Relative to the golden run.</summary>
    Golden = 3,
}

/// <summary>A corner of a limit. Between corners the limit runs straight against log f; an equal pair of frequencies is a step, at which the stricter value holds.</summary>
/// <param name="FrequencyHz">In Hz, positive.</param>
/// <param name="Value">In dB, degrees or seconds.</param>
public readonly record struct LimitCorner(double FrequencyHz, double Value);

/// <summary>One curve limit.</summary>
/// <param name="Name">Unique within the mask.</param>
/// <param name="Quantity">The curve it bounds.</param>
/// <param name="Side">Upper or lower.</param>
/// <param name="Basis">What its values are counted from.</param>
/// <param name="Reference">The reference level, for <see cref="LimitBasis.Reference"/>.</param>
/// <param name="MinPointsPerDecade">Where stated, a larger gap between points is inconclusive.</param>
/// <param name="EndRatio">Where stated (1 or more), an end point of the run within this frequency ratio stands for the limit's end.</param>
/// <param name="Scale">What one unit of severity is, in the margin's unit; 1 unless stated.</param>
/// <param name="Corners">Ascending in frequency, 2 or more.</param>
public sealed record CurveLimit(
    string Name,
    CurveQuantity Quantity,
    LimitSide Side,
    LimitBasis Basis,
    ReferenceLevel? Reference,
    double? MinPointsPerDecade,
    double? EndRatio,
    double? Scale,
    IReadOnlyList<LimitCorner> Corners);

/// <summary>One scalar requirement: an output of a measure within bounds.</summary>
/// <param name="Name">Unique within the mask.</param>
/// <param name="Call">The measure and its parameters.</param>
/// <param name="Output">The output that is bounded.</param>
/// <param name="Min">Least accepted value, in the output's unit; null for none.</param>
/// <param name="Max">Greatest accepted value; null for none.</param>
/// <param name="Scale">What one unit of severity is, in the margin's unit; 1 unless stated.</param>
/// <param name="AcceptNoCrossover">For loop margins: whether a sweep without any crossover meets the requirement.</param>
public sealed record Requirement(
    string Name,
    MeasureCall Call,
    string Output,
    double? Min,
    double? Max,
    double? Scale,
    bool AcceptNoCrossover = false);

using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Engine.Masks;

/// <summary>
/// The least margin of a curve to a limit over the span that both cover. Both are straight against log f between their points, so
/// the margin is too, and its least lies at a point of the curve or at a corner of the limit; both are met in one pass.
/// At a step both corners are met, so the stricter holds.
/// </summary>
internal ref struct MarginSearch
{
    private readonly Curve curve;
    private readonly IReadOnlyList<LimitCorner> corners;
    private readonly bool isUpper;
    private readonly bool isLevel;
    private readonly double shift;

    /// <param name="curve">The curve; non-finite values are absent, or for levels a gain of exactly zero.</param>
    /// <param name="limit">The limit.</param>
    /// <param name="shift">What is taken from the curve's values before they meet the corners.</param>
    internal MarginSearch(Curve curve, CurveLimit limit, double shift)
    {
        this.curve = curve;
        corners = limit.Corners;
        isUpper = limit.Side == LimitSide.Upper;
        isLevel = limit.Quantity == CurveQuantity.GainDb;
        this.shift = shift;
    }

    /// <summary>The least finite margin; positive infinity where there is none.</summary>
    internal double Least { get; private set; } = double.PositiveInfinity;

    internal double LeastHz { get; private set; } = double.NaN;

    /// <summary>The lowest frequency met at which the gain is exactly zero, or null.</summary>
    internal double? ZeroHz { get; private set; }

    /// <summary>The lowest frequency met at which the curve has no value, or null.</summary>
    internal double? AbsentHz { get; private set; }

    /// <summary>Meets all points and corners between two frequencies that both curve and limit span.</summary>
    internal void Between(double fromHz, double toHz)
    {
        var f = curve.FrequencyHz;
        int point = curve.PieceOf(fromHz);
        if (f[point] < fromHz)
            point++;
        int piece = 0;
        for (; point < f.Length && f[point] <= toHz; point++)
        {
            while (piece < corners.Count - 2 && corners[piece + 1].FrequencyHz < f[point])
                piece++;
            Meet(f[point], curve.Values[point], LimitOnPiece(corners, piece, f[point]));
        }

        int curvePiece = 0;
        foreach (var corner in corners)
        {
            if (corner.FrequencyHz < fromHz || corner.FrequencyHz > toHz)
                continue;
            while (curvePiece < f.Length - 2 && f[curvePiece + 1] <= corner.FrequencyHz)
                curvePiece++;
            Meet(corner.FrequencyHz, LevelOrValue(curvePiece, corner.FrequencyHz), corner.Value);
        }
    }

    /// <summary>Lets an end point of the curve stand for the part of the limit beyond it.</summary>
    internal void StandIn(double endHz, double endValue, double fromHz, double toHz)
    {
        foreach (var corner in corners)
        {
            if (corner.FrequencyHz >= fromHz && corner.FrequencyHz <= toHz && corner.FrequencyHz != endHz)
                Meet(corner.FrequencyHz, endValue, corner.Value);
        }
    }

    /// <summary>The limit's value on its piece between corners <paramref name="piece"/> and the next.</summary>
    internal static double LimitOnPiece(IReadOnlyList<LimitCorner> corners, int piece, double frequencyHz)
    {
        var (a, b) = (corners[piece], corners[piece + 1]);
        if (a.Value == b.Value)
            return a.Value;
        return LogAxis.Lerp(a.Value, b.Value, LogAxis.Fraction(a.FrequencyHz, b.FrequencyHz, frequencyHz));
    }

    private readonly double LevelOrValue(int piece, double frequencyHz)
    {
        double value = curve.OnPiece(piece, frequencyHz);
        bool besideZero = isLevel && double.IsNaN(value) && !double.IsNaN(curve.Values[piece]) && !double.IsNaN(curve.Values[piece + 1]);
        return besideZero ? double.NegativeInfinity : value;
    }

    private void Meet(double frequencyHz, double value, double limit)
    {
        if (double.IsNaN(value))
        {
            AbsentHz = Lower(AbsentHz, frequencyHz);
            return;
        }

        if (double.IsNegativeInfinity(value))
        {
            ZeroHz = Lower(ZeroHz, frequencyHz);
            return;
        }

        double margin = isUpper ? limit - (value - shift) : value - shift - limit;
        if (margin < Least || margin == Least && frequencyHz < LeastHz)
        {
            Least = margin;
            LeastHz = frequencyHz;
        }
    }

    private static double Lower(double? known, double frequencyHz) => known is { } k && k < frequencyHz ? k : frequencyHz;
}

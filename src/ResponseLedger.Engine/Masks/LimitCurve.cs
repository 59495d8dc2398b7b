using ResponseLedger.Engine.Measures;
using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Engine.Masks;

/// <summary>The values of a limit along its curve, straight against log f between corners; for drawing and for whole turns.</summary>
public static class LimitCurve
{
    /// <summary>The limit at a frequency in its own terms; the stricter value at a step; NaN outside its span.</summary>
    /// <param name="limit">The limit.</param>
    /// <param name="frequencyHz">In Hz.</param>
    public static double ValueAt(CurveLimit limit, double frequencyHz)
    {
        ArgumentNullException.ThrowIfNull(limit);
        var corners = limit.Corners;
        double value = double.NaN;
        for (int i = 0; i + 1 < corners.Count; i++)
        {
            if (frequencyHz < corners[i].FrequencyHz || frequencyHz > corners[i + 1].FrequencyHz)
                continue;
            // A step's second corner ends no piece and starts the next one, so both its values are met.
            double here = corners[i].FrequencyHz == corners[i + 1].FrequencyHz
                ? Stricter(limit.Side, corners[i].Value, corners[i + 1].Value)
                : MarginSearch.LimitOnPiece(corners, i, frequencyHz);
            value = double.IsNaN(value) ? here : Stricter(limit.Side, value, here);
        }

        return value;
    }

    /// <summary>
    /// The limit in absolute terms of a run at given frequencies: with its reference level, or the golden run's curve, added.
    /// NaN (absent) outside the limit's span and where what it is relative to has no value.
    /// </summary>
    /// <param name="limit">A limit without problems.</param>
    /// <param name="run">The run whose reference level counts, for <see cref="LimitBasis.Reference"/>; else it may be null.</param>
    /// <param name="golden">The golden run, for <see cref="LimitBasis.Golden"/>; else it may be null.</param>
    /// <param name="frequencyHz">In Hz.</param>
    public static double[] Resolve(CurveLimit limit, Sweep? run, Sweep? golden, ReadOnlySpan<double> frequencyHz)
    {
        ArgumentNullException.ThrowIfNull(limit);
        double reference = limit.Basis != LimitBasis.Reference ? 0
            : run is null ? double.NaN
            : ReferenceLevels.Resolve(run, limit.Reference!).GainDb ?? double.NaN;
        var values = new double[frequencyHz.Length];
        for (int i = 0; i < values.Length; i++)
        {
            double? under = limit.Basis != LimitBasis.Golden ? reference : limit.Quantity switch
            {
                CurveQuantity.GainDb => golden?.GainDbAt(frequencyHz[i]),
                CurveQuantity.PhaseDeg => golden?.PhaseDegAt(frequencyHz[i]),
                _ => golden?.DelaySecondsAt(frequencyHz[i]),
            };
            values[i] = ValueAt(limit, frequencyHz[i]) + (under ?? double.NaN);
        }

        return values;
    }

    internal static double Stricter(LimitSide side, double a, double b) => side == LimitSide.Upper ? Math.Min(a, b) : Math.Max(a, b);
}

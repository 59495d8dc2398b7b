using ResponseLedger.Engine.Masks;
using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Server.Lots;

/// <summary>One curve of an overlay on its own grid: a quantity of a run, or of its ratio to the golden run. Values may be NaN (absent) or negative infinity.</summary>
internal sealed class OverlayLine
{
    private readonly Sweep sweep;
    private readonly GoldenRatio? ratio;
    private readonly bool isRatio;
    private readonly CurveQuantity quantity;

    private OverlayLine(Sweep sweep, GoldenRatio? ratio, bool isRatio, CurveQuantity quantity)
    {
        this.sweep = sweep;
        this.ratio = ratio;
        this.isRatio = isRatio;
        this.quantity = quantity;
    }

    /// <summary>What is added to every value: whole turns, in degrees; else 0.</summary>
    public double Offset { get; private init; }

    /// <summary>Frequencies in Hz, ascending; empty where a run and the golden run share no span.</summary>
    public ReadOnlySpan<double> FrequencyHz => isRatio ? ratio is null ? default : ratio.FrequencyHz : sweep.FrequencyHz;

    /// <summary>Values without the offset; empty where the quantity is absent from the whole curve.</summary>
    public ReadOnlySpan<double> Values => quantity switch
    {
        CurveQuantity.GainDb => isRatio ? ratio is null ? default : ratio.DifferenceDb : sweep.GainDb,
        CurveQuantity.PhaseDeg => isRatio ? ratio is null ? default : ratio.DifferenceDeg : sweep.PhaseDeg,
        _ => isRatio ? ratio is null ? default : ratio.DelayDifferenceSeconds : sweep.DelaySeconds,
    };

    /// <summary>A curve as measured; a phase gets the whole turns that bring it nearest to the anchor at their lowest common frequency.</summary>
    public static OverlayLine AsMeasured(Sweep run, CurveQuantity quantity, Sweep? anchor)
        => new(run, null, isRatio: false, quantity) { Offset = quantity == CurveQuantity.PhaseDeg && anchor is not null ? TurnsDeg(run, anchor) : 0 };

    /// <summary>The difference of a run from the golden run.</summary>
    public static OverlayLine MinusGolden(Sweep run, Sweep golden, CurveQuantity quantity)
        => new(run, GoldenRatio.Of(run, golden), isRatio: true, quantity);

    private static double TurnsDeg(Sweep run, Sweep anchor)
    {
        var lowestHz = Math.Max(run.FrequencyHz[0], anchor.FrequencyHz[0]);
        return anchor.PhaseDegAt(lowestHz) - run.PhaseDegAt(lowestHz) is { } apart ? 360 * Math.Round(apart / 360) : 0;
    }
}

using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Engine.Measures;

/// <summary>
/// Bandwidth at outerDropDb over bandwidth at innerDropDb, both from one reference level; 1 or more, 1 for a brick wall.
/// Absent where one of the four cutoffs is.
/// </summary>
internal sealed class ShapeFactorMeasure : Measure
{
    internal override MeasureDefinition Definition { get; } =
        new("shapeFactor", [new("outerDropDb", true), new("innerDropDb", true)], true, [new("ratio", "1")]);

    internal override MeasureResult Evaluate(Sweep run, MeasureCall call, DeviceTraits device)
    {
        var inner = CutoffWalk.Both(run, call.Reference!, Parameter(call, "innerDropDb"));
        var outer = CutoffWalk.Both(run, call.Reference!, Parameter(call, "outerDropDb"));
        var reason = inner.Reason ?? BandwidthMeasure.Joined(inner.Lower, inner.Upper) ?? BandwidthMeasure.Joined(outer.Lower, outer.Upper);
        if (reason is not null)
            return Absent(call, reason, inner.Notes);
        double outerHz = outer.Upper.FrequencyHz!.Value - outer.Lower.FrequencyHz!.Value;
        double innerHz = inner.Upper.FrequencyHz!.Value - inner.Lower.FrequencyHz!.Value;
        return Found(call, [outerHz / innerHz], null, inner.Notes);
    }
}

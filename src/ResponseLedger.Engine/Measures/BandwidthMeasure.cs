using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Engine.Measures;

/// <summary>
/// Cutoffs in Hz for a drop of dropDb under the reference level, walking outward (<see cref="CutoffWalk"/>), and from them the
/// bandwidth f2 - f1, the geometric centre sqrt(f1 f2), Q = centre / bandwidth and the fractional bandwidth 1 / Q.
/// A cutoff that the sweep does not reach is absent, and so is all that needs it; the reason names the side.
/// </summary>
internal sealed class BandwidthMeasure : Measure
{
    internal override MeasureDefinition Definition { get; } = new(
        "bandwidth",
        [new("dropDb", true)],
        true,
        [new("lowerHz", "Hz"), new("upperHz", "Hz"), new("bandwidthHz", "Hz"), new("centreHz", "Hz"), new("q", "1"), new("fractional", "1")]);

    internal override MeasureResult Evaluate(Sweep run, MeasureCall call, DeviceTraits device)
    {
        var (lower, upper, reason, notes) = CutoffWalk.Both(run, call.Reference!, Parameter(call, "dropDb"));
        if (reason is not null)
            return Absent(call, reason);
        double lowerHz = lower.FrequencyHz ?? double.NaN;
        double upperHz = upper.FrequencyHz ?? double.NaN;
        double bandwidthHz = upperHz - lowerHz;
        double centreHz = Math.Sqrt(lowerHz) * Math.Sqrt(upperHz);
        return Found(call, [lowerHz, upperHz, bandwidthHz, centreHz, centreHz / bandwidthHz, bandwidthHz / centreHz], Joined(lower, upper), notes);
    }

    /// <summary>One reason for both sides: the code of the first absent one, the sentences of all.</summary>
    internal static Absence? Joined(Cutoff lower, Cutoff upper)
    {
        if (lower.Reason is null || upper.Reason is null)
            return lower.Reason ?? upper.Reason;
        return new Absence(lower.Reason.Code, lower.Reason.Sentence + " " + upper.Reason.Sentence);
    }
}

using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Engine.Measures;

/// <summary>
/// Reference level less the highest level between fromHz and toHz, band edges included, in dB; negative where the band stands
/// above the reference. Absent where band or reference leaves the sweep, where a band edge has no level beside a gain of exactly zero,
/// and where every gain in the band is exactly zero (the attenuation has no bound).
/// </summary>
internal sealed class AttenuationMeasure : Measure
{
    internal override MeasureDefinition Definition { get; } =
        new("attenuation", [new("fromHz", true), new("toHz", true)], true, [new("attenuationDb", "dB")]);

    internal override MeasureResult Evaluate(Sweep run, MeasureCall call, DeviceTraits device)
    {
        double fromHz = Parameter(call, "fromHz");
        double toHz = Parameter(call, "toHz");
        if (OutsideSweep(run, ref fromHz, ref toHz) is { } outside)
            return Absent(call, outside);
        var (reference, reason) = ReferenceLevels.Resolve(run, call.Reference!);
        if (reference is null)
            return Absent(call, reason!);
        var part = run.GainCurve.Part(fromHz, toHz);
        var (highest, _) = PeakSearch.Highest(part.Values);
        bool edgeUnknown = double.IsNaN(part.Values[0]) || double.IsNaN(part.Values[^1]);
        return edgeUnknown || !double.IsFinite(highest)
            ? Absent(call, ZeroGain(fromHz, toHz))
            : Found(call, [reference.Value - highest]);
    }
}

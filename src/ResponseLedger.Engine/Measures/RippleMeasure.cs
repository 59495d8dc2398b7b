using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Engine.Measures;

/// <summary>
/// Highest less lowest level in dB between fromHz and toHz, band edges included; 0 or more.
/// Absent where the band leaves the sweep or holds a gain of exactly zero.
/// </summary>
internal sealed class RippleMeasure : Measure
{
    internal override MeasureDefinition Definition { get; } =
        new("ripple", [new("fromHz", true), new("toHz", true)], false, [new("rippleDb", "dB")]);

    internal override MeasureResult Evaluate(Sweep run, MeasureCall call, DeviceTraits device)
    {
        double fromHz = Parameter(call, "fromHz");
        double toHz = Parameter(call, "toHz");
        if (OutsideSweep(run, ref fromHz, ref toHz) is { } outside)
            return Absent(call, outside);
        var part = run.GainCurve.Part(fromHz, toHz);
        return part.IsFinite
            ? Found(call, [part.Values.Max() - part.Values.Min()])
            : Absent(call, ZeroGain(fromHz, toHz));
    }
}

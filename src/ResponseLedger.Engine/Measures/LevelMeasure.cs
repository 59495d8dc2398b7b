using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Engine.Measures;

/// <summary>
/// The level L = 20 log10 |H| in dB at a stated frequency, straight against log f between points.
/// Absent outside the sweep and where a gain of exactly zero leaves no finite level.
/// </summary>
internal sealed class LevelMeasure : Measure
{
    internal override MeasureDefinition Definition { get; } =
        new("level", [new("frequencyHz", true)], false, [new("gainDb", "dB")]);

    internal override MeasureResult Evaluate(Sweep run, MeasureCall call, DeviceTraits device)
    {
        double frequencyHz = Parameter(call, "frequencyHz");
        if (OutsideSweep(run, ref frequencyHz) is { } outside)
            return Absent(call, outside);
        return run.GainDbAt(frequencyHz) is { } level
            ? Found(call, [level])
            : Absent(call, ZeroGain(frequencyHz, frequencyHz));
    }
}

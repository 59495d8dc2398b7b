using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Engine.Measures;

/// <summary>
/// The highest level in dB and its frequency in Hz, in the whole sweep or between fromHz and toHz (either may be left out), band
/// edges included. Of levels within 1e-9 dB the lowest frequency counts. A peak at an edge is noted. Absent where the band leaves
/// the sweep or every gain in it is exactly zero.
/// </summary>
internal sealed class PeakMeasure : Measure
{
    internal override MeasureDefinition Definition { get; } =
        new("peak", [new("fromHz", false), new("toHz", false)], false, [new("gainDb", "dB"), new("frequencyHz", "Hz")]);

    internal override MeasureResult Evaluate(Sweep run, MeasureCall call, DeviceTraits device)
    {
        double fromHz = Optional(call, "fromHz") ?? run.FrequencyHz[0];
        double toHz = Optional(call, "toHz") ?? run.FrequencyHz[^1];
        if (OutsideSweep(run, ref fromHz, ref toHz) is { } outside)
            return Absent(call, outside);
        if (toHz <= fromHz)
            return Absent(call, new Absence(AbsenceCode.OutsideSweep, $"The band from {Wording.Hz(fromHz)} to {Wording.Hz(toHz)} is empty."));
        var part = run.GainCurve.Part(fromHz, toHz);
        var (level, index) = PeakSearch.Highest(part.Values);
        if (!double.IsFinite(level))
            return Absent(call, ZeroGain(fromHz, toHz));
        double frequencyHz = part.FrequencyHz[index];
        return index == 0 || index == part.Count - 1
            ? Found(call, [level, frequencyHz], null, new Absence(AbsenceCode.PeakAtEdge, $"The highest level lies at the edge, {Wording.Hz(frequencyHz)}; it may rise further beyond."))
            : Found(call, [level, frequencyHz]);
    }
}

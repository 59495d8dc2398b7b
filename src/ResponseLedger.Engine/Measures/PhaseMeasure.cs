using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Engine.Measures;

/// <summary>
/// The unwrapped phase in degrees at a stated frequency, straight against log f between points, on the branch where the first
/// point lies in (-180, 180]. Its turns are counted from the start of the sweep, so a suspect step below the frequency is noted.
/// Absent without phase, outside the sweep, and beside points that have none.
/// </summary>
internal sealed class PhaseMeasure : Measure
{
    internal override MeasureDefinition Definition { get; } =
        new("phase", [new("frequencyHz", true)], false, [new("phaseDeg", "deg")]);

    internal override MeasureResult Evaluate(Sweep run, MeasureCall call, DeviceTraits device)
    {
        double frequencyHz = Parameter(call, "frequencyHz");
        if (PhaseAbsent(run) is { } noPhase)
            return Absent(call, noPhase);
        if (OutsideSweep(run, ref frequencyHz) is { } outside)
            return Absent(call, outside);
        return run.PhaseDegAt(frequencyHz) is { } phase
            ? Found(call, [phase], null, SuspectNotes(run, run.FrequencyHz[0], frequencyHz))
            : Absent(call, PhaseAbsentNear(frequencyHz));
    }
}

using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Engine.Measures;

/// <summary>One measure: its definition and its computation. Calls that arrive here have no problems.</summary>
internal abstract class Measure
{
    internal abstract MeasureDefinition Definition { get; }

    internal abstract MeasureResult Evaluate(Sweep run, MeasureCall call, DeviceTraits device);

    protected static double Parameter(MeasureCall call, string name) => call.Parameters[name];

    protected static double? Optional(MeasureCall call, string name)
        => call.Parameters.TryGetValue(name, out double value) ? value : null;

    /// <summary>A result of values in the order of the definition. Non-finite values are absent; an absent value without a reason says that it exceeds a double.</summary>
    protected MeasureResult Found(MeasureCall call, ReadOnlySpan<double> values, Absence? reason = null, params IReadOnlyList<Absence> notes)
    {
        var outputs = new MeasuredValue[Definition.Outputs.Count];
        bool absent = false;
        for (int i = 0; i < outputs.Length; i++)
        {
            var output = Definition.Outputs[i];
            double? value = double.IsFinite(values[i]) ? values[i] : null;
            absent |= value is null;
            outputs[i] = new MeasuredValue(output.Name, value, output.Unit);
        }

        if (absent)
            reason ??= new Absence(AbsenceCode.NotFinite, "A value exceeds what a double holds.");
        return new MeasureResult(call, outputs, absent ? reason : null, notes, [], []);
    }

    /// <summary>A result without any value.</summary>
    protected MeasureResult Absent(MeasureCall call, Absence reason, params IReadOnlyList<Absence> notes)
    {
        var values = new double[Definition.Outputs.Count];
        Array.Fill(values, double.NaN);
        return Found(call, values, reason, notes);
    }

    /// <summary>The reason where a frequency lies outside the sweep; one that misses an end by rounding is set to it.</summary>
    protected static Absence? OutsideSweep(Sweep run, ref double frequencyHz)
    {
        double same = frequencyHz;
        return OutsideSweep(run, ref frequencyHz, ref same);
    }

    /// <summary>The reason where a band leaves the sweep; an edge that misses an end by rounding is set to it.</summary>
    protected static Absence? OutsideSweep(Sweep run, ref double fromHz, ref double toHz)
    {
        var f = run.FrequencyHz;
        (fromHz, toHz) = (run.AtEnds(fromHz), run.AtEnds(toHz));
        if (fromHz >= f[0] && toHz <= f[^1])
            return null;
        string asked = fromHz == toHz ? Wording.Hz(fromHz) : $"{Wording.Hz(fromHz)} to {Wording.Hz(toHz)}";
        return new Absence(AbsenceCode.OutsideSweep, $"{asked} is not inside the sweep, which runs from {Wording.Hz(f[0])} to {Wording.Hz(f[^1])}; nothing is extrapolated.");
    }

    protected static Absence? PhaseAbsent(Sweep run)
        => run.HasPhase ? null : new Absence(AbsenceCode.PhaseAbsent, "The run carries magnitude only; sweep it with phase.");

    protected static Absence PhaseAbsentNear(double frequencyHz)
        => new(AbsenceCode.PhaseAbsent, $"There is no phase at {Wording.Hz(frequencyHz)}: a neighbouring point has a gain of zero or lies under the noise floor.");

    protected static Absence ZeroGain(double fromHz, double toHz)
        => new(AbsenceCode.ZeroGain, fromHz == toHz
            ? $"The gain at or beside {Wording.Hz(fromHz)} is exactly zero and has no finite level."
            : $"A gain of exactly zero between or beside {Wording.Hz(fromHz)} and {Wording.Hz(toHz)} has no finite level.");

    protected static Absence[] SuspectNotes(Sweep run, double fromHz, double toHz)
        => run.HasSuspectStep(fromHz, toHz) ? [SuspectNote(run, fromHz, toHz)] : [];

    private static Absence SuspectNote(Sweep run, double fromHz, double toHz)
    {
        foreach (var step in run.SuspectSteps)
        {
            if (step.ToHz > fromHz && step.FromHz < toHz)
                return SuspectNote(step);
        }

        throw new InvalidOperationException("No suspect step overlaps the span.");
    }

    internal static Absence SuspectNote(SuspectStep step)
        => new(AbsenceCode.SuspectPhase, $"The phase steps by {Wording.Deg(step.StepDeg)} from {Wording.Hz(step.FromHz)} to {Wording.Hz(step.ToHz)}; whole turns may be miscounted there. Sweep more densely.");
}

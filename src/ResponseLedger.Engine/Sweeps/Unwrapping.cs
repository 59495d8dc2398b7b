namespace ResponseLedger.Engine.Sweeps;

/// <summary>A phase step over 120 degrees between neighbouring points: the points may lie too far apart to count turns.</summary>
/// <param name="FromHz">Frequency of the point before the step.</param>
/// <param name="ToHz">Frequency of the point after it.</param>
/// <param name="StepDeg">The step as unwrapped, in [-180, 180] degrees.</param>
public readonly record struct SuspectStep(double FromHz, double ToHz, double StepDeg);

/// <summary>Adds whole turns so that no step exceeds 180 degrees; the first point that has a phase lands in (-180, 180].</summary>
internal static class Unwrapping
{
    internal const double SuspectStepDeg = 120;

    /// <summary>The same angle in (-180, 180].</summary>
    internal static double Wrap(double angleDeg)
    {
        double wrapped = Math.IEEERemainder(angleDeg, 360);
        return wrapped == -180 ? 180 : wrapped;
    }

    /// <summary>Unwraps in place; NaN points stay absent and the turns are carried over them. Gives the suspect steps.</summary>
    /// <param name="frequencyHz">Frequencies, for the suspect steps and the nominal delay.</param>
    /// <param name="phaseDeg">Phase in degrees, any branch.</param>
    /// <param name="nominalDelaySeconds">A delay that is taken out before counting turns and put back after.</param>
    internal static SuspectStep[] Unwrap(ReadOnlySpan<double> frequencyHz, Span<double> phaseDeg, double nominalDelaySeconds = 0)
    {
        List<SuspectStep>? suspects = null;
        int previous = -1;
        double previousFlatDeg = 0;
        double turns = 0;
        for (int i = 0; i < phaseDeg.Length; i++)
        {
            double raw = phaseDeg[i];
            if (double.IsNaN(raw))
                continue;
            double flat = raw + 360 * frequencyHz[i] * nominalDelaySeconds;
            if (previous < 0)
            {
                turns = Math.Round((Wrap(raw) - raw) / 360);
            }
            else
            {
                double step = flat - previousFlatDeg;
                double whole = WholeTurns(step);
                turns -= whole;
                step -= 360 * whole;
                if (Math.Abs(step) > SuspectStepDeg)
                    (suspects ??= []).Add(new SuspectStep(frequencyHz[previous], frequencyHz[i], step));
            }

            phaseDeg[i] = raw + 360 * turns;
            previous = i;
            previousFlatDeg = flat;
        }

        return suspects?.ToArray() ?? [];
    }

    /// <summary>The fewest whole turns whose removal leaves a step of at most 180 degrees; a step of exactly 180 keeps its sign.</summary>
    private static double WholeTurns(double stepDeg)
        => stepDeg > 0 ? Math.Ceiling((stepDeg - 180) / 360) : Math.Floor((stepDeg + 180) / 360);
}

using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Engine.Measures;

/// <summary>
/// Every crossover of a loop gain on its straight pieces. A point that stands exactly on the line counts once; a piece that
/// falls to a gain of exactly zero passes the line somewhere that cannot be placed.
/// </summary>
internal static class LoopCrossovers
{
    /// <summary>Every frequency with |L| = 1 and, where there is phase, its signed distance from the critical phase in (-180, 180].</summary>
    internal static (List<GainCrossover> Found, double? UnplacedHz) OfGain(Sweep run, double criticalPhaseDeg)
    {
        var found = new List<GainCrossover>();
        double? unplacedHz = null;
        var f = run.FrequencyHz;
        var level = run.GainDb;
        for (int i = 0; i < f.Length; i++)
        {
            if (level[i] == 0)
                Add(f[i]);
            if (i + 1 == f.Length)
                break;
            var (a, b) = (level[i], level[i + 1]);
            if (!(a < 0 && b > 0 || a > 0 && b < 0))
                continue;
            if (double.IsInfinity(a) || double.IsInfinity(b))
                unplacedHz ??= f[i];
            else
                Add(LogAxis.FrequencyHzAt(f[i], f[i + 1], a / (a - b)));
        }

        return (found, unplacedHz);

        void Add(double frequencyHz)
        {
            double? margin = run.PhaseDegAt(frequencyHz) is { } phase ? Unwrapping.Wrap(phase - criticalPhaseDeg) : null;
            found.Add(new GainCrossover(frequencyHz, margin));
        }
    }

    /// <summary>Every frequency at which the phase is the critical one, whole turns apart, with minus the level there.</summary>
    internal static List<PhaseCrossover> OfPhase(Sweep run, double criticalPhaseDeg)
    {
        var found = new List<PhaseCrossover>();
        var f = run.FrequencyHz;
        var phase = run.PhaseDeg;
        for (int i = 0; i < phase.Length; i++)
        {
            if (double.IsNaN(phase[i]))
                continue;
            double here = phase[i] - criticalPhaseDeg;
            if (Math.IEEERemainder(here, 360) == 0)
                Add(f[i]);
            if (i + 1 == f.Length || double.IsNaN(phase[i + 1]))
                continue;
            double next = phase[i + 1] - criticalPhaseDeg;
            double turn = 360 * (Math.Floor(Math.Min(here, next) / 360) + 1);
            if (turn > Math.Min(here, next) && turn < Math.Max(here, next))
                Add(LogAxis.FrequencyHzAt(f[i], f[i + 1], (turn - here) / (next - here)));
        }

        return found;

        void Add(double frequencyHz)
        {
            if (run.GainDbAt(frequencyHz) is { } level)
                found.Add(new PhaseCrossover(frequencyHz, 0 - level));
        }
    }
}

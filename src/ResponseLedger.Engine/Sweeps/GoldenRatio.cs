namespace ResponseLedger.Engine.Sweeps;

/// <summary>
/// H / H_golden at the union of both grids within the span that both cover: difference in dB, degrees and seconds. The phase is
/// unwrapped as that of a ratio (not as a difference of two unwrapped curves), with the whole turns that bring the run nearest
/// to the golden run at their lowest common frequency. Between its points the ratio runs straight against log f. The delay is the
/// run's less the golden run's, each by the derivative on its own grid (on the union, points a rounding apart would make noise of it),
/// with the run on the branch that the ratio gives it: its own turns and the golden run's may be counted differently.
/// </summary>
public sealed class GoldenRatio
{
    private readonly double[] frequencyHz;
    private readonly double[] differenceDb;
    private readonly Lazy<RatioPhase> phase;
    private readonly Lazy<double[]> delayDifferenceSeconds;

    private GoldenRatio(Sweep run, Sweep golden, double[] unionHz)
    {
        frequencyHz = unionHz;
        differenceDb = new double[unionHz.Length];
        LevelDifference(run.GainCurve, golden.GainCurve, unionHz, differenceDb);
        bool hasPhase = run.HasPhase && golden.HasPhase;
        // Most masks compare levels only, so phase and delay wait until they are asked for.
        phase = new Lazy<RatioPhase>(() => hasPhase ? Unwrapped(run, golden, unionHz) : new RatioPhase([], [], []));
        delayDifferenceSeconds = new Lazy<double[]>(() => hasPhase ? Difference(OnBranch(run, golden), golden.DelayCurve, unionHz) : []);
    }

    /// <summary>Union of both grids within the common span, in Hz, strictly ascending, 2 or more.</summary>
    public ReadOnlySpan<double> FrequencyHz => frequencyHz;

    /// <summary>Level of the run less that of the golden run in dB; negative infinity at and beside a gain of exactly zero of the run; NaN (absent) at and beside one of the golden run.</summary>
    public ReadOnlySpan<double> DifferenceDb => differenceDb;

    /// <summary>Phase of the ratio in degrees, unwrapped, the first in (-180, 180]; NaN where either is absent; empty when either run carries no phase.</summary>
    public ReadOnlySpan<double> DifferenceDeg => phase.Value.Deg;

    /// <summary>Group delay of the run less that of the golden run in seconds; NaN where either is absent; empty when either run carries no phase.</summary>
    public ReadOnlySpan<double> DelayDifferenceSeconds => delayDifferenceSeconds.Value;

    /// <summary>Steps over 120 degrees that the ratio's phase rests on: its own, and where the grids differ those of both runs, between whose points it is read.</summary>
    public ReadOnlySpan<SuspectStep> SuspectSteps => phase.Value.SuspectSteps;

    /// <summary>Steps over 120 degrees that the delay's difference rests on: the ratio's and those of both runs.</summary>
    public ReadOnlySpan<SuspectStep> DelaySuspectSteps => phase.Value.DelaySuspectSteps;

    /// <summary>The ratio of two runs; null when their spans share less than two frequencies of the union.</summary>
    /// <param name="run">The run.</param>
    /// <param name="golden">The golden run.</param>
    public static GoldenRatio? Of(Sweep run, Sweep golden)
    {
        ArgumentNullException.ThrowIfNull(run);
        ArgumentNullException.ThrowIfNull(golden);
        double[] union = Union(run.FrequencyHz, golden.FrequencyHz);
        return union.Length < 2 ? null : new GoldenRatio(run, golden, union);
    }

    private static RatioPhase Unwrapped(Sweep run, Sweep golden, double[] unionHz)
    {
        double[] deg = Difference(run.PhaseCurve, golden.PhaseCurve, unionHz);
        var own = Unwrapping.Unwrap(unionHz, deg);
        SuspectStep[] all = [.. own.Concat(run.SuspectSteps.ToArray()).Concat(golden.SuspectSteps.ToArray()).OrderBy(step => step.FromHz)];
        bool sameGrid = run.FrequencyHz.SequenceEqual(golden.FrequencyHz);
        return new RatioPhase(deg, sameGrid ? own : all, all);
    }

    /// <summary>The run's delay with its phase, at each point of its own, set to the golden run's plus the ratio's; beyond the common span it goes on by its own steps.</summary>
    private Curve OnBranch(Sweep run, Sweep golden)
    {
        var f = run.FrequencyHz;
        var ratio = new Curve(frequencyHz, phase.Value.Deg);
        var own = run.PhaseDeg;
        var deg = new double[f.Length];
        int first = f.Length;
        int last = -1;
        for (int i = 0; i < f.Length; i++)
        {
            if (!ratio.Spans(f[i]))
                continue;
            (first, last) = (Math.Min(first, i), i);

            // Whole turns alone are moved, so that no rounding of an interpolation enters the phase.
            double goldenDeg = golden.PhaseCurve.ValueAt(f[i]);
            deg[i] = own[i] + 360 * Math.Round((goldenDeg + ratio.ValueAt(f[i]) - own[i]) / 360);
        }

        for (int i = first - 1; i >= 0 && last >= 0; i--)
            deg[i] = deg[i + 1] + own[i] - own[i + 1];
        for (int i = last + 1; i < f.Length && last >= 0; i++)
            deg[i] = deg[i - 1] + own[i] - own[i - 1];
        return new Curve(f, last < 0 ? run.DelaySeconds : GroupDelay.AtPoints(f, deg));
    }

    private static double[] Union(ReadOnlySpan<double> a, ReadOnlySpan<double> b)
    {
        double fromHz = Math.Max(a[0], b[0]);
        double toHz = Math.Min(a[^1], b[^1]);
        var union = new double[a.Length + b.Length];
        int count = 0;
        for (int i = 0, j = 0; i < a.Length || j < b.Length;)
        {
            double next = j == b.Length || i < a.Length && a[i] <= b[j] ? a[i] : b[j];
            if (i < a.Length && a[i] == next)
                i++;
            if (j < b.Length && b[j] == next)
                j++;
            if (next >= fromHz && next <= toHz)
                union[count++] = next;
        }

        return union[..count];
    }

    private static double[] Difference(Curve run, Curve golden, double[] atHz)
    {
        var difference = new double[atHz.Length];
        int i = 0;
        int j = 0;
        for (int k = 0; k < atHz.Length; k++)
            difference[k] = Follow(run, ref i, atHz[k]) - Follow(golden, ref j, atHz[k]);
        return difference;
    }

    private static void LevelDifference(Curve run, Curve golden, double[] atHz, double[] differenceDb)
    {
        int i = 0;
        int j = 0;
        for (int k = 0; k < atHz.Length; k++)
        {
            double level = Follow(run, ref i, atHz[k]);
            double reference = Follow(golden, ref j, atHz[k]);
            differenceDb[k] = !double.IsFinite(reference) ? double.NaN
                : double.IsFinite(level) ? level - reference
                : double.NegativeInfinity;
        }
    }

    /// <summary>The value at a frequency inside the span, for frequencies that ascend from call to call.</summary>
    private static double Follow(Curve curve, ref int piece, double atHz)
    {
        while (piece < curve.Count - 2 && curve.FrequencyHz[piece + 1] <= atHz)
            piece++;
        return curve.OnPiece(piece, atHz);
    }

    private sealed record RatioPhase(double[] Deg, SuspectStep[] SuspectSteps, SuspectStep[] DelaySuspectSteps);
}

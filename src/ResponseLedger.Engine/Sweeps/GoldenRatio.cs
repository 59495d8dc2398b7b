namespace ResponseLedger.Engine.Sweeps;

/// <summary>
/// H / H_golden at the union of both grids within the span that both cover: difference in dB, degrees and seconds. The phase is
/// unwrapped as that of a ratio (not as a difference of two unwrapped curves), with the whole turns that bring the run nearest
/// to the golden run at their lowest common frequency. Between its points the ratio runs straight against log f.
/// </summary>
public sealed class GoldenRatio
{
    private readonly double[] frequencyHz;
    private readonly double[] differenceDb;
    private readonly Lazy<(double[] Deg, SuspectStep[] SuspectSteps)> phase;
    private readonly Lazy<double[]> delayDifferenceSeconds;

    private GoldenRatio(Sweep run, Sweep golden, double[] unionHz)
    {
        frequencyHz = unionHz;
        differenceDb = new double[unionHz.Length];
        LevelDifference(run.GainCurve, golden.GainCurve, unionHz, differenceDb);
        bool hasPhase = run.HasPhase && golden.HasPhase;
        // Most masks compare levels only, so phase and delay wait until they are asked for.
        phase = new Lazy<(double[], SuspectStep[])>(() =>
        {
            if (!hasPhase)
                return ([], []);
            double[] deg = Difference(run.PhaseCurve, golden.PhaseCurve, unionHz);
            return (deg, Unwrapping.Unwrap(unionHz, deg));
        });
        delayDifferenceSeconds = new Lazy<double[]>(() => hasPhase ? Difference(run.DelayCurve, golden.DelayCurve, unionHz) : []);
    }

    /// <summary>Union of both grids within the common span, in Hz, strictly ascending, 2 or more.</summary>
    public ReadOnlySpan<double> FrequencyHz => frequencyHz;

    /// <summary>Level of the run less that of the golden run in dB; negative infinity at and beside a gain of exactly zero of the run; NaN (absent) at and beside one of the golden run.</summary>
    public ReadOnlySpan<double> DifferenceDb => differenceDb;

    /// <summary>Phase of the ratio in degrees, unwrapped, the first in (-180, 180]; NaN where either is absent; empty when either run carries no phase.</summary>
    public ReadOnlySpan<double> DifferenceDeg => phase.Value.Deg;

    /// <summary>Group delay of the run less that of the golden run in seconds; NaN where either is absent; empty when either run carries no phase.</summary>
    public ReadOnlySpan<double> DelayDifferenceSeconds => delayDifferenceSeconds.Value;

    /// <summary>Steps of the ratio's phase over 120 degrees.</summary>
    public ReadOnlySpan<SuspectStep> SuspectSteps => phase.Value.SuspectSteps;

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
}

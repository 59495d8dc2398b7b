using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Engine.Measures;

/// <summary>
/// The reference level of a run in dB: its peak; its level at a frequency; or the mean over a band,
/// (1 / ln(f2/f1)) times the integral of L d(ln f), exact for the straight pieces.
/// </summary>
public static class ReferenceLevels
{
    /// <summary>The reference level of a run.</summary>
    /// <param name="run">The run.</param>
    /// <param name="reference">Which reference.</param>
    /// <returns>The level in dB and no reason, or no level and the reason.</returns>
    public static (double? GainDb, Absence? Reason) Resolve(Sweep run, ReferenceLevel reference)
    {
        ArgumentNullException.ThrowIfNull(run);
        ArgumentNullException.ThrowIfNull(reference);
        Preconditions.Require(MeasureCallCheck.ReferenceProblem(reference) is null, nameof(reference), MeasureCallCheck.ReferenceProblem(reference) ?? "");
        return reference switch
        {
            ReferenceLevel.Peak => OfPeak(run),
            ReferenceLevel.AtFrequency at => OfFrequency(run, at.FrequencyHz),
            ReferenceLevel.Band band => OfBand(run, band.FromHz, band.ToHz),
            _ => throw new ArgumentException("An unknown kind of reference.", nameof(reference)),
        };
    }

    /// <summary>Mean of a finite part over ln f.</summary>
    internal static double Mean(CurvePart part)
    {
        double sum = 0;
        double width = 0;
        for (int i = 0; i + 1 < part.Count; i++)
        {
            double h = LogAxis.Width(part.FrequencyHz[i], part.FrequencyHz[i + 1]);
            sum += h * (0.5 * part.Values[i] + 0.5 * part.Values[i + 1]);
            width += h;
        }

        return sum / width;
    }

    private static (double?, Absence?) OfPeak(Sweep run)
    {
        var (level, _) = PeakSearch.Highest(run.GainDb);
        return double.IsFinite(level)
            ? (level, null)
            : (null, new Absence(AbsenceCode.ZeroGain, "The gain is exactly zero at every point; there is no peak."));
    }

    private static (double?, Absence?) OfFrequency(Sweep run, double frequencyHz)
    {
        frequencyHz = run.AtEnds(frequencyHz);
        if (!run.GainCurve.Spans(frequencyHz))
            return (null, Outside(run, Wording.Hz(frequencyHz)));
        return run.GainDbAt(frequencyHz) is { } level
            ? (level, null)
            : (null, new Absence(AbsenceCode.ZeroGain, $"The gain at or beside the reference frequency {Wording.Hz(frequencyHz)} is exactly zero."));
    }

    private static (double?, Absence?) OfBand(Sweep run, double fromHz, double toHz)
    {
        (fromHz, toHz) = (run.AtEnds(fromHz), run.AtEnds(toHz));
        if (!run.GainCurve.Spans(fromHz) || !run.GainCurve.Spans(toHz))
            return (null, Outside(run, $"{Wording.Hz(fromHz)} to {Wording.Hz(toHz)}"));
        var part = run.GainCurve.Part(fromHz, toHz);
        return part.IsFinite
            ? (Mean(part), null)
            : (null, new Absence(AbsenceCode.ZeroGain, $"A gain of exactly zero in the reference band {Wording.Hz(fromHz)} to {Wording.Hz(toHz)} leaves no mean level."));
    }

    private static Absence Outside(Sweep run, string asked)
        => new(AbsenceCode.OutsideSweep, $"The reference at {asked} is not inside the sweep, which runs from {Wording.Hz(run.FrequencyHz[0])} to {Wording.Hz(run.FrequencyHz[^1])}.");
}

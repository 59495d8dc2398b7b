using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Engine.Measures;

/// <summary>One side of a walk: the cutoff in Hz, or why there is none.</summary>
internal readonly record struct Cutoff(double? FrequencyHz, Absence? Reason);

/// <summary>
/// Walks outward from the peak, the stated frequency or the band's edges to the first frequency on each side at which the level
/// has fallen to the reference level less the drop; exact on the straight pieces.
/// </summary>
internal static class CutoffWalk
{
    /// <summary>Both cutoffs, or the reason why the reference level is absent.</summary>
    internal static (Cutoff Lower, Cutoff Upper, Absence? Reason, Absence[] Notes) Both(Sweep run, ReferenceLevel reference, double dropDb)
    {
        var (level, reason) = ReferenceLevels.Resolve(run, reference);
        if (level is null)
            return (default, default, reason, []);
        double threshold = level.Value - dropDb;
        var (fromHz, toHz) = Start(run, reference);
        var lower = Down(run.GainCurve, fromHz, threshold);
        var upper = Up(run.GainCurve, toHz, threshold);
        return (lower, upper, null, InsideNotes(run.GainCurve, fromHz, toHz, threshold));
    }

    private static (double FromHz, double ToHz) Start(Sweep run, ReferenceLevel reference)
    {
        switch (reference)
        {
            case ReferenceLevel.AtFrequency at:
                return (at.FrequencyHz, at.FrequencyHz);
            case ReferenceLevel.Band band:
                return (band.FromHz, band.ToHz);
            default:
                double peakHz = run.FrequencyHz[PeakSearch.Highest(run.GainDb).Index];
                return (peakHz, peakHz);
        }
    }

    private static Cutoff Down(Curve curve, double startHz, double threshold)
    {
        double outerHz = startHz;
        double outer = curve.ValueAt(startHz);
        if (outer < threshold)
            return Inside(startHz, threshold, "lower");
        for (int i = curve.PieceOf(startHz); i >= 0; i--)
        {
            if (curve.FrequencyHz[i] >= startHz)
                continue;
            if (Crossed(curve.FrequencyHz[i], curve.Values[i], outerHz, outer, threshold) is { } cutoff)
                return cutoff;
            (outerHz, outer) = (curve.FrequencyHz[i], curve.Values[i]);
        }

        return NotReached("lower", curve.FirstHz, threshold);
    }

    private static Cutoff Up(Curve curve, double startHz, double threshold)
    {
        double outerHz = startHz;
        double outer = curve.ValueAt(startHz);
        if (outer < threshold)
            return Inside(startHz, threshold, "upper");
        for (int i = curve.PieceOf(startHz) + 1; i < curve.Count; i++)
        {
            if (Crossed(curve.FrequencyHz[i], curve.Values[i], outerHz, outer, threshold) is { } cutoff)
                return cutoff;
            (outerHz, outer) = (curve.FrequencyHz[i], curve.Values[i]);
        }

        return NotReached("upper", curve.LastHz, threshold);
    }

    /// <summary>The crossing on the piece from the level so far, at or above the threshold, to the next point outward; null when that is still above.</summary>
    private static Cutoff? Crossed(double nextHz, double next, double outerHz, double outer, double threshold)
    {
        if (next > threshold)
            return null;
        if (double.IsNegativeInfinity(next))
            return new Cutoff(null, new Absence(AbsenceCode.ZeroGain, $"The level falls to a gain of exactly zero between {Wording.Hz(outerHz)} and {Wording.Hz(nextHz)}; the crossing cannot be placed."));
        if (next == threshold)
            return new Cutoff(nextHz, null);
        double fraction = (outer - threshold) / (outer - next);
        return new Cutoff(nextHz > outerHz
            ? LogAxis.FrequencyHzAt(outerHz, nextHz, fraction)
            : LogAxis.FrequencyHzAt(nextHz, outerHz, 1 - fraction), null);
    }

    private static Cutoff NotReached(string side, double endHz, double threshold)
        => new(null, new Absence(AbsenceCode.NotReached, $"The {side} cutoff at {Wording.Db(threshold)} is not reached inside the sweep, which ends at {Wording.Hz(endHz)}; sweep further."));

    private static Cutoff Inside(double startHz, double threshold, string side)
        => new(null, new Absence(AbsenceCode.CrossingInsideBand, $"At {Wording.Hz(startHz)}, where the walk to the {side} cutoff starts, the level is already under {Wording.Db(threshold)}: the crossing lies inside the band."));

    private static Absence[] InsideNotes(Curve curve, double fromHz, double toHz, double threshold)
    {
        if (fromHz >= toHz)
            return [];
        var part = curve.Part(fromHz, toHz);
        var notes = new List<Absence>();
        for (int i = 0; i + 1 < part.Count; i++)
        {
            var (a, b) = (part.Values[i] - threshold, part.Values[i + 1] - threshold);
            if (a < 0 == b < 0)
                continue;
            double hz = LogAxis.FrequencyHzAt(part.FrequencyHz[i], part.FrequencyHz[i + 1], a / (a - b));
            notes.Add(new Absence(AbsenceCode.CrossingInsideBand, $"The level crosses {Wording.Db(threshold)} inside the band, at {Wording.Hz(hz)}."));
        }

        return [.. notes];
    }
}

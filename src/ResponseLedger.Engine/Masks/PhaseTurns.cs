using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Engine.Masks;

/// <summary>
/// Whole turns between a run's phase and the absolute phase limits of its mask, the same for all of them, since a curve has but one
/// branch. They bring the run nearest to the middle between the strictest upper and lower limit at the lowest frequency that the run
/// shares with one of each; where no such pair is, to the limit that begins first.
/// </summary>
internal static class PhaseTurns
{
    /// <summary>Degrees, a multiple of 360, by which the limits are raised to meet the run.</summary>
    internal static double Of(IReadOnlyList<CurveLimit> limits, Sweep run)
    {
        if (!run.HasPhase)
            return 0;
        CurveLimit[] absolute = [.. limits.Where(l => l.Quantity == CurveQuantity.PhaseDeg && l.Basis == LimitBasis.Absolute)];
        if (absolute.Length == 0)
            return 0;
        var pairs =
            from upper in absolute.Where(l => l.Side == LimitSide.Upper)
            from lower in absolute.Where(l => l.Side == LimitSide.Lower)
            select Meeting(run, [upper, lower]);
        var meeting = Lowest(pairs) ?? Lowest(absolute.Select(l => Meeting(run, [l])));
        if (meeting is not { } found)
            return 0;
        double uppers = Strictest(absolute, LimitSide.Upper, found.FrequencyHz);
        double lowers = Strictest(absolute, LimitSide.Lower, found.FrequencyHz);
        double aimDeg = double.IsNaN(uppers) ? lowers : double.IsNaN(lowers) ? uppers : uppers / 2 + lowers / 2;
        return 360 * Math.Round((found.PhaseDeg - aimDeg) / 360);
    }

    private static (double FrequencyHz, double PhaseDeg)? Lowest(IEnumerable<(double FrequencyHz, double PhaseDeg)?> meetings)
        => meetings.Where(m => m is not null).OrderBy(m => m!.Value.FrequencyHz).FirstOrDefault();

    /// <summary>The lowest frequency of all these limits at which the run has a phase, with that phase.</summary>
    private static (double FrequencyHz, double PhaseDeg)? Meeting(Sweep run, CurveLimit[] limits)
    {
        var curve = run.PhaseCurve;
        double fromHz = Math.Max(limits.Max(l => l.Corners[0].FrequencyHz), curve.FirstHz);
        double toHz = Math.Min(limits.Min(l => l.Corners[^1].FrequencyHz), curve.LastHz);
        if (fromHz > toHz)
            return null;
        double phaseDeg = curve.ValueAt(fromHz);
        for (int i = curve.PieceOf(fromHz) + 1; double.IsNaN(phaseDeg) && i < curve.Count && curve.FrequencyHz[i] <= toHz; i++)
            (fromHz, phaseDeg) = (curve.FrequencyHz[i], curve.Values[i]);
        return double.IsNaN(phaseDeg) ? null : (fromHz, phaseDeg);
    }

    private static double Strictest(CurveLimit[] limits, LimitSide side, double atHz)
    {
        double strictest = double.NaN;
        foreach (var limit in limits.Where(l => l.Side == side))
        {
            double value = LimitCurve.ValueAt(limit, atHz);
            if (!double.IsNaN(value))
                strictest = double.IsNaN(strictest) ? value : LimitCurve.Stricter(side, strictest, value);
        }

        return strictest;
    }
}

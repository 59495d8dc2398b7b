using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Engine.Masks;

/// <summary>Judges a run against one curve limit: broken where it is spanned fails; not wholly spanned, or too sparse, is inconclusive; else the least margin.</summary>
internal static class LimitEvaluator
{
    // Grids are rounded when they are written; a gap that exceeds the stated one by this share is the stated one.
    private const double GapTolerance = 1e-6;

    internal static CriterionResult Evaluate(CurveLimit limit, Sweep run, Sweep? golden, GoldenRatio? ratio, double phaseTurnsDeg)
    {
        var limited = LimitedCurve.Of(limit, run, golden, ratio);
        if (limited.Reason is not null)
            return Undecided(limit, limited.Reason);
        var curve = limited.Curve;
        double firstHz = limit.Corners[0].FrequencyHz;
        double lastHz = limit.Corners[^1].FrequencyHz;
        double fromHz = Math.Max(firstHz, curve.FirstHz);
        double toHz = Math.Min(lastHz, curve.LastHz);
        if (fromHz > toHz)
            return Undecided(limit, TooShort(limit, curve, true, true));

        double endRatio = (limit.EndRatio ?? 1) * (1 + Sweep.EndTolerance);
        bool startMissing = curve.FirstHz > firstHz * endRatio;
        bool endMissing = lastHz > curve.LastHz * endRatio;

        // A ratio is nearest to the golden run already.
        bool turns = limit.Quantity == CurveQuantity.PhaseDeg && limit.Basis != LimitBasis.Golden;
        double shift = limited.Offset + (turns ? phaseTurnsDeg : 0);
        var search = new MarginSearch(curve, limit, shift);
        search.Between(fromHz, toHz);
        if (curve.FirstHz > firstHz && !startMissing)
            search.StandIn(curve.FirstHz, curve.Values[0], firstHz, curve.FirstHz);
        if (lastHz > curve.LastHz && !endMissing)
            search.StandIn(curve.LastHz, curve.Values[^1], curve.LastHz, lastHz);

        var incomplete = startMissing || endMissing ? TooShort(limit, curve, startMissing, endMissing)
            : search.AbsentHz is { } absentHz ? NoValue(limit, absentHz)
            : Gap(limit, run, fromHz, toHz);
        return Decide(limit, search, incomplete, SuspectNotes(limit, limited.SuspectSteps, fromHz, toHz));
    }

    internal static string UnitOf(CurveQuantity quantity) => quantity switch
    {
        CurveQuantity.GainDb => "dB",
        CurveQuantity.PhaseDeg => "deg",
        _ => "s",
    };

    private static CriterionResult Decide(CurveLimit limit, MarginSearch search, Absence? incomplete, Absence[] notes)
    {
        string unit = UnitOf(limit.Quantity);
        if (search.ZeroHz is { } zeroHz && limit.Side == LimitSide.Lower)
            return new(limit.Name, Outcome.Fail, null, unit, zeroHz, new Absence(AbsenceCode.ZeroGain, $"The gain at or beside {Wording.Hz(zeroHz)} is exactly zero, under every lower limit."), notes);
        double margin = MaskEvaluator.Snap(search.Least, limit.Scale ?? MaskEvaluator.UsualScale(unit, limit.Corners.Max(c => Math.Abs(c.Value))));
        if (margin < 0)
            return new(limit.Name, Outcome.Fail, margin, unit, search.LeastHz, incomplete, notes);
        if (incomplete is not null)
            return Undecided(limit, incomplete, notes);
        return double.IsFinite(margin)
            ? new(limit.Name, Outcome.Pass, margin, unit, search.LeastHz, null, notes)
            : new(limit.Name, Outcome.Pass, null, unit, search.ZeroHz, new Absence(AbsenceCode.ZeroGain, "The gain is exactly zero all along the limit: the upper limit is met with no finite margin."), notes);
    }

    private static CriterionResult Undecided(CurveLimit limit, Absence reason, Absence[]? notes = null)
        => new(limit.Name, Outcome.Inconclusive, null, UnitOf(limit.Quantity), null, reason, notes);

    private static Absence TooShort(CurveLimit limit, Curve curve, bool startMissing, bool endMissing)
    {
        double firstHz = limit.Corners[0].FrequencyHz;
        double lastHz = limit.Corners[^1].FrequencyHz;
        string who = limit.Basis == LimitBasis.Golden ? "run and golden run together span" : "run spans";
        string remedy = startMissing && endMissing ? $"from {Wording.Hz(firstHz)} to {Wording.Hz(lastHz)}"
            : startMissing ? $"down to {Wording.Hz(firstHz)}"
            : $"up to {Wording.Hz(lastHz)}";
        return new Absence(AbsenceCode.SpanTooShort, $"The limit runs from {Wording.Hz(firstHz)} to {Wording.Hz(lastHz)}, the {who} {Wording.Hz(curve.FirstHz)} to {Wording.Hz(curve.LastHz)}; sweep {remedy}.");
    }

    private static Absence NoValue(CurveLimit limit, double atHz) => limit.Quantity == CurveQuantity.GainDb
        ? new Absence(AbsenceCode.ZeroGain, $"The golden run's gain at or beside {Wording.Hz(atHz)} is exactly zero; nothing can be compared with it there.")
        : new Absence(AbsenceCode.PhaseAbsent, $"There is no phase at or beside {Wording.Hz(atHz)}: the gain is zero or under the noise floor there.");

    private static Absence? Gap(CurveLimit limit, Sweep run, double fromHz, double toHz)
    {
        if (limit.MinPointsPerDecade is not { } pointsPerDecade)
            return null;
        var f = run.FrequencyHz;
        double widest = 0;
        int at = 0;
        for (int i = run.GainCurve.PieceOf(fromHz); i + 1 < f.Length && f[i] < toHz; i++)
        {
            double width = LogAxis.Width(f[i], f[i + 1]);
            if (width > widest)
                (widest, at) = (width, i);
        }

        double allowed = Math.Log(10) / pointsPerDecade;
        if (widest <= allowed * (1 + GapTolerance))
            return null;
        return new Absence(
            AbsenceCode.GapTooLarge,
            $"Between {Wording.Hz(f[at])} and {Wording.Hz(f[at + 1])} the run has {Wording.Number(Math.Log(10) / widest)} points a decade where the limit asks for {Wording.Number(pointsPerDecade)}; sweep more densely.");
    }

    /// <summary>Phase counts its turns from the lowest common frequency on; a delay knows only the pieces in its span.</summary>
    private static Absence[] SuspectNotes(CurveLimit limit, ReadOnlySpan<SuspectStep> steps, double fromHz, double toHz)
    {
        foreach (var step in steps)
        {
            bool counts = step.ToHz > fromHz || limit.Basis == LimitBasis.Golden && limit.Quantity == CurveQuantity.PhaseDeg;
            if (counts && step.FromHz < toHz)
                return [Measures.Measure.SuspectNote(step)];
        }

        return [];
    }
}

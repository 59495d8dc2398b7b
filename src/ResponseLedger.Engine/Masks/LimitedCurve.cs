using ResponseLedger.Engine.Measures;
using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Engine.Masks;

/// <summary>The curve that a limit bounds, in the terms of its corners; or the reason why there is none.</summary>
internal readonly ref struct LimitedCurve
{
    private LimitedCurve(Curve curve, double offset, ReadOnlySpan<SuspectStep> suspectSteps)
    {
        Curve = curve;
        Offset = offset;
        SuspectSteps = suspectSteps;
    }

    private LimitedCurve(Absence reason) => Reason = reason;

    internal Curve Curve { get; }

    /// <summary>What is added to the limit's values: the reference level, else 0.</summary>
    internal double Offset { get; }

    /// <summary>Suspect steps of the phase behind the curve; empty for levels.</summary>
    internal ReadOnlySpan<SuspectStep> SuspectSteps { get; }

    internal Absence? Reason { get; }

    internal static LimitedCurve Of(CurveLimit limit, Sweep run, Sweep? golden, GoldenRatio? ratio)
    {
        bool needsPhase = limit.Quantity != CurveQuantity.GainDb;
        if (needsPhase && !run.HasPhase)
            return new(new Absence(AbsenceCode.PhaseAbsent, "The run carries magnitude only; sweep it with phase."));
        if (limit.Basis == LimitBasis.Golden)
            return OfRatio(limit, golden, ratio);
        if (limit.Basis == LimitBasis.Reference)
        {
            var (level, reason) = ReferenceLevels.Resolve(run, limit.Reference!);
            return level is null ? new(reason!) : new(run.GainCurve, level.Value, default);
        }

        return limit.Quantity switch
        {
            CurveQuantity.GainDb => new(run.GainCurve, 0, default),
            CurveQuantity.PhaseDeg => new(run.PhaseCurve, 0, run.SuspectSteps),
            _ => new(run.DelayCurve, 0, run.SuspectSteps),
        };
    }

    private static LimitedCurve OfRatio(CurveLimit limit, Sweep? golden, GoldenRatio? ratio)
    {
        if (golden is null)
            return new(new Absence(AbsenceCode.NoGoldenRun, "The limit is relative to the golden run, and none is set; set one."));
        if (ratio is null)
            return new(new Absence(AbsenceCode.SpanTooShort, "The run and the golden run share no span; sweep the same frequencies."));
        if (limit.Quantity != CurveQuantity.GainDb && !golden.HasPhase)
            return new(new Absence(AbsenceCode.PhaseAbsent, "The golden run carries magnitude only; set one with phase."));
        return limit.Quantity switch
        {
            CurveQuantity.GainDb => new(new Curve(ratio.FrequencyHz, ratio.DifferenceDb), 0, default),
            CurveQuantity.PhaseDeg => new(new Curve(ratio.FrequencyHz, ratio.DifferenceDeg), 0, ratio.SuspectSteps),
            _ => new(new Curve(ratio.FrequencyHz, ratio.DelayDifferenceSeconds), 0, ratio.DelaySuspectSteps),
        };
    }
}

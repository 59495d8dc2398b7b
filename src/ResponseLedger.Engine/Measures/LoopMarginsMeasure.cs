using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Engine.Measures;

/// <summary>
/// Margins of an open-loop sweep against the critical phase (-180 or 0 degrees as the bench measures it): every gain crossover with its
/// signed phase margin, every phase crossover with its gain margin, and the least distance from the critical point.
/// phaseMarginDeg: the least in size, sign kept, and gainCrossoverHz its frequency. gainMarginDb: the least of 0 or more (the gain may rise by it);
/// gainReductionDb: the nearest below 0 (the gain may fall by it); phaseCrossoverHz belongs to gainMarginDb, or without one to gainReductionDb.
/// Absent where the sweep has no such crossover, or no phase. From a sweep alone stability is not claimed.
/// </summary>
internal sealed class LoopMarginsMeasure : Measure
{
    internal override MeasureDefinition Definition { get; } = new(
        "loopMargins",
        [new("criticalPhaseDeg", false, ParameterRange.CriticalPhase)],
        false,
        [
            new("phaseMarginDeg", "deg"), new("gainCrossoverHz", "Hz"), new("gainMarginDb", "dB"), new("gainReductionDb", "dB"),
            new("phaseCrossoverHz", "Hz"), new("leastDistance", "1"), new("leastDistanceHz", "Hz"),
        ]);

    internal override MeasureResult Evaluate(Sweep run, MeasureCall call, DeviceTraits device)
    {
        double criticalPhaseDeg = Optional(call, "criticalPhaseDeg") ?? device.CriticalPhaseDeg;
        var (gainCrossovers, unplacedHz) = LoopCrossovers.OfGain(run, criticalPhaseDeg);
        var phaseCrossovers = LoopCrossovers.OfPhase(run, criticalPhaseDeg);
        var (distance, distanceHz) = run.HasPhase ? LeastDistance.Of(run, criticalPhaseDeg) : (double.NaN, double.NaN);
        var least = LeastPhaseMargin(gainCrossovers);
        var increase = phaseCrossovers.Where(c => c.GainMarginDb >= 0).MinBy(c => c.GainMarginDb);
        var reduction = phaseCrossovers.Where(c => c.GainMarginDb < 0).MaxBy(c => c.GainMarginDb);

        var notes = new List<Absence>();
        if (unplacedHz is { } zeroHz)
            notes.Add(new Absence(AbsenceCode.ZeroGain, $"Above {Wording.Hz(zeroHz)} the loop gain passes 0 dB beside a gain of exactly zero; that crossover cannot be placed."));
        if (run.SuspectSteps.Length > 0)
            notes.Add(SuspectNote(run.SuspectSteps[0]));
        var found = Found(
            call,
            [
                least?.PhaseMarginDeg ?? double.NaN, least?.FrequencyHz ?? double.NaN,
                increase?.GainMarginDb ?? double.NaN, reduction?.GainMarginDb ?? double.NaN,
                (increase ?? reduction)?.FrequencyHz ?? double.NaN, distance, distanceHz,
            ],
            PhaseAbsent(run) ?? Missing(run, gainCrossovers, increase, reduction),
            notes);
        return found with { GainCrossovers = gainCrossovers, PhaseCrossovers = phaseCrossovers };
    }

    /// <summary>The least in size; of equals the negative one, then the lowest frequency. Without any phase: the crossover if it is the only one.</summary>
    private static GainCrossover? LeastPhaseMargin(List<GainCrossover> crossovers)
    {
        var least = crossovers
            .Where(c => c.PhaseMarginDeg is not null)
            .OrderBy(c => Math.Abs(c.PhaseMarginDeg!.Value))
            .ThenBy(c => c.PhaseMarginDeg!.Value)
            .FirstOrDefault();
        return least ?? (crossovers.Count == 1 ? crossovers[0] : null);
    }

    private static Absence Missing(Sweep run, List<GainCrossover> gainCrossovers, PhaseCrossover? increase, PhaseCrossover? reduction)
    {
        var missing = new List<string>();
        if (gainCrossovers.Count == 0)
            missing.Add("no gain crossover (0 dB)");
        if (increase is null && reduction is null)
            missing.Add("no phase crossover");
        else if (increase is null)
            missing.Add("no phase crossover at which the gain may rise");
        else if (reduction is null)
            missing.Add("no phase crossover at which the gain may fall");
        return missing.Count == 0
            ? PhaseAbsentNear(gainCrossovers[0].FrequencyHz)
            : new Absence(AbsenceCode.NoCrossover, $"From {Wording.Hz(run.FrequencyHz[0])} to {Wording.Hz(run.FrequencyHz[^1])} there is {string.Join(", and ", missing)}.");
    }
}

using ResponseLedger.Engine.Measures;
using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Engine.Masks;

/// <summary>Judges a run against a mask by simple acceptance: a margin of 0 or more passes.</summary>
public static class MaskEvaluator
{
    /// <summary>
    /// A margin under this size is rounding and counts as 0. It is in the criterion's unit, times its scale where that is under 1. A delay
    /// without a scale takes the largest bound that is stated for it in the scale's place: 1e-9 s is no rounding for one.
    /// </summary>
    public const double ZeroMargin = 1e-9;

    // A bound of zero has no size of its own.
    private const double SmallDelaySeconds = 1e-6;

    /// <summary>What is wrong with a mask before any run is seen, as (path, sentence) pairs such as <c>limits[0].corners[1].value</c>; empty when it can be released.</summary>
    public static IReadOnlyList<MaskProblem> ProblemsOf(Mask mask) => MaskCheck.ProblemsOf(mask);

    /// <summary>Evaluates every criterion of the mask on the run.</summary>
    /// <param name="run">The run.</param>
    /// <param name="golden">The golden run, or null where none is set: criteria relative to it are then inconclusive.</param>
    /// <param name="mask">A mask without problems.</param>
    /// <param name="device">What measures need to know of the device.</param>
    public static Evaluation Evaluate(Sweep run, Sweep? golden, Mask mask, DeviceTraits device)
    {
        ArgumentNullException.ThrowIfNull(run);
        ArgumentNullException.ThrowIfNull(mask);
        ArgumentNullException.ThrowIfNull(device);
        var criteria = new CriterionResult[mask.Limits.Count + mask.Requirements.Count];
        int next = 0;
        bool needsRatio = golden is not null && mask.Limits.Any(l => l.Basis == LimitBasis.Golden);
        var ratio = needsRatio ? GoldenRatio.Of(run, golden!) : null;
        double phaseTurnsDeg = PhaseTurns.Of(mask.Limits, run);
        foreach (var limit in mask.Limits)
            criteria[next++] = LimitEvaluator.Evaluate(limit, run, golden, ratio, phaseTurnsDeg);

        var measured = new Dictionary<string, MeasureResult>(StringComparer.Ordinal);
        var measures = new List<MeasureResult>();
        foreach (var requirement in mask.Requirements)
        {
            string key = RequirementEvaluator.KeyOf(requirement.Call);
            if (!measured.TryGetValue(key, out var result))
            {
                result = MeasureCatalogue.Evaluate(run, requirement.Call, device);
                measured.Add(key, result);
                measures.Add(result);
            }

            criteria[next++] = RequirementEvaluator.Evaluate(requirement, result, run.HasPhase);
        }

        int? worst = WorstOf(mask, criteria);
        return new Evaluation(worst is { } index ? criteria[index].Outcome : Outcome.Pass, worst, criteria, measures);
    }

    /// <summary>A margin with rounding taken off.</summary>
    internal static double Snap(double margin, double? scale)
        => Math.Abs(margin) < ZeroMargin * Math.Min(1, scale ?? 1) ? 0 : margin;

    /// <summary>What stands in for a scale that is not stated, where margins are rounded to 0: for seconds the size of the bound, else 1.</summary>
    internal static double UsualScale(string unit, double largestBound) => unit != "s" ? 1 : largestBound > 0 ? largestBound : SmallDelaySeconds;

    /// <summary>The worst outcome, then the least margin over scale; of equals the first.</summary>
    private static int? WorstOf(Mask mask, CriterionResult[] criteria)
    {
        int? worst = null;
        double worstSeverity = 0;
        for (int i = 0; i < criteria.Length; i++)
        {
            double scale = (i < mask.Limits.Count ? mask.Limits[i].Scale : mask.Requirements[i - mask.Limits.Count].Scale) ?? 1;
            double severity = SeverityOf(criteria[i], scale);
            if (worst is { } w && (criteria[i].Outcome < criteria[w].Outcome || criteria[i].Outcome == criteria[w].Outcome && severity >= worstSeverity))
                continue;
            (worst, worstSeverity) = (i, severity);
        }

        return worst;
    }

    /// <summary>Margin over scale; without a finite margin a failure is beyond every other, anything else behind.</summary>
    private static double SeverityOf(CriterionResult criterion, double scale)
        => criterion.Margin is { } margin ? margin / scale
            : criterion.Outcome == Outcome.Fail ? double.NegativeInfinity
            : double.PositiveInfinity;
}

/// <summary>One thing that is wrong with a mask.</summary>
/// <param name="Path">Where, in the API's notation.</param>
/// <param name="Sentence">What, and how to mend it.</param>
public sealed record MaskProblem(string Path, string Sentence);

using ResponseLedger.Engine.Measures;

namespace ResponseLedger.Engine.Masks;

/// <summary>The outcome of a criterion, a run or a unit, from best to worst.</summary>
public enum Outcome
{
    /// <summary>Every criterion is met.</summary>
    Pass = 0,

    /// <summary>Met, but inside the guard band.</summary>
    ConditionalPass = 1,

    /// <summary>Broken, but inside the guard band.</summary>
    ConditionalFail = 2,

    /// <summary>Could not be decided; the reason names the remedy.</summary>
    Inconclusive = 3,

    /// <summary>A criterion is broken.</summary>
    Fail = 4,
}

/// <summary>What one criterion came to.</summary>
/// <param name="Name">Name of the limit or requirement.</param>
/// <param name="Outcome">Its outcome.</param>
/// <param name="Margin">Distance to the limit in <paramref name="Unit"/>, positive inside; null where there is none (then a reason is given, or the gain is exactly zero).</param>
/// <param name="Unit">dB, deg, s, Hz, dB/decade or 1.</param>
/// <param name="FrequencyHz">Where the least margin lies, or null.</param>
/// <param name="Reason">Why the criterion is inconclusive or has no margin; on a failed one, what else could not be judged.</param>
/// <param name="Notes">Remarks that belong to the result, such as a suspect phase step in its span; null or empty for none.</param>
public sealed record CriterionResult(
    string Name,
    Outcome Outcome,
    double? Margin,
    string Unit,
    double? FrequencyHz,
    Absence? Reason,
    IReadOnlyList<Absence>? Notes = null);

/// <summary>What a run came to against a mask.</summary>
/// <param name="Outcome">The worst outcome of all criteria.</param>
/// <param name="WorstIndex">The criterion with the worst outcome, then the least margin over scale; null for a mask without criteria.</param>
/// <param name="Criteria">In the mask's order: limits, then requirements.</param>
/// <param name="Measures">What the requirements' measures found, one a distinct call.</param>
public sealed record Evaluation(
    Outcome Outcome,
    int? WorstIndex,
    IReadOnlyList<CriterionResult> Criteria,
    IReadOnlyList<MeasureResult> Measures);

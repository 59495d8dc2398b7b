using ResponseLedger.Engine.Masks;
using ResponseLedger.Records.Masks;
using ResponseLedger.Records.Strict;

namespace ResponseLedger.Records.Verdicts;

/// <summary>A verdict as one database row keeps it: numbers in the mask's order, without prose.</summary>
/// <param name="Outcome">The run's outcome.</param>
/// <param name="WorstIndex">The worst criterion; null for a mask without criteria.</param>
/// <param name="Margins">Margin of each criterion in its unit; null where there is none.</param>
/// <param name="Outcomes">Outcome of each criterion, as the number of <see cref="Engine.Masks.Outcome"/>.</param>
/// <param name="FrequenciesHz">Where the least margin lies; null where there is none.</param>
public sealed record StoredVerdict(Outcome Outcome, int? WorstIndex, double?[] Margins, short[] Outcomes, double?[] FrequenciesHz)
{
    /// <summary>The compact form of an evaluation.</summary>
    /// <exception cref="ArgumentException">A number is not finite.</exception>
    public static StoredVerdict From(Evaluation evaluation)
    {
        ArgumentNullException.ThrowIfNull(evaluation);
        return new StoredVerdict(
            evaluation.Outcome,
            evaluation.WorstIndex,
            [.. evaluation.Criteria.Select(c => JsonNumber.FiniteOrAbsent(c.Margin))],
            [.. evaluation.Criteria.Select(c => (short)c.Outcome)],
            [.. evaluation.Criteria.Select(c => JsonNumber.FiniteOrAbsent(c.FrequencyHz))]);
    }

    /// <summary>The worst criterion with its name and unit, without judging again; null for a mask without criteria.</summary>
    /// <exception cref="ArgumentException">The verdict is not of this mask.</exception>
    public static WorstCriterion? WorstOf(MaskDocument mask, StoredVerdict verdict)
    {
        ArgumentNullException.ThrowIfNull(mask);
        ArgumentNullException.ThrowIfNull(verdict);
        var criteria = mask.Mask.Limits.Count + mask.Mask.Requirements.Count;
        if (verdict.Margins.Length != criteria || verdict.Outcomes.Length != criteria || verdict.FrequenciesHz.Length != criteria)
            throw new ArgumentException($"The verdict has {verdict.Margins.Length} criteria, the mask {criteria}.", nameof(verdict));
        if (verdict.WorstIndex is not { } index)
            return null;

        var (name, unit) = CriterionNames.At(mask.Mask, index);
        return new WorstCriterion(name, (Outcome)verdict.Outcomes[index], verdict.FrequenciesHz[index], verdict.Margins[index], unit);
    }
}

/// <summary>The criterion that decided a verdict.</summary>
/// <param name="Criterion">Name of the limit or requirement.</param>
/// <param name="Outcome">Its outcome.</param>
/// <param name="FrequencyHz">Where its least margin lies, or null.</param>
/// <param name="Margin">Its margin in <paramref name="Unit"/>, or null.</param>
/// <param name="Unit">dB, deg, s, Hz, dB/decade or 1.</param>
public sealed record WorstCriterion(string Criterion, Outcome Outcome, double? FrequencyHz, double? Margin, string Unit);

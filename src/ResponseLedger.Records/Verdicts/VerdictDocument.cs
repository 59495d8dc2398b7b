using System.Text.Json.Nodes;
using ResponseLedger.Engine.Masks;
using ResponseLedger.Engine.Measures;
using ResponseLedger.Records.Masks;
using ResponseLedger.Records.Measures;
using ResponseLedger.Records.Strict;

namespace ResponseLedger.Records.Verdicts;

/// <summary>A verdict as people and programs read it, in JSON.</summary>
public static class VerdictDocument
{
    /// <summary>Writes <c>{outcome, worst, criteria, measures, maskRevision, engine}</c>; codes stand in <c>reason</c>, sentences in <c>explanation</c>; a criterion with remarks has <c>notes</c>.</summary>
    /// <param name="evaluation">The evaluation, by this mask.</param>
    /// <param name="mask">The mask, whose requirements name the measures.</param>
    /// <param name="maskRevision">Number of the released revision.</param>
    /// <param name="engineVersion">The engine version that computed it.</param>
    /// <exception cref="ArgumentException">A number is not finite, or the evaluation lacks a measure of the mask.</exception>
    public static JsonObject Write(Evaluation evaluation, MaskDocument mask, int maskRevision, int engineVersion)
    {
        ArgumentNullException.ThrowIfNull(evaluation);
        ArgumentNullException.ThrowIfNull(mask);
        return new JsonObject
        {
            ["outcome"] = OutcomeWords.Format(evaluation.Outcome),
            ["worst"] = evaluation.WorstIndex is { } index ? WriteWorst(evaluation.Criteria[index]) : null,
            ["criteria"] = new JsonArray([.. evaluation.Criteria.Select(WriteCriterion)]),
            ["measures"] = WriteMeasures(evaluation, mask.Mask),
            ["maskRevision"] = maskRevision,
            ["engine"] = engineVersion,
        };
    }

    /// <summary>Writes <c>{criterion, outcome, frequencyHz, margin, unit}</c> as lists show it.</summary>
    public static JsonObject Write(WorstCriterion worst)
    {
        ArgumentNullException.ThrowIfNull(worst);
        return new JsonObject
        {
            ["criterion"] = worst.Criterion,
            ["outcome"] = OutcomeWords.Format(worst.Outcome),
            ["frequencyHz"] = JsonNumber.Of(worst.FrequencyHz),
            ["margin"] = JsonNumber.Of(worst.Margin),
            ["unit"] = worst.Unit,
        };
    }

    private static JsonObject WriteWorst(CriterionResult worst)
    {
        var json = Write(new WorstCriterion(worst.Name, worst.Outcome, worst.FrequencyHz, worst.Margin, worst.Unit));
        AddReason(json, worst);
        return json;
    }

    private static JsonObject WriteCriterion(CriterionResult criterion)
    {
        var json = new JsonObject
        {
            ["name"] = criterion.Name,
            ["outcome"] = OutcomeWords.Format(criterion.Outcome),
            ["margin"] = JsonNumber.Of(criterion.Margin),
            ["unit"] = criterion.Unit,
            ["frequencyHz"] = JsonNumber.Of(criterion.FrequencyHz),
        };
        AddReason(json, criterion);
        if (criterion.Notes is { Count: > 0 } notes)
            json["notes"] = MeasureCallJson.WriteNotes(notes);
        return json;
    }

    private static void AddReason(JsonObject json, CriterionResult criterion)
    {
        json["reason"] = criterion.Reason?.Code;
        json["explanation"] = criterion.Reason?.Sentence;
    }

    private static JsonObject WriteMeasures(Evaluation evaluation, Mask mask)
    {
        // Requirements share the result of an equal call, so results are found by what was asked.
        var results = new Dictionary<string, MeasureResult>(StringComparer.Ordinal);
        foreach (var result in evaluation.Measures)
            results.TryAdd(MeasureCallJson.KeyOf(result.Call), result);
        var json = new JsonObject();
        foreach (var requirement in mask.Requirements)
        {
            if (!results.TryGetValue(MeasureCallJson.KeyOf(requirement.Call), out var found))
                throw new ArgumentException($"The evaluation has no measure for the requirement {requirement.Name}.", nameof(evaluation));
            json[requirement.Name] = MeasureCallJson.Write(found);
        }

        return json;
    }
}

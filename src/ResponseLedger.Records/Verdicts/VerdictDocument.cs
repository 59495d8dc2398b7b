using System.Text.Json.Nodes;
using ResponseLedger.Engine.Masks;
using ResponseLedger.Records.Masks;

namespace ResponseLedger.Records.Verdicts;

/// <summary>A verdict as people and programs read it, in JSON.</summary>
public static class VerdictDocument
{
    /// <summary>Writes <c>{outcome, worst, criteria, measures, maskRevision, engine}</c>; codes stand in <c>reason</c>, sentences in <c>explanation</c>.</summary>
    /// <param name="evaluation">The evaluation, by this mask.</param>
    /// <param name="mask">The mask, whose requirements name the measures.</param>
    /// <param name="maskRevision">Number of the released revision.</param>
    /// <param name="engineVersion">The engine version that computed it.</param>
    public static JsonObject Write(Evaluation evaluation, MaskDocument mask, int maskRevision, int engineVersion)
        => throw new NotImplementedException();

    /// <summary>Writes <c>{criterion, outcome, frequencyHz, margin, unit}</c> as lists show it.</summary>
    public static JsonObject Write(WorstCriterion worst) => throw new NotImplementedException();
}

using ResponseLedger.Engine.Masks;
using ResponseLedger.Engine.Measures;
using ResponseLedger.Engine.Sweeps;
using ResponseLedger.Records.Masks;

namespace ResponseLedger.Records.Verdicts;

/// <summary>What a run is judged by.</summary>
/// <param name="Mask">The released mask revision.</param>
/// <param name="Golden">The golden run of the condition, or null where none is set.</param>
/// <param name="Device">What measures need to know of the device.</param>
public sealed record JudgementBasis(MaskRevisionDocument Mask, Sweep? Golden, DeviceTraits Device);

/// <summary>What a run came to, in full and as it is stored.</summary>
/// <param name="Evaluation">Every criterion with its reason, and every measure.</param>
/// <param name="Stored">The compact form for the database.</param>
public sealed record Judgement(Evaluation Evaluation, StoredVerdict Stored);

/// <summary>The one place where a run is judged: intake, re-evaluation and trial evaluation all come through here.</summary>
public static class Judge
{
    /// <summary>The engine version that a judgement of this build carries.</summary>
    public static int EngineVersion => Engine.EngineVersion.Current;

    /// <summary>Judges a run by its basis.</summary>
    public static Judgement Evaluate(Sweep run, JudgementBasis basis)
    {
        ArgumentNullException.ThrowIfNull(run);
        ArgumentNullException.ThrowIfNull(basis);
        var evaluation = MaskEvaluator.Evaluate(run, basis.Golden, basis.Mask.Mask.Mask, basis.Device);
        return new Judgement(evaluation, StoredVerdict.From(evaluation));
    }
}

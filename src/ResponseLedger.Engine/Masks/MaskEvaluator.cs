using ResponseLedger.Engine.Measures;
using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Engine.Masks;

/// <summary>Judges a run against a mask.</summary>
public static class MaskEvaluator
{
    /// <summary>What is wrong with a mask before any run is seen, as (path, sentence) pairs such as <c>limits[0].corners[1].value</c>; empty when it can be released.</summary>
    public static IReadOnlyList<MaskProblem> ProblemsOf(Mask mask) => throw new NotImplementedException();

    /// <summary>Evaluates every criterion of the mask on the run.</summary>
    /// <param name="run">The run.</param>
    /// <param name="golden">The golden run, or null where none is set: criteria relative to it are then inconclusive.</param>
    /// <param name="mask">A mask without problems.</param>
    /// <param name="device">What measures need to know of the device.</param>
    public static Evaluation Evaluate(Sweep run, Sweep? golden, Mask mask, DeviceTraits device) => throw new NotImplementedException();
}

/// <summary>One thing that is wrong with a mask.</summary>
/// <param name="Path">Where, in the API's notation.</param>
/// <param name="Sentence">What, and how to mend it.</param>
public sealed record MaskProblem(string Path, string Sentence);

using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Engine.Measures;

/// <summary>Every measure by its name: what it takes, what it gives, and the way to compute it.</summary>
public static class MeasureCatalogue
{
    private static readonly Measure[] Measures =
    [
        new LevelMeasure(),
        new PhaseMeasure(),
        new DelayMeasure(),
        new PeakMeasure(),
        new BandwidthMeasure(),
        new ShapeFactorMeasure(),
        new RippleMeasure(),
        new AttenuationMeasure(),
        new SlopeMeasure(),
        new LoopMarginsMeasure(),
    ];

    private static readonly Dictionary<string, Measure> ByName = Measures.ToDictionary(m => m.Definition.Name, StringComparer.Ordinal);

    /// <summary>All measures, in the order in which screens list them.</summary>
    public static IReadOnlyList<MeasureDefinition> All { get; } = Array.AsReadOnly(Array.ConvertAll(Measures, m => m.Definition));

    /// <summary>The definition of a measure; null for an unknown name.</summary>
    public static MeasureDefinition? Find(string name) => ByName.GetValueOrDefault(name)?.Definition;

    /// <summary>What is wrong with a call before any run is seen; empty when it can be computed.</summary>
    public static IReadOnlyList<string> ProblemsOf(MeasureCall call) => MeasureCallCheck.ProblemsOf(call).ConvertAll(p => p.Sentence);

    /// <summary>The same problems, each with its place in the call.</summary>
    public static IReadOnlyList<MeasureProblem> LocatedProblemsOf(MeasureCall call) => MeasureCallCheck.ProblemsOf(call);

    /// <summary>Computes a measure. A call with problems throws; a run that lacks what the measure needs gives absent outputs with a reason.</summary>
    /// <exception cref="ArgumentException">The call has problems.</exception>
    public static MeasureResult Evaluate(Sweep run, MeasureCall call, DeviceTraits device)
    {
        ArgumentNullException.ThrowIfNull(run);
        ArgumentNullException.ThrowIfNull(device);
        var problems = MeasureCallCheck.ProblemsOf(call);
        Preconditions.Require(problems.Count == 0, nameof(call), string.Join(" ", problems.Select(p => p.Sentence)));
        return ByName[call.Measure].Evaluate(run, call, device);
    }
}

using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Engine.Measures;

/// <summary>Every measure by its name: what it takes, what it gives, and the way to compute it.</summary>
public static class MeasureCatalogue
{
    /// <summary>All measures, in the order in which screens list them.</summary>
    public static IReadOnlyList<MeasureDefinition> All => throw new NotImplementedException();

    /// <summary>What is wrong with a call before any run is seen; empty when it can be computed.</summary>
    public static IReadOnlyList<string> ProblemsOf(MeasureCall call) => throw new NotImplementedException();

    /// <summary>Computes a measure. A call with problems throws; a run that lacks what the measure needs gives absent outputs with a reason.</summary>
    /// <exception cref="ArgumentException">The call has problems.</exception>
    public static MeasureResult Evaluate(Sweep run, MeasureCall call, DeviceTraits device) => throw new NotImplementedException();
}

namespace ResponseLedger.Engine;

/// <summary>
/// The version of the numbers. It is raised by hand when any measure or margin may come out differently,
/// and a golden-values test fails until it is.
/// </summary>
public static class EngineVersion
{
    /// <summary>The version that this build computes with; it is pinned in every verdict and decision.</summary>
    public const int Current = 1;
}

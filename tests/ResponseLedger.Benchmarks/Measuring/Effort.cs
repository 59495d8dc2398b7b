namespace ResponseLedger.Benchmarks.Measuring;

/// <summary>How long to measure: in full, or in the short form that every check of the project runs.</summary>
internal sealed record Effort(bool IsShort)
{
    /// <summary>Picks by the form.</summary>
    public T Of<T>(T full, T brief) => IsShort ? brief : full;
}

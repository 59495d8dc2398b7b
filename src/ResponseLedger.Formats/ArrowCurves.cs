namespace ResponseLedger.Formats;

/// <summary>One run of an overlay as it is written to Arrow.</summary>
/// <param name="RunId">The run.</param>
/// <param name="Serial">The unit's serial number.</param>
/// <param name="Outcome">The verdict's outcome, as the API names it; empty where there is none.</param>
/// <param name="Values">One value a frequency; null where it is absent.</param>
public sealed record ArrowCurve(string RunId, string Serial, string Outcome, IReadOnlyList<double?> Values);

/// <summary>Writes an overlay as an Arrow IPC stream: a column of frequencies and a float64 column a run.</summary>
public static class ArrowCurves
{
    /// <summary>Writes the overlay; the stream stays open.</summary>
    public static void Write(Stream output, string quantity, string unit, IReadOnlyList<double> frequencyHz, IReadOnlyList<ArrowCurve> curves)
        => throw new NotImplementedException();
}

namespace ResponseLedger.Formats;

/// <summary>Reads a sweep file of a bench: delimited text in any common dialect, or Touchstone 1.1 and 2.0.</summary>
public static class SweepFileReader
{
    /// <summary>Raised by hand when the same bytes may give another sweep.</summary>
    public const int Version = 1;

    /// <summary>How many issues a reading lists; the rest is only counted.</summary>
    public const int MostIssuesListed = 50;

    /// <summary>The most points that a file may hold.</summary>
    public const int MostPoints = 2_000_000;

    /// <summary>Reads a file. Any content gives a reading; none throws.</summary>
    /// <param name="content">The bytes as they came.</param>
    /// <param name="fileName">The file's name; only its extension is looked at (.s1p, .s2p, ..., .ts).</param>
    /// <param name="chosen">What the columns hold or which parameter is meant, where the file alone does not say or says it otherwise.</param>
    /// <param name="ct">Stops the reading of a large file.</param>
    /// <exception cref="OperationCanceledException">The reading was stopped.</exception>
    public static FileReading Read(ReadOnlyMemory<byte> content, string fileName, ColumnChoices? chosen = null, CancellationToken ct = default)
        => throw new NotImplementedException();
}

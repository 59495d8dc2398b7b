using ResponseLedger.Formats.Delimited;
using ResponseLedger.Formats.Text;
using ResponseLedger.Formats.Touchstone;

namespace ResponseLedger.Formats;

/// <summary>Reads a sweep file of a bench: delimited text in any common dialect, or Touchstone 1.1 and 2.0.</summary>
public static class SweepFileReader
{
    /// <summary>Raised by hand when the same bytes may give another sweep; a test over fixed files tells when.</summary>
    public const int Version = 2;

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
    {
        ArgumentNullException.ThrowIfNull(fileName);
        ct.ThrowIfCancellationRequested();
        bool touchstone = TouchstoneName.Recognises(fileName, out int? ports);
        DecodedText text = DecodedText.Of(content.Span);
        touchstone |= text.Issue is null && TouchstoneName.RecognisesContent(text.Characters);
        if (text.Issue is { } issue)
            return new FileReading(null, touchstone ? TouchstoneReader.Name : DelimitedReader.Name, Version, [], null, null, [], [], [issue], 1);
        return touchstone ? TouchstoneReader.Read(text, ports, chosen?.Parameter, ct) : DelimitedReader.Read(text, chosen, ct);
    }
}

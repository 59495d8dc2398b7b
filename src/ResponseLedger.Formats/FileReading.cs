using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Formats;

/// <summary>What came of reading one file: a sweep, or the reasons why there is none.</summary>
/// <param name="Sweep">The sweep in the file's own pair of quantities; null exactly when the file is refused.</param>
/// <param name="Reader">Which reader took the file: <c>delimited</c> or <c>touchstone</c>.</param>
/// <param name="ReaderVersion">Its version: the same bytes, choices and version give the same sweep.</param>
/// <param name="Columns">The columns of a delimited file; empty for Touchstone.</param>
/// <param name="HeadsDigest">SHA-256 (lower-case hex) of the normalised heads, by which choices can be remembered; null without heads.</param>
/// <param name="Choices">What was used: given back to the reader it gives the same sweep. Null when refused.</param>
/// <param name="Candidates">The complete choices to pick from when the columns are open; empty otherwise.</param>
/// <param name="Notes">What was settled.</param>
/// <param name="Issues">Why the file is refused, the first <see cref="SweepFileReader.MostIssuesListed"/> in the order of lines; empty when it is taken.</param>
/// <param name="IssueCount">How many issues there are, those not listed included.</param>
public sealed record FileReading(
    Sweep? Sweep,
    string Reader,
    int ReaderVersion,
    IReadOnlyList<FoundColumn> Columns,
    string? HeadsDigest,
    ColumnChoices? Choices,
    IReadOnlyList<ColumnChoices> Candidates,
    IReadOnlyList<ReadNote> Notes,
    IReadOnlyList<ReadIssue> Issues,
    int IssueCount);

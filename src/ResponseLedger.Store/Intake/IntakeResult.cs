using ResponseLedger.Formats;
using ResponseLedger.Records.Verdicts;

namespace ResponseLedger.Store.Intake;

/// <summary>What became of a file.</summary>
public enum IntakeOutcome
{
    /// <summary>It is a run now.</summary>
    Accepted = 1,

    /// <summary>The same bytes for the same unit, lot and purpose were taken before; nothing changed.</summary>
    Duplicate = 2,

    /// <summary>It was not taken, and nothing of it is kept.</summary>
    Refused = 3,
}

/// <summary>What became of one file of an upload.</summary>
/// <param name="FileName">The file's name.</param>
/// <param name="Serial">The serial number it was taken for, or null where none was found.</param>
/// <param name="Outcome">Accepted, duplicate or refused.</param>
/// <param name="RunId">The run; for a duplicate the first one; null when refused.</param>
/// <param name="Judged">What the run came to; null without a released mask, for a duplicate, and when refused.</param>
/// <param name="Notes">What was settled and what to know.</param>
/// <param name="Issues">Why the file was refused.</param>
/// <param name="Candidates">The column choices to pick from when the columns are open.</param>
public sealed record IntakeResult(
    string FileName,
    string? Serial,
    IntakeOutcome Outcome,
    Guid? RunId,
    IntakeVerdict? Judged,
    IReadOnlyList<ReadNote> Notes,
    IReadOnlyList<ReadIssue> Issues,
    IReadOnlyList<ColumnChoices> Candidates)
{
    /// <summary>A refusal of the whole file with one reason.</summary>
    public static IntakeResult Refused(string fileName, string? serial, string code, string message)
        => new(fileName, serial, IntakeOutcome.Refused, null, null, [], [new ReadIssue(null, null, code, message)], []);

    /// <summary>A refusal by the reader.</summary>
    public static IntakeResult Refused(string fileName, string serial, FileReading reading)
        => new(fileName, serial, IntakeOutcome.Refused, null, null, reading.Notes, reading.Issues, reading.Candidates);

    /// <summary>The same bytes again.</summary>
    public static IntakeResult Duplicate(string fileName, string serial, Guid firstRunId, bool placedElsewhere)
        => new(fileName, serial, IntakeOutcome.Duplicate, firstRunId, null, placedElsewhere ? [IntakeNotes.PlacedElsewhere] : [], [], []);
}

/// <summary>A run's judgement with what it rests on.</summary>
/// <param name="Judgement">The judgement.</param>
/// <param name="Basis">What the run was judged by.</param>
public sealed record IntakeVerdict(Judgement Judgement, JudgementBasis Basis);

using System.Text.Json.Nodes;
using ResponseLedger.Engine.Masks;
using ResponseLedger.Formats;
using ResponseLedger.Records.Verdicts;
using ResponseLedger.Store.Intake;
using ResponseLedger.Store.Judging;

namespace ResponseLedger.Server.Runs.Upload;

/// <summary>The answer to an upload.</summary>
/// <param name="Results">One entry a file, in the order in which the files came.</param>
internal sealed record UploadAnswer(IReadOnlyList<UploadResult> Results)
{
    /// <summary>201 when any file was accepted, else 200 when any was a duplicate, else 422.</summary>
    public int Status => Has(IntakeOutcome.Accepted) ? StatusCodes.Status201Created
        : Has(IntakeOutcome.Duplicate) ? StatusCodes.Status200OK
        : StatusCodes.Status422UnprocessableEntity;

    private bool Has(IntakeOutcome outcome) => Results.Any(r => r.Outcome == outcome);
}

/// <summary>What became of one file.</summary>
/// <param name="FileName">Its name.</param>
/// <param name="Outcome">accepted, duplicate or refused.</param>
/// <param name="RunId">The run; for a duplicate the first one; null when refused.</param>
/// <param name="Serial">The serial number it was taken for; null where none was found.</param>
/// <param name="Verdict">The verdict, or null.</param>
/// <param name="VerdictReason">Why a run has no verdict: noReleasedMask; null when it has one or there is no run.</param>
/// <param name="Notes">What was settled, and what to know.</param>
/// <param name="Issues">Why it was refused.</param>
/// <param name="Candidates">When the columns are open: complete choices, one of which can be sent as <c>columns</c>.</param>
internal sealed record UploadResult(
    string FileName,
    IntakeOutcome Outcome,
    Guid? RunId,
    string? Serial,
    JsonObject? Verdict,
    string? VerdictReason,
    IReadOnlyList<ReadNote> Notes,
    IReadOnlyList<ReadIssue> Issues,
    IReadOnlyList<JsonNode> Candidates)
{
    public const string NoReleasedMask = "noReleasedMask";

    /// <summary>A file as the API tells it.</summary>
    /// <param name="result">What became of it.</param>
    /// <param name="first">For a duplicate: the verdict of the first run.</param>
    /// <param name="notes">What the whole upload has to tell.</param>
    public static UploadResult Of(IntakeResult result, RunVerdict? first, IEnumerable<ReadNote> notes)
    {
        var verdict = result.Judged is { } judged ? Write(judged.Judgement.Evaluation, judged.Basis, Judge.EngineVersion)
            : first is not null ? Write(first.Evaluation, first.Basis, first.EngineVersion)
            : null;
        return new UploadResult(
            result.FileName, result.Outcome, result.RunId, result.Serial, verdict,
            result.RunId is not null && verdict is null ? NoReleasedMask : null,
            [.. notes, .. result.Notes], result.Issues, Choices(result.Candidates));
    }

    /// <summary>Column choices as they can be sent back.</summary>
    public static IReadOnlyList<JsonNode> Choices(IEnumerable<ColumnChoices> candidates) => [.. candidates.Select(c => JsonNode.Parse(c.ToJson())!)];

    private static JsonObject Write(Evaluation evaluation, JudgementBasis basis, int engineVersion)
        => VerdictDocument.Write(evaluation, basis.Mask.Mask, basis.Mask.Revision, engineVersion);
}

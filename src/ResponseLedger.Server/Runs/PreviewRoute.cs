using System.Text.Json.Nodes;
using Microsoft.AspNetCore.Http.HttpResults;
using ResponseLedger.Formats;
using ResponseLedger.Server.Http;
using ResponseLedger.Server.Runs.Upload;

namespace ResponseLedger.Server.Runs;

/// <summary>What a file would be read as.</summary>
/// <param name="FileName">Its name.</param>
/// <param name="Serial">The serial number that its name would give, by the usual rule; null where there is none.</param>
/// <param name="Reader">delimited or touchstone.</param>
/// <param name="Columns">What each column was taken for.</param>
/// <param name="HeadsDigest">By which a bench knows files with the same heads; null without heads.</param>
/// <param name="Choices">The choices used, as they could be sent back; null when refused.</param>
/// <param name="Notes">What was settled.</param>
/// <param name="Issues">Why it would be refused.</param>
/// <param name="IssueCount">How many issues there are, those not listed included.</param>
/// <param name="Candidates">When the columns are open: complete choices to pick from.</param>
/// <param name="Points">How many points the file has; null when refused.</param>
/// <param name="Trace">At most 400 points; null when refused.</param>
internal sealed record PreviewView(
    string FileName, string? Serial, string Reader, IReadOnlyList<FoundColumn> Columns, string? HeadsDigest, JsonNode? Choices, IReadOnlyList<ReadNote> Notes,
    IReadOnlyList<ReadIssue> Issues, int IssueCount, IReadOnlyList<JsonNode> Candidates, int? Points, TraceView? Trace);

/// <summary>The form of a preview, for the description of the API alone.</summary>
internal sealed record PreviewDocument(IFormFile File, string? Columns);

/// <summary>POST /api/runs/preview: reads a file and stores nothing.</summary>
internal static class PreviewRoute
{
    private const int MostPoints = 400;

    private static readonly string[] Fields = ["columns"];

    public static async Task<Ok<PreviewView>> HandleAsync(HttpRequest request, CancellationToken cancellationToken)
    {
        await using var form = await UploadForm.ReadAsync(request, Fields, cancellationToken);
        if (form.Files.Count != 1)
            throw new RefusedException(new FieldRefused("file", "A preview reads one file."));
        ColumnChoices? chosen = null;
        if (form.Fields.GetValueOrDefault("columns") is { Length: > 0 } text && !ColumnChoices.TryParse(text, out chosen, out var problem))
            throw new RefusedException(new FieldRefused("columns", problem!));
        var file = form.Files[0];
        if (file.IsTooLarge)
            throw new RefusedException(new FieldRefused("file", $"The file is larger than {SpooledFile.LargestWords}."));

        var reading = SweepFileReader.Read(await file.BytesAsync(cancellationToken), file.Name, chosen, cancellationToken);
        return TypedResults.Ok(new PreviewView(
            file.Name, SerialNumber.In(file.Name, null), reading.Reader, reading.Columns, reading.HeadsDigest,
            reading.Choices is null ? null : JsonNode.Parse(reading.Choices.ToJson()), reading.Notes, reading.Issues, reading.IssueCount,
            UploadResult.Choices(reading.Candidates), reading.Sweep?.Count, reading.Sweep is null ? null : TraceView.Of(reading.Sweep, MostPoints, [])));
    }
}

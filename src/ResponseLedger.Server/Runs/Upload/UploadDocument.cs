namespace ResponseLedger.Server.Runs.Upload;

/// <summary>The form of an upload, for the description of the API alone; the request is read as a stream.</summary>
internal sealed record UploadDocument(
    IFormFileCollection File, string? Device, string? Lot, string? Bench, string? Serial, string? Purpose, string? Condition, string? MeasuredAt,
    string? Columns, string? Circumstances, string? Acknowledge);

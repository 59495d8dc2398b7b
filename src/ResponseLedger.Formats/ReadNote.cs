namespace ResponseLedger.Formats;

/// <summary>Something that the reader settled by itself and tells back: the delimiter, the units, that rows were sorted.</summary>
/// <param name="Code">A stable camelCase word, such as <c>delimiter</c> or <c>rowsSorted</c>.</param>
/// <param name="Message">What was settled, for people.</param>
public sealed record ReadNote(string Code, string Message);

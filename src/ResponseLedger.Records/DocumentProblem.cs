namespace ResponseLedger.Records;

/// <summary>One thing that is wrong with a document that came as JSON.</summary>
/// <param name="Path">Where, such as <c>limits[0].corners[1].value</c>; empty for the document itself.</param>
/// <param name="Sentence">What is wrong and what was expected.</param>
public sealed record DocumentProblem(string Path, string Sentence);

namespace ResponseLedger.Formats;

/// <summary>One reason why a file is refused: where it stands, what is wrong and how to mend it.</summary>
/// <param name="Line">The 1-based line of the file, comment and blank lines counted; null when the whole file is meant.</param>
/// <param name="Column">Delimited text: the 1-based field of the line. Touchstone: the 1-based character at which the token begins. Null when the whole line is meant.</param>
/// <param name="Code">A stable camelCase word of <see cref="ReadCodes"/>.</param>
/// <param name="Message">What is wrong and how to mend it, for people.</param>
public sealed record ReadIssue(int? Line, int? Column, string Code, string Message);

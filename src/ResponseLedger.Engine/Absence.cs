namespace ResponseLedger.Engine;

/// <summary>Why a value is absent, or why a criterion could not be decided: a stable code for programs, a sentence for people.</summary>
/// <param name="Code">A stable camelCase word, such as <c>notReached</c> or <c>phaseAbsent</c>.</param>
/// <param name="Sentence">What happened and, where there is one, the remedy; with numbers and units.</param>
public sealed record Absence(string Code, string Sentence);

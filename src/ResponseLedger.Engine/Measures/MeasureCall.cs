namespace ResponseLedger.Engine.Measures;

/// <summary>One measure with its parameters, as a mask's requirement or a person asks for it.</summary>
/// <param name="Measure">Name in <see cref="MeasureCatalogue"/>, such as <c>bandwidth</c>.</param>
/// <param name="Parameters">Numbers by parameter name, such as <c>dropDb</c>; units stand in the names.</param>
/// <param name="Reference">The reference level, where the measure takes one.</param>
public sealed record MeasureCall(string Measure, IReadOnlyDictionary<string, double> Parameters, ReferenceLevel? Reference = null);

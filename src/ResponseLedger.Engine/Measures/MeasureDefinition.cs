namespace ResponseLedger.Engine.Measures;

/// <summary>What a measure takes and gives.</summary>
/// <param name="Name">The word used in masks and the API.</param>
/// <param name="Parameters">Numbers it takes.</param>
/// <param name="TakesReference">Whether it needs a reference level.</param>
/// <param name="Outputs">Scalars it gives, in order.</param>
public sealed record MeasureDefinition(
    string Name,
    IReadOnlyList<MeasureParameter> Parameters,
    bool TakesReference,
    IReadOnlyList<MeasureOutput> Outputs);

/// <summary>A number that a measure takes.</summary>
/// <param name="Name">Its name with the unit in it.</param>
/// <param name="Required">Whether it must be given.</param>
public sealed record MeasureParameter(string Name, bool Required);

/// <summary>A scalar that a measure gives.</summary>
/// <param name="Name">Its name.</param>
/// <param name="Unit">Its unit: dB, deg, Hz, s, dB/decade, or 1 for a plain number.</param>
public sealed record MeasureOutput(string Name, string Unit);

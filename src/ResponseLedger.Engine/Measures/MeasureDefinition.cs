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
/// <param name="Range">Which finite values it takes.</param>
public sealed record MeasureParameter(string Name, bool Required, ParameterRange Range = ParameterRange.Positive);

/// <summary>Which finite values a parameter takes.</summary>
public enum ParameterRange
{
    /// <summary>Above 0.</summary>
    Positive = 1,

    /// <summary>Above 1.</summary>
    AboveOne = 2,

    /// <summary>-180 or 0.</summary>
    CriticalPhase = 3,
}

/// <summary>A scalar that a measure gives.</summary>
/// <param name="Name">Its name.</param>
/// <param name="Unit">Its unit: dB, deg, Hz, s, dB/decade, dB/octave, or 1 for a plain number.</param>
public sealed record MeasureOutput(string Name, string Unit);

/// <summary>One thing that is wrong with a call.</summary>
/// <param name="Path">Where, in the API's notation relative to the call, such as <c>parameters.dropDb</c>.</param>
/// <param name="Sentence">What, and how to mend it.</param>
public sealed record MeasureProblem(string Path, string Sentence);

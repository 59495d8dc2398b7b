namespace ResponseLedger.Engine.Measures;

/// <summary>What a measure found. Every value is finite or absent; where any is absent a reason is given.</summary>
/// <param name="Call">What was asked.</param>
/// <param name="Outputs">Values in the order of the definition's outputs.</param>
/// <param name="Reason">Why outputs are absent; null when none is.</param>
/// <param name="Notes">Remarks that belong to the numbers, such as a suspect phase step inside the span.</param>
/// <param name="GainCrossovers">Every gain crossover, ascending, for <c>loopMargins</c>; else empty.</param>
/// <param name="PhaseCrossovers">Every phase crossover, ascending, for <c>loopMargins</c>; else empty.</param>
public sealed record MeasureResult(
    MeasureCall Call,
    IReadOnlyList<MeasuredValue> Outputs,
    Absence? Reason,
    IReadOnlyList<Absence> Notes,
    IReadOnlyList<GainCrossover> GainCrossovers,
    IReadOnlyList<PhaseCrossover> PhaseCrossovers);

/// <summary>One scalar result.</summary>
/// <param name="Name">Name of the output.</param>
/// <param name="Value">Its value in <paramref name="Unit"/>, or null when absent.</param>
/// <param name="Unit">Its unit.</param>
public sealed record MeasuredValue(string Name, double? Value, string Unit);

/// <summary>Where the loop gain passes 0 dB.</summary>
/// <param name="FrequencyHz">In Hz.</param>
/// <param name="PhaseMarginDeg">Signed distance of the phase from the critical one, in (-180, 180] degrees; null where phase is absent.</param>
public sealed record GainCrossover(double FrequencyHz, double? PhaseMarginDeg);

/// <summary>Where the phase passes the critical phase.</summary>
/// <param name="FrequencyHz">In Hz.</param>
/// <param name="GainMarginDb">Minus the level there, in dB: above 0 the gain may rise by it, below 0 it may fall by it.</param>
public sealed record PhaseCrossover(double FrequencyHz, double GainMarginDb);

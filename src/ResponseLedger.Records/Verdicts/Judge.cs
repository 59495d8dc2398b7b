using ResponseLedger.Engine.Masks;
using ResponseLedger.Engine.Measures;
using ResponseLedger.Engine.Sweeps;
using ResponseLedger.Formats;
using ResponseLedger.Records.Masks;

namespace ResponseLedger.Records.Verdicts;

/// <summary>What a run is judged by.</summary>
/// <param name="Mask">The released mask revision.</param>
/// <param name="Golden">The golden run of the condition, or null where none is set.</param>
/// <param name="Device">What measures need to know of the device.</param>
public sealed record JudgementBasis(MaskRevisionDocument Mask, Sweep? Golden, DeviceTraits Device);

/// <summary>What a run came to, in full and as it is stored.</summary>
/// <param name="Evaluation">Every criterion with its reason, and every measure.</param>
/// <param name="Stored">The compact form for the database.</param>
public sealed record Judgement(Evaluation Evaluation, StoredVerdict Stored);

/// <summary>What a file came to.</summary>
/// <param name="Reading">The sweep with what was settled on the way, or the issues why the file is refused.</param>
/// <param name="Judgement">What the run came to; null where the file is refused or there is no basis (no released mask).</param>
public sealed record FileJudgement(FileReading Reading, Judgement? Judgement);

/// <summary>The one place where a run is judged: intake, re-evaluation and trial evaluation all come through here.</summary>
public static class Judge
{
    /// <summary>The engine version that a judgement of this build carries.</summary>
    public static int EngineVersion => Engine.EngineVersion.Current;

    /// <summary>Reads a file of a bench. Any content gives a reading; a refused file has issues and no sweep.</summary>
    /// <param name="content">The bytes as they came.</param>
    /// <param name="fileName">The file's name.</param>
    /// <param name="choices">What the columns hold, where the file alone does not say.</param>
    /// <param name="ct">Stops the reading of a large file.</param>
    /// <exception cref="OperationCanceledException">The reading was stopped.</exception>
    public static FileReading Read(ReadOnlyMemory<byte> content, string fileName, ColumnChoices? choices, CancellationToken ct = default)
        => SweepFileReader.Read(content, fileName, choices, ct);

    /// <summary>Reads a file and judges its run: file, reading, basis and verdict on one path.</summary>
    /// <param name="content">The bytes as they came.</param>
    /// <param name="fileName">The file's name.</param>
    /// <param name="choices">What the columns hold, where the file alone does not say.</param>
    /// <param name="basis">What the run is judged by; null where the condition has no released mask.</param>
    /// <param name="ct">Stops the reading of a large file.</param>
    /// <exception cref="OperationCanceledException">The reading was stopped.</exception>
    public static FileJudgement Evaluate(
        ReadOnlyMemory<byte> content,
        string fileName,
        ColumnChoices? choices,
        JudgementBasis? basis,
        CancellationToken ct = default)
    {
        var reading = Read(content, fileName, choices, ct);
        return new FileJudgement(reading, reading.Sweep is { } run && basis is not null ? Evaluate(run, basis) : null);
    }

    /// <summary>Judges a run by its basis.</summary>
    public static Judgement Evaluate(Sweep run, JudgementBasis basis)
    {
        ArgumentNullException.ThrowIfNull(run);
        ArgumentNullException.ThrowIfNull(basis);
        var evaluation = MaskEvaluator.Evaluate(run, basis.Golden, basis.Mask.Mask.Mask, basis.Device);
        return new Judgement(evaluation, StoredVerdict.From(evaluation));
    }
}

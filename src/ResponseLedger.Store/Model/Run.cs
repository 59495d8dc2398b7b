namespace ResponseLedger.Store.Model;

/// <summary>One sweep of one unit in one condition on one bench, as it was received. Where it belongs now stands in <see cref="RunAssignment"/>.</summary>
public sealed class Run : IFact
{
    public required Guid Id { get; init; }

    /// <summary>Order of receipt, given by the database.</summary>
    public long ReceivedNo { get; init; }

    public required Guid DeviceId { get; init; }
    public required Guid UnitId { get; init; }
    public Guid? LotId { get; init; }
    public required Guid BenchId { get; init; }

    /// <summary>"production", "golden", "through", "check" or "study".</summary>
    public required string Purpose { get; init; }

    /// <summary>SHA-256 over the ordered hashes of the run's files.</summary>
    public required byte[] FilesDigest { get; init; }

    public required DateTimeOffset MeasuredAt { get; init; }

    /// <summary>Temperature, drive, source and load, instruments: JSON text, or null.</summary>
    public string? Circumstances { get; init; }

    public required DateTimeOffset At { get; init; }

    /// <summary>The person who sent it, or null when a bench token did.</summary>
    public Guid? ById { get; init; }

    public Guid? TokenId { get; init; }
}

/// <summary>A file as it came, under its SHA-256; kept once however often it comes.</summary>
public sealed class StoredFile : IFact
{
    public required byte[] Sha256 { get; init; }
    public required byte[] Content { get; init; }
    public required DateTimeOffset At { get; init; }
}

/// <summary>A file of a run, in order.</summary>
public sealed class RunFile : IFact
{
    public required Guid RunId { get; init; }
    public required int Ordinal { get; init; }
    public required byte[] Sha256 { get; init; }
    public required string Name { get; init; }
}

/// <summary>To which unit, lot and condition a run belongs. Number 0 is as received; a reassignment adds the next; the highest is in force.</summary>
public sealed class RunAssignment : IFact
{
    public required Guid RunId { get; init; }
    public required int Number { get; init; }
    public required Guid UnitId { get; init; }
    public Guid? LotId { get; init; }
    public required Guid ConditionId { get; init; }
    public string? Reason { get; init; }
    public required DateTimeOffset At { get; init; }
    public Guid? ById { get; init; }
}

/// <summary>Why a run does not count: its assignable cause.</summary>
public sealed class RunInvalidation : IFact
{
    public required Guid RunId { get; init; }
    public required string Cause { get; init; }
    public required string Reason { get; init; }
    public required DateTimeOffset At { get; init; }
    public required Guid ById { get; init; }
}

/// <summary>One way in which a run's files were read. Reading again adds one; the highest number is in force.</summary>
public sealed class Reading : IFact
{
    public required Guid Id { get; init; }
    public required Guid RunId { get; init; }
    public required int Number { get; init; }
    public required string Reader { get; init; }
    public required int ReaderVersion { get; init; }

    /// <summary>The columns chosen, JSON text, or null where the file settled them.</summary>
    public string? Columns { get; init; }

    /// <summary>The through run's reading that this one is normalised by, or null.</summary>
    public Guid? ThroughReadingId { get; init; }

    /// <summary>The bench's noise floor in dB that the reading went by: under it phase is absent. Null where none was stated.</summary>
    public double? NoiseFloorDb { get; init; }

    public required byte[] GridSha256 { get; init; }

    /// <summary>The engine's sweep form as a number: which pair of planes the curve holds.</summary>
    public required short Form { get; init; }

    public required int Points { get; init; }

    /// <summary>What the reader told, JSON text: an array of {code, message}.</summary>
    public required string Notes { get; init; }

    public required DateTimeOffset At { get; init; }
    public Guid? ById { get; init; }
}

/// <summary>Frequencies shared by all curves measured on them: packed little-endian float64, under their SHA-256.</summary>
public sealed class Grid : IFact
{
    public required byte[] Sha256 { get; init; }
    public required int Points { get; init; }
    public required byte[] Planes { get; init; }
}

/// <summary>A reading's planes, packed little-endian float64, one plane after the other.</summary>
public sealed class Curve : IFact
{
    public required Guid ReadingId { get; init; }
    public required byte[] Planes { get; init; }
}

/// <summary>What verdicts rest on beside the reading: mask revision, golden reading, decision rule, engine version.</summary>
public sealed class Basis : IFact
{
    public required Guid Id { get; init; }
    public required Guid ConditionId { get; init; }
    public required Guid MaskId { get; init; }
    public Guid? GoldenReadingId { get; init; }

    /// <summary>The uncertainty of the golden run's bench that was counted in, or null.</summary>
    public Guid? GoldenUncertaintyId { get; init; }

    /// <summary>"simple", "guarded" or "fourOutcomes".</summary>
    public required string DecisionRule { get; init; }
    public required int EngineVersion { get; init; }
    public required DateTimeOffset At { get; init; }
}

/// <summary>What a reading came to on a basis: margins, outcomes and places in the mask's order. The prose is rebuilt from the curve.</summary>
public sealed class Verdict : IFact
{
    public required Guid Id { get; init; }
    public required Guid ReadingId { get; init; }
    public required Guid BasisId { get; init; }
    public Guid? UncertaintyId { get; init; }
    public required short Outcome { get; init; }
    public short? WorstIndex { get; init; }
    public required double?[] Margins { get; init; }
    public required short[] Outcomes { get; init; }
    public required double?[] FrequenciesHz { get; init; }

    /// <summary>Reason code of each criterion, or null.</summary>
    public required string?[] Reasons { get; init; }

    public required DateTimeOffset At { get; init; }
}

namespace ResponseLedger.Store.Model;

/// <summary>A product: part number and revision. What may change of it stands in <see cref="DeviceSetting"/>.</summary>
public sealed class Device : IFact
{
    public required Guid Id { get; init; }
    public required string PartNumber { get; init; }
    public required string Revision { get; init; }

    /// <summary>"transfer" or "loop".</summary>
    public required string Kind { get; init; }

    /// <summary>Unit of the gain, such as "V/V" or "V/Pa".</summary>
    public required string GainUnit { get; init; }

    /// <summary>-180 or 0 degrees; only loops have one.</summary>
    public short? CriticalPhaseDeg { get; init; }

    public required DateTimeOffset At { get; init; }
    public required Guid ById { get; init; }
}

/// <summary>What may change of a device, one row a change; the highest number is in force.</summary>
public sealed class DeviceSetting : IFact
{
    public required Guid Id { get; init; }
    public required Guid DeviceId { get; init; }
    public required int Number { get; init; }
    public required string Title { get; init; }

    /// <summary>Only the role quality may sign.</summary>
    public bool SigningNeedsQuality { get; init; }

    /// <summary>A lot needs two different signers.</summary>
    public bool SigningNeedsTwo { get; init; }

    /// <summary>Nobody signs for a lot with runs that they sent themselves.</summary>
    public bool SigningExcludesOwnRuns { get; init; }

    /// <summary>How many retests of a unit in a condition may come to count; null for any number.</summary>
    public int? RetestsAllowed { get; init; }

    /// <summary>"simple", "guarded" or "fourOutcomes".</summary>
    public string DecisionRule { get; init; } = "simple";

    /// <summary>Whether a conditional pass counts as nonconforming.</summary>
    public bool ConditionalIsNonconforming { get; init; }

    /// <summary>Whether the device is meant to invert.</summary>
    public bool Inverting { get; init; }

    public required DateTimeOffset At { get; init; }
    public required Guid ById { get; init; }
}

/// <summary>A sweep that the device's test requires. The first one of a device is "standard".</summary>
public sealed class Condition : IFact
{
    public required Guid Id { get; init; }
    public required Guid DeviceId { get; init; }
    public required int Ordinal { get; init; }
    public required string Name { get; init; }
    public required DateTimeOffset At { get; init; }
    public required Guid ById { get; init; }
}

/// <summary>Which unit and run others of a condition are compared with; the highest number is in force.</summary>
public sealed class GoldenChoice : IFact
{
    public required Guid Id { get; init; }
    public required Guid DeviceId { get; init; }
    public required Guid ConditionId { get; init; }
    public required int Number { get; init; }
    public required Guid RunId { get; init; }
    public required Guid ReadingId { get; init; }
    public required string Reason { get; init; }
    public required DateTimeOffset At { get; init; }
    public required Guid ById { get; init; }
}

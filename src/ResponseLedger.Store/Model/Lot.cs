namespace ResponseLedger.Store.Model;

/// <summary>A production lot. Its state is derived: a decision that no reopening undid.</summary>
public sealed class Lot : IFact
{
    public required Guid Id { get; init; }
    public required Guid DeviceId { get; init; }
    public required string Number { get; init; }

    /// <summary>How many units the lot has.</summary>
    public required int Size { get; init; }

    public required DateTimeOffset At { get; init; }
    public required Guid ById { get; init; }
}

/// <summary>One serial number of a device.</summary>
public sealed class Unit : IFact
{
    public required Guid Id { get; init; }
    public required Guid DeviceId { get; init; }
    public required string Serial { get; init; }
    public required DateTimeOffset At { get; init; }
}

/// <summary>A unit that was declared to belong to a lot, whether or not it has runs yet.</summary>
public sealed class LotUnit : IFact
{
    public required Guid LotId { get; init; }
    public required Guid UnitId { get; init; }
    public required DateTimeOffset At { get; init; }
}

/// <summary>What becomes of a unit that does not pass; the highest number is in force.</summary>
public sealed class Disposition : IFact
{
    public required Guid Id { get; init; }
    public required Guid LotId { get; init; }
    public required Guid UnitId { get; init; }
    public required int Number { get; init; }

    /// <summary>"rework", "scrap", "return" or "concession".</summary>
    public required string Kind { get; init; }

    public required string Reason { get; init; }
    public required DateTimeOffset At { get; init; }
    public required Guid ById { get; init; }
}

/// <summary>A signed decision on a lot: the canonical record, its digest, and who signed.</summary>
public sealed class Decision : IFact
{
    public required Guid Id { get; init; }
    public required Guid LotId { get; init; }

    /// <summary>1 for the lot's first decision; a unique key, so that of two deciders at once one wins.</summary>
    public required int Ordinal { get; init; }

    /// <summary>"approve", "approveWithConcession" or "reject".</summary>
    public required string Kind { get; init; }

    public required string Reason { get; init; }
    public required byte[] Record { get; init; }
    public required byte[] Sha256 { get; init; }

    /// <summary>Whether the device asked for two signers when this was signed: then it holds once a <see cref="SecondSignature"/> stands beside it.</summary>
    public bool NeedsSecondSignature { get; init; }

    public required DateTimeOffset At { get; init; }
    public required Guid ById { get; init; }
}

/// <summary>The signature of a second person under a decision that needs two: its own canonical record, which names the decision's digest.</summary>
public sealed class SecondSignature : IFact
{
    public required Guid DecisionId { get; init; }
    public required byte[] Record { get; init; }
    public required byte[] Sha256 { get; init; }
    public required DateTimeOffset At { get; init; }
    public required Guid ById { get; init; }
}

/// <summary>A run and its verdict that a decision rests on.</summary>
public sealed class DecisionVerdict : IFact
{
    public required Guid DecisionId { get; init; }
    public required Guid UnitId { get; init; }
    public required Guid ConditionId { get; init; }
    public required Guid RunId { get; init; }
    public required Guid ReadingId { get; init; }
    public Guid? VerdictId { get; init; }
}

/// <summary>The reopening of a decided lot; it undoes one decision.</summary>
public sealed class Reopening : IFact
{
    public required Guid DecisionId { get; init; }
    public required Guid LotId { get; init; }
    public required string Reason { get; init; }
    public required DateTimeOffset At { get; init; }
    public required Guid ById { get; init; }
}

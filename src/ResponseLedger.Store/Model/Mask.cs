namespace ResponseLedger.Store.Model;

/// <summary>The identity of a mask revision from its first draft on.</summary>
public sealed class MaskHead : IFact
{
    public required Guid Id { get; init; }
    public required Guid DeviceId { get; init; }
    public required Guid ConditionId { get; init; }
    public required DateTimeOffset At { get; init; }
    public required Guid ById { get; init; }
}

/// <summary>A draft: the one thing of a mask that may change. At most one a condition; it goes when it is released.</summary>
public sealed class MaskDraft
{
    public required Guid MaskId { get; init; }
    public required Guid ConditionId { get; init; }

    /// <summary>The mask document as JSON text.</summary>
    public required string Document { get; set; }

    /// <summary>Counts the saves; it is the ETag.</summary>
    public required int Version { get; set; }

    public required DateTimeOffset ChangedAt { get; set; }
    public required Guid ChangedById { get; set; }
}

/// <summary>A released mask: canonical bytes and their SHA-256, numbered from 1 within its condition.</summary>
public sealed class MaskRevision : IFact
{
    public required Guid MaskId { get; init; }
    public required Guid DeviceId { get; init; }
    public required Guid ConditionId { get; init; }
    public required int Number { get; init; }
    public required byte[] Document { get; init; }
    public required byte[] Sha256 { get; init; }
    public required string Reason { get; init; }
    public required DateTimeOffset At { get; init; }
    public required Guid ById { get; init; }
}

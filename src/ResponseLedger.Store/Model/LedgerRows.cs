namespace ResponseLedger.Store.Model;

/// <summary>One entry of the ledger: its exact canonical bytes. The columns beside them only serve queries.</summary>
public sealed class LedgerEntryRow : IFact
{
    public required Guid Id { get; init; }
    public required string Kind { get; init; }
    public required byte[] Bytes { get; init; }
    public required DateTimeOffset At { get; init; }
}

/// <summary>Where an entry stands in the ledger, from 0 without gaps; given in batches after the entry's commit.</summary>
public sealed class LedgerPosition : IFact
{
    public required long Position { get; init; }
    public required Guid EntryId { get; init; }
}

/// <summary>Entries that wait for their position: written with the entry, taken when the position is given.</summary>
public sealed class LedgerQueueRow
{
    /// <summary>Order of writing, given by the database.</summary>
    public long No { get; init; }

    public required Guid EntryId { get; init; }
}

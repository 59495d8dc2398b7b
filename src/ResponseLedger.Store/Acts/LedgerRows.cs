using Npgsql;
using static ResponseLedger.Store.Queries.PreparedBatch;

namespace ResponseLedger.Store.Acts;

/// <summary>Writes an act's ledger entries, and their places in the queue, in the round trip that writes the act's own rows.</summary>
internal static class LedgerRows
{
    private const string EntrySql = "insert into ledger_entry (id, kind, bytes, at) values ($1, $2, $3, $4)";
    private const string QueueSql = "insert into ledger_queue (entry_id) values ($1)";

    /// <summary>Adds the entries recorded so far that are not written yet; the runner leaves them out then.</summary>
    public static void AddTo(NpgsqlBatch batch, Act act)
    {
        for (; act.EntriesWritten < act.Entries.Count; act.EntriesWritten++)
        {
            var entry = act.Entries[act.EntriesWritten];
            batch.Add(EntrySql, Of(entry.Id), Of(entry.Kind), Of(entry.Bytes), Of(entry.At));
            batch.Add(QueueSql, Of(entry.Id));
        }
    }
}

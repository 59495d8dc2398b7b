using System.Data;
using Microsoft.EntityFrameworkCore;
using Microsoft.EntityFrameworkCore.Storage;
using Npgsql;
using ResponseLedger.Ledger;
using ResponseLedger.Store.Model;

namespace ResponseLedger.Store.Acts;

/// <summary>
/// The one place where anything is saved: execution strategy, transaction, the act, its ledger entries, commit, and the
/// question after a broken commit whether it went through. Nothing saves outside it.
/// </summary>
public sealed class ActRunner(IDbContextFactory<ResponseLedgerContext> contexts, TimeProvider time, LedgerSequencer sequencer)
{
    private static readonly TimeSpan LongestCommit = TimeSpan.FromSeconds(10);

    /// <summary>Runs an act. It may be run again after a transient failure, each time on a fresh context, so it must not keep state outside itself.</summary>
    /// <exception cref="InvalidOperationException">The act recorded no ledger entry.</exception>
    public async Task<T> RunAsync<T>(Actor actor, Func<Act, CancellationToken, Task<T>> act, CancellationToken cancellationToken)
    {
        await using var outer = await contexts.CreateDbContextAsync(cancellationToken);
        var committing = Guid.Empty;
        var backend = 0;
        T outcome = default!;
        var result = await outer.Database.CreateExecutionStrategy().ExecuteAsync(
            act,
            async (_, body, token) =>
            {
                await using var db = await contexts.CreateDbContextAsync(token);
                await using var transaction = await db.Database.BeginTransactionAsync(token);
                var connection = (NpgsqlConnection)db.Database.GetDbConnection();
                try
                {
                    db.HoldsTransaction = true;
                    backend = connection.ProcessID;

                    // An act is done whole or not at all, so nothing ever goes back to a savepoint: each would cost two round trips.
                    db.Database.AutoSavepointsEnabled = false;
                    var attempt = new Act(db, actor, Microseconds.Cut(time.GetUtcNow()), time);
                    var value = await body(attempt, token);
                    if (attempt.Entries.Count == 0)
                        throw new InvalidOperationException("An act records at least one ledger entry.");

                    foreach (var entry in attempt.Entries.Skip(attempt.EntriesWritten))
                    {
                        db.LedgerEntries.Add(entry);
                        db.LedgerQueue.Add(new LedgerQueueRow { EntryId = entry.Id });
                    }

                    await db.SaveChangesAsync(token);
                    committing = attempt.Entries[0].Id;
                    outcome = value;

                    // From here the outcome may be unknown to us: the caller's cancellation must not blur it further.
                    await transaction.CommitAsync(CancellationToken.None);
                    return value;
                }
                catch (InvalidOperationException broken) when (connection.State != ConnectionState.Open)
                {
                    throw BrokenConnection.Told(broken);
                }
                finally
                {
                    db.HoldsTransaction = false;
                }
            },
            async (_, body, token) =>
            {
                await using var db = await contexts.CreateDbContextAsync(token);
                await WaitForCommitAsync(db, backend, token);
                var committed = committing != Guid.Empty && await db.LedgerEntries.AnyAsync(e => e.Id == committing, token);
                return new ExecutionResult<T>(committed, outcome);
            },
            cancellationToken);
        sequencer.Wake();
        return result;
    }

    // A connection may break while the server still commits what was sent on it: until that backend has no transaction any more,
    // "not there" is no answer, and a second attempt would do the act twice.
    private async Task WaitForCommitAsync(ResponseLedgerContext db, int backend, CancellationToken cancellationToken)
    {
        var since = time.GetTimestamp();
        while (await db.Database.SqlQuery<bool>(
                   $"""select exists (select from pg_stat_activity where pid = {backend} and backend_xid is not null) as "Value" """)
                   .SingleAsync(cancellationToken))
        {
            if (time.GetElapsedTime(since) > LongestCommit)
                throw new TimeoutException("A commit is still under way after its connection broke. Whether the act was done will be seen when it is tried again.");
            await Task.Delay(TimeSpan.FromMilliseconds(20), time, cancellationToken);
        }
    }
}

using Microsoft.EntityFrameworkCore;

namespace ResponseLedger.Store.Acts;

/// <summary>
/// Gives committed ledger entries their positions, in batches, so that acts do not queue on one lock: an act writes its
/// entries and a row in the queue, and this takes the queue, in its order, under an advisory lock. Positions have no gaps.
/// </summary>
public sealed class LedgerSequencer(IDbContextFactory<ResponseLedgerContext> contexts, TimeProvider time) : IDisposable
{
    /// <summary>The longest time between a commit and its position while the server runs undisturbed.</summary>
    public static readonly TimeSpan LongestDelay = TimeSpan.FromSeconds(1);

    private const long SequencerLock = 0x5245_534C_5345_51; // "RESLSEQ"
    private const int BatchSize = 2_000;

    private readonly SemaphoreSlim wake = new(0, 1);

    /// <summary>Told after a commit that entries wait.</summary>
    public void Wake()
    {
        try
        {
            wake.Release();
        }
        catch (SemaphoreFullException)
        {
            // Somebody woke it already; one round takes everything that waits.
        }
    }

    /// <summary>Waits until something may wait in the queue, or the longest delay has gone by.</summary>
    public async Task WaitAsync(CancellationToken cancellationToken)
    {
        using var timeout = CancellationTokenSource.CreateLinkedTokenSource(cancellationToken);
        var sleeping = Task.Delay(LongestDelay, time, timeout.Token);
        var woken = wake.WaitAsync(timeout.Token);
        await Task.WhenAny(sleeping, woken);
        await timeout.CancelAsync();
        await Task.WhenAll(sleeping, woken).ConfigureAwait(ConfigureAwaitOptions.SuppressThrowing);
        cancellationToken.ThrowIfCancellationRequested();
    }

    /// <summary>Gives every waiting entry its position; returns how many there were.</summary>
    public async Task<int> GiveAsync(CancellationToken cancellationToken)
    {
        var total = 0;
        while (true)
        {
            var given = await GiveBatchAsync(cancellationToken);
            total += given;
            if (given < BatchSize)
                return total;
        }
    }

    private async Task<int> GiveBatchAsync(CancellationToken cancellationToken)
    {
        await using var outer = await contexts.CreateDbContextAsync(cancellationToken);
        return await outer.Database.CreateExecutionStrategy().ExecuteAsync(async token =>
        {
            await using var db = await contexts.CreateDbContextAsync(token);
            await using var transaction = await db.Database.BeginTransactionAsync(token);
            await db.Database.ExecuteSqlAsync($"select pg_advisory_xact_lock({SequencerLock})", token);
            var given = await db.Database.ExecuteSqlAsync(
                $"""
                 with waiting as (select no from ledger_queue order by no limit {BatchSize}),
                      taken as (delete from ledger_queue q using waiting w where q.no = w.no returning q.no, q.entry_id)
                 insert into ledger_position (position, entry_id)
                 select (select coalesce(max(position), -1) from ledger_position) + row_number() over (order by no), entry_id
                 from taken
                 """,
                token);
            await transaction.CommitAsync(token);
            return given;
        }, cancellationToken);
    }

    /// <inheritdoc/>
    public void Dispose() => wake.Dispose();
}

using System.Data.Common;
using Microsoft.EntityFrameworkCore.Diagnostics;
using Npgsql;

namespace ResponseLedger.Store.Tests;

/// <summary>Breaks the N-th thing that is sent to the database: a command, or a commit before or after it took effect.</summary>
internal sealed class Faults(int at, bool transient) : DbCommandInterceptor, IDbTransactionInterceptor
{
    private int sent;

    /// <summary>Whether the N-th came.</summary>
    public bool Struck { get; private set; }

    public override ValueTask<InterceptionResult<DbDataReader>> ReaderExecutingAsync(
        DbCommand command, CommandEventData eventData, InterceptionResult<DbDataReader> result, CancellationToken cancellationToken = default)
    {
        Count();
        return new(result);
    }

    public override ValueTask<InterceptionResult<int>> NonQueryExecutingAsync(
        DbCommand command, CommandEventData eventData, InterceptionResult<int> result, CancellationToken cancellationToken = default)
    {
        Count();
        return new(result);
    }

    public ValueTask<InterceptionResult> TransactionCommittingAsync(
        DbTransaction transaction, TransactionEventData eventData, InterceptionResult result, CancellationToken cancellationToken = default)
    {
        Count();
        return new(result);
    }

    public Task TransactionCommittedAsync(DbTransaction transaction, TransactionEndEventData eventData, CancellationToken cancellationToken = default)
    {
        Count();
        return Task.CompletedTask;
    }

    private void Count()
    {
        if (Interlocked.Increment(ref sent) != at)
            return;
        Struck = true;
        throw transient ? new NpgsqlException("cut", new IOException("The connection was cut by the test.")) : new InjectedFaultException();
    }
}

internal sealed class InjectedFaultException() : Exception("A fault of the test's.");

using System.Data.Common;
using Microsoft.EntityFrameworkCore.Diagnostics;
using Npgsql;

namespace ResponseLedger.Store.Acts;

/// <summary>
/// A connection that breaks under an act ends the act's attempt. EF Core would open it anew for the next statement and forget
/// the transaction: what followed would be read without the act's locks and be written without its other rows.
/// </summary>
internal sealed class BrokenConnection : DbConnectionInterceptor
{
    public static readonly BrokenConnection Interceptor = new();

    /// <summary>How a broken connection is told, so that the attempt is made again.</summary>
    /// <param name="cause">What the statement after the break said, which reads like a mistake of ours; null where there was none.</param>
    public static NpgsqlException Told(Exception? cause = null)
        => new("The connection to the database broke.", new IOException(cause?.Message ?? "It broke inside a transaction.", cause));

    public override InterceptionResult ConnectionOpening(DbConnection connection, ConnectionEventData eventData, InterceptionResult result)
        => eventData.Context is ResponseLedgerContext { HoldsTransaction: true } ? throw Told() : result;

    public override ValueTask<InterceptionResult> ConnectionOpeningAsync(
        DbConnection connection, ConnectionEventData eventData, InterceptionResult result, CancellationToken cancellationToken = default)
        => eventData.Context is ResponseLedgerContext { HoldsTransaction: true } ? throw Told() : new(result);
}

using Microsoft.EntityFrameworkCore;
using Microsoft.Extensions.Logging;
using Npgsql;

namespace ResponseLedger.Store.Setup;

/// <summary>Brings a database to this version's model and gives the server's role its rights. Several may run at once; they take turns.</summary>
public static class StoreMigrator
{
    private const long MigrationLock = 0x5245_534C_4D49_47; // "RESLMIG"

    /// <summary>Migrates, then grants.</summary>
    /// <param name="ownerConnectionString">Connects as the role that owns, or is to own, the tables.</param>
    /// <param name="serverRoleName">The role that the server connects as; null where it is the owner itself, which is warned of.</param>
    /// <param name="logger">Hears what was applied.</param>
    /// <param name="cancellationToken">Gives up waiting; a migration under way is rolled back.</param>
    /// <exception cref="StoreRefusedException">The server is too old, not durable, or lacks the server's role.</exception>
    public static async Task MigrateAsync(string ownerConnectionString, string? serverRoleName, ILogger logger, CancellationToken cancellationToken)
    {
        ArgumentException.ThrowIfNullOrWhiteSpace(ownerConnectionString);
        ArgumentNullException.ThrowIfNull(logger);

        // The lock lives as long as this connection: not pooled, so that it is surely let go, and kept alive while others migrate.
        var settings = new NpgsqlConnectionStringBuilder(ownerConnectionString) { Pooling = false, CommandTimeout = 0, KeepAlive = 30 };
        await using var connection = new NpgsqlConnection(settings.ConnectionString);
        await connection.OpenAsync(cancellationToken);
        await StoreRequirements.AssertAsync(connection, cancellationToken);
        await using (var take = new NpgsqlCommand($"select pg_advisory_lock({MigrationLock})", connection))
            await take.ExecuteNonQueryAsync(cancellationToken);

        await using var source = NpgsqlDataSource.Create(settings.ConnectionString);
        var options = new DbContextOptionsBuilder<ResponseLedgerContext>();
        StoreServices.Configure(options, source);
        await using var db = new ResponseLedgerContext(options.Options);
        var pending = (await db.Database.GetPendingMigrationsAsync(cancellationToken)).ToArray();
        if (pending.Length > 0)
        {
            logger.LogInformation("Migrating database {Database}: {Migrations}", settings.Database, string.Join(", ", pending));
            await db.Database.MigrateAsync(cancellationToken);
        }

        if (serverRoleName is null || serverRoleName == settings.Username)
        {
            logger.LogWarning(
                "The server connects to database {Database} as the role that owns its tables. Triggers still refuse any change of a fact, but this role could remove them. " +
                "Give the server a role of its own in ConnectionStrings__Ledger, and the owner in ConnectionStrings__LedgerOwner.",
                settings.Database);
            return;
        }

        await StoreGrants.GiveAsync(db, connection, serverRoleName, cancellationToken);
    }
}

using Npgsql;

namespace ResponseLedger.Store.Setup;

/// <summary>What a PostgreSQL server must be like before anything is acknowledged on it.</summary>
public static class StoreRequirements
{
    /// <summary>The oldest version with everything the store uses (NULLS NOT DISTINCT).</summary>
    public const int OldestMajorVersion = 15;

    /// <summary>Checks version and durability as this connection's role meets them: a role may have settings of its own.</summary>
    /// <exception cref="StoreRefusedException">The server is too old, or acknowledged rows could be lost on it.</exception>
    public static async Task AssertAsync(NpgsqlConnection connection, CancellationToken cancellationToken)
    {
        ArgumentNullException.ThrowIfNull(connection);
        if (connection.PostgreSqlVersion.Major < OldestMajorVersion)
        {
            throw new StoreRefusedException(
                $"The database server is PostgreSQL {connection.PostgreSqlVersion}. ResponseLedger needs PostgreSQL {OldestMajorVersion} or newer.");
        }

        await using var command = new NpgsqlCommand(
            "select current_setting('fsync'), current_setting('full_page_writes'), current_setting('synchronous_commit')", connection);
        await using var reader = await command.ExecuteReaderAsync(cancellationToken);
        await reader.ReadAsync(cancellationToken);
        Require("fsync", reader.GetString(0));
        Require("full_page_writes", reader.GetString(1));
        Require("synchronous_commit", reader.GetString(2));
    }

    // Every value of synchronous_commit but "off" waits for the local flush.
    private static void Require(string setting, string value)
    {
        if (value == "off")
        {
            throw new StoreRefusedException(
                $"The database server has {setting} = off, so a crash could lose results that were already acknowledged. " +
                $"Set {setting} = on for the server and for the role that connects, then start again.");
        }
    }
}

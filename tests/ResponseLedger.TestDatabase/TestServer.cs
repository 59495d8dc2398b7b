using Npgsql;

namespace ResponseLedger.TestDatabase;

/// <summary>A PostgreSQL server that tests may make databases on.</summary>
internal abstract class TestServer : IAsyncDisposable
{
    public abstract string ServerRoleName { get; }

    public abstract string OwnerConnectionString(string database);

    public abstract string ServerConnectionString(string database);

    public abstract ValueTask DisposeAsync();

    public Task CreateAsync(string database, string? template)
        => RunAsync(template is null ? $"create database \"{database}\"" : $"create database \"{database}\" template \"{template}\"");

    // WITH (FORCE): pools of a test that has ended may still hold connections.
    public Task DropAsync(string database) => RunAsync($"drop database if exists \"{database}\" with (force)");

    protected async Task RunAsync(string sql)
    {
        await using var connection = new NpgsqlConnection(OwnerConnectionString("postgres"));
        await connection.OpenAsync();

        // CREATE and DROP DATABASE take no parameters; the names are made here.
#pragma warning disable CA2100
        await using var command = new NpgsqlCommand(sql, connection) { CommandTimeout = 120 };
#pragma warning restore CA2100
        await command.ExecuteNonQueryAsync();
    }
}

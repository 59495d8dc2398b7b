using Npgsql;

namespace ResponseLedger.Store.Tests;

/// <summary>Plain SQL on a connection of its own.</summary>
internal static class Sql
{
    public static async Task<NpgsqlConnection> OpenAsync(string connectionString)
    {
        var connection = new NpgsqlConnection(new NpgsqlConnectionStringBuilder(connectionString) { Pooling = false }.ConnectionString);
        await connection.OpenAsync();
        return connection;
    }

#pragma warning disable CA2100 // tests write their own statements
    public static async Task RunAsync(NpgsqlConnection connection, string statement)
    {
        await using var command = new NpgsqlCommand(statement, connection);
        await command.ExecuteNonQueryAsync();
    }

    public static async Task<List<object?[]>> RowsAsync(NpgsqlConnection connection, string query)
    {
        await using var command = new NpgsqlCommand(query, connection);
        await using var reader = await command.ExecuteReaderAsync();
        var rows = new List<object?[]>();
        while (await reader.ReadAsync())
        {
            var row = new object?[reader.FieldCount];
            for (var i = 0; i < row.Length; i++)
                row[i] = reader.IsDBNull(i) ? null : reader.GetValue(i);
            rows.Add(row);
        }

        return rows;
    }
#pragma warning restore CA2100

    public static async Task<T> ScalarAsync<T>(NpgsqlConnection connection, string query) => (T)(await RowsAsync(connection, query))[0][0]!;
}

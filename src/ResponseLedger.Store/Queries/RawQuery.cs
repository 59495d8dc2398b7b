using Microsoft.EntityFrameworkCore;
using Npgsql;

namespace ResponseLedger.Store.Queries;

/// <summary>A statement whose rows are read by hand: on the context's connection, inside its transaction where there is one, retried like any query where there is none.</summary>
internal static class RawQuery
{
    public static Task<T> ReadAsync<T>(
        ResponseLedgerContext db,
        string sql,
        Action<NpgsqlParameterCollection> bind,
        Func<NpgsqlDataReader, CancellationToken, Task<T>> read,
        CancellationToken cancellationToken)
    {
        ArgumentNullException.ThrowIfNull(db);
        return db.Database.CurrentTransaction is null
            ? db.Database.CreateExecutionStrategy().ExecuteAsync(token => OnceAsync(db, sql, bind, read, token), cancellationToken)
            : OnceAsync(db, sql, bind, read, cancellationToken);
    }

    private static async Task<T> OnceAsync<T>(
        ResponseLedgerContext db,
        string sql,
        Action<NpgsqlParameterCollection> bind,
        Func<NpgsqlDataReader, CancellationToken, Task<T>> read,
        CancellationToken cancellationToken)
    {
        await db.Database.OpenConnectionAsync(cancellationToken);
        try
        {
            var connection = (NpgsqlConnection)db.Database.GetDbConnection();
            await using var command = connection.CreateCommand();
#pragma warning disable CA2100 // The statements are constants of this room; every value travels as a parameter.
            command.CommandText = sql;
#pragma warning restore CA2100
            bind(command.Parameters);
            await using var reader = await command.ExecuteReaderAsync(cancellationToken);
            return await read(reader, cancellationToken);
        }
        finally
        {
            await db.Database.CloseConnectionAsync();
        }
    }
}

/// <summary>Columns that may be null.</summary>
internal static class NullableColumns
{
    public static Guid? GuidOrNull(this NpgsqlDataReader row, int ordinal) => row.IsDBNull(ordinal) ? null : row.GetGuid(ordinal);

    public static int? IntOrNull(this NpgsqlDataReader row, int ordinal) => row.IsDBNull(ordinal) ? null : row.GetInt32(ordinal);

    public static string? TextOrNull(this NpgsqlDataReader row, int ordinal) => row.IsDBNull(ordinal) ? null : row.GetString(ordinal);
}

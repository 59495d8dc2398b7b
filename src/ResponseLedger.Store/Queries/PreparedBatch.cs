using Microsoft.EntityFrameworkCore;
using Microsoft.EntityFrameworkCore.Storage;
using Npgsql;

namespace ResponseLedger.Store.Queries;

/// <summary>Several statements in one round trip, prepared once a connection.</summary>
internal static class PreparedBatch
{
    /// <summary>A batch on the context's connection and inside its transaction, if it has one.</summary>
    public static NpgsqlBatch On(ResponseLedgerContext db)
        => new((NpgsqlConnection)db.Database.GetDbConnection(), (NpgsqlTransaction?)db.Database.CurrentTransaction?.GetDbTransaction());

    /// <summary>Adds a statement with its positional parameters.</summary>
    public static void Add(this NpgsqlBatch batch, string sql, params ReadOnlySpan<NpgsqlParameter> values)
    {
        var command = new NpgsqlBatchCommand(sql);
        foreach (var value in values)
            command.Parameters.Add(value);
        batch.BatchCommands.Add(command);
    }

    /// <summary>A positional parameter that is never null.</summary>
    public static NpgsqlParameter Of<T>(T value) => new NpgsqlParameter<T> { TypedValue = value };

    /// <summary>A positional id that may be null.</summary>
    public static NpgsqlParameter Of(Guid? value) => new() { Value = (object?)value ?? DBNull.Value, NpgsqlDbType = NpgsqlTypes.NpgsqlDbType.Uuid };

    /// <summary>A positional text that may be null.</summary>
    public static NpgsqlParameter OfText(string? value) => new() { Value = (object?)value ?? DBNull.Value, NpgsqlDbType = NpgsqlTypes.NpgsqlDbType.Text };
}

using Npgsql;
using ResponseLedger.Store.Embedded;
using ResponseLedger.Store.Setup;

namespace ResponseLedger.Server.Start;

/// <summary>The server cannot start as it is set up; the message says what to change.</summary>
internal sealed class StartFailure(string message, Exception? inner = null) : Exception(message, inner)
{
    /// <summary>One clear message for a failure that whoever starts the server can mend; null for any other, which is a fault of ours and keeps its stack.</summary>
    public static string? Tell(Exception failure) => failure switch
    {
        StartFailure or StoreRefusedException or EmbeddedPostgresException => $"ResponseLedger cannot start: {failure.Message}",
        NpgsqlException database => $"ResponseLedger cannot start: the database does not let it in. {database.Message} Check ConnectionStrings__Ledger.",
        ArgumentException { StackTrace: { } trace } connection when trace.Contains(nameof(NpgsqlConnectionStringBuilder), StringComparison.Ordinal) =>
            $"ResponseLedger cannot start: the connection string cannot be read. {connection.Message}",
        IOException io => $"ResponseLedger cannot start: {io.Message}",
        UnauthorizedAccessException denied => $"ResponseLedger cannot start: {denied.Message}",
        _ => null,
    };
}

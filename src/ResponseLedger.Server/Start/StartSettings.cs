using Npgsql;
using ResponseLedger.Store.Embedded;

namespace ResponseLedger.Server.Start;

/// <summary>What the server is told from outside. Names are those of environment variables; a command line or a file may give them too.</summary>
/// <param name="ConnectionString">PostgreSQL of one's own, or null for the embedded one.</param>
/// <param name="OwnerConnectionString">Connects as the owner of the tables, who migrates; null where the server's own role does.</param>
/// <param name="DataFolder">Where the embedded PostgreSQL keeps its data.</param>
/// <param name="Demo">Whether the invented demo lab runs, on a database of its own.</param>
/// <param name="AdminEmail">E-mail of the first manager.</param>
/// <param name="AdminPassword">Password of the first manager; null for a one-time password that is printed.</param>
internal sealed record StartSettings(
    string? ConnectionString,
    string? OwnerConnectionString,
    string DataFolder,
    bool Demo,
    string AdminEmail,
    string? AdminPassword)
{
    /// <summary>The database of the real ledger in the embedded store.</summary>
    public const string RealDatabase = "ledger";

    /// <summary>The database of the demo lab in the embedded store.</summary>
    public const string DemoDatabase = "demo";

    private const string UsualAdminEmail = "manager@localhost";

    /// <summary>Reads the settings.</summary>
    /// <exception cref="StartFailure">One of them cannot stand.</exception>
    public static StartSettings From(IConfiguration configuration)
    {
        var connection = Given(configuration.GetConnectionString("Ledger"));
        var owner = Given(configuration.GetConnectionString("LedgerOwner"));
        if (connection is null && owner is not null)
            throw new StartFailure("ConnectionStrings__LedgerOwner stands without ConnectionStrings__Ledger. Give both, or neither for the embedded store.");

        var demo = Given(configuration["RESPONSELEDGER_DEMO"]) switch
        {
            null => connection is null,
            "1" => true,
            "0" => false,
            var other => throw new StartFailure($"RESPONSELEDGER_DEMO is \"{other}\". Set it to 1 (with the demo lab) or 0 (without)."),
        };
        var email = Given(configuration["RESPONSELEDGER_ADMIN_EMAIL"]);
        var password = Given(configuration["RESPONSELEDGER_ADMIN_PASSWORD"]);
        if (password is not null && email is null)
            throw new StartFailure("RESPONSELEDGER_ADMIN_PASSWORD stands without RESPONSELEDGER_ADMIN_EMAIL. Set the first manager's e-mail too.");

        return new StartSettings(
            connection is null ? null : InDatabase(connection, demo),
            owner is null ? null : InDatabase(owner, demo),
            Given(configuration[EmbeddedPostgresOptions.DataFolderVariable]) ?? EmbeddedPostgresOptions.DefaultDataFolder(),
            demo,
            email ?? UsualAdminEmail,
            password);
    }

    // The demo lab never runs in the database of the real ledger: it has one of its own beside it.
    private static string InDatabase(string connectionString, bool demo)
    {
        var builder = new NpgsqlConnectionStringBuilder(connectionString);
        var named = builder.Database ?? RealDatabase;
        builder.Database = !demo || named.EndsWith(DemoDatabase, StringComparison.Ordinal) ? named
            : named == RealDatabase ? DemoDatabase
            : $"{named}_{DemoDatabase}";
        return builder.ConnectionString;
    }

    private static string? Given(string? value) => string.IsNullOrWhiteSpace(value) ? null : value;
}

using Microsoft.Extensions.Logging;
using Microsoft.Extensions.Logging.Abstractions;

namespace ResponseLedger.Store.Embedded;

/// <summary>How the embedded PostgreSQL is set up.</summary>
public sealed record EmbeddedPostgresOptions
{
    /// <summary>Name of the environment variable that names the data folder.</summary>
    public const string DataFolderVariable = "RESPONSELEDGER_DATA";

    /// <summary>Name of the environment variable that names the folder with PostgreSQL's programs, where they stand in an unusual place.</summary>
    public const string BinariesVariable = "RESPONSELEDGER_POSTGRES_BIN";

    /// <summary>The server's data folder; the cluster is a folder in it.</summary>
    public required string DataFolder { get; init; }

    /// <summary>The folder with PostgreSQL's programs; null to look for it.</summary>
    public string? BinariesFolder { get; init; } = Environment.GetEnvironmentVariable(BinariesVariable);

    /// <summary>Databases that exist once it has started.</summary>
    public IReadOnlyList<string> Databases { get; init; } = ["ledger", "demo"];

    /// <summary>How long a start may take, the wait for orphaned backends included.</summary>
    public TimeSpan StartTimeout { get; init; } = TimeSpan.FromSeconds(60);

    /// <summary>Connections that PostgreSQL accepts at once.</summary>
    public int MaxConnections { get; init; } = 100;

    /// <summary>Whether a new cluster is flushed to disk when it is made. Only a cluster that nobody will miss may do without.</summary>
    public bool FlushNewCluster { get; init; } = true;

    /// <summary>The clock.</summary>
    public TimeProvider Time { get; init; } = TimeProvider.System;

    /// <summary>Hears of starts, stops and deaths.</summary>
    public ILogger Logger { get; init; } = NullLogger.Instance;

    /// <summary>The data folder where nothing else is said: the variable, else /var/lib/responseledger for root, else the user's local application data.</summary>
    public static string DefaultDataFolder()
    {
        var named = Environment.GetEnvironmentVariable(DataFolderVariable);
        if (!string.IsNullOrWhiteSpace(named))
            return Path.GetFullPath(named);
        if (!OperatingSystem.IsWindows() && Environment.IsPrivilegedProcess)
            return "/var/lib/responseledger";
        return Path.Combine(Environment.GetFolderPath(Environment.SpecialFolder.LocalApplicationData, Environment.SpecialFolderOption.Create), "ResponseLedger");
    }
}

using Npgsql;
using ResponseLedger.Store.Embedded;

namespace ResponseLedger.Server.Start;

/// <summary>The store that this start opened: a PostgreSQL of one's own by connection string, or the embedded one, which stops with it.</summary>
internal sealed class OpenStore : IAsyncDisposable
{
    private readonly IAsyncDisposable? embedded;

    private OpenStore(StoreAddress address, IAsyncDisposable? embedded)
    {
        Address = address;
        this.embedded = embedded;
    }

    /// <summary>Where it is.</summary>
    public StoreAddress Address { get; }

    /// <summary>Opens it: starts the embedded one, or takes the address that was given.</summary>
    /// <exception cref="EmbeddedPostgresException">The embedded one does not start; the message says what to do.</exception>
    public static async Task<OpenStore> OpenAsync(StartSettings settings, IConfiguration configuration)
    {
        if (settings.ConnectionString is { } given)
        {
            var role = settings.OwnerConnectionString is null ? null : new NpgsqlConnectionStringBuilder(given).Username;
            return new OpenStore(new StoreAddress(given, settings.OwnerConnectionString ?? given, role), null);
        }

        // The host, whose log this will be, is not built before the store's address is known; this factory lives as long as the store.
        var loggers = LoggerFactory.Create(logging => logging.AddConfiguration(configuration.GetSection("Logging")).AddConsole());
        var postgres = await EmbeddedPostgres.StartAsync(
            new EmbeddedPostgresOptions { DataFolder = settings.DataFolder, Logger = loggers.CreateLogger("ResponseLedger.Store") }, CancellationToken.None);
        var database = settings.Demo ? StartSettings.DemoDatabase : StartSettings.RealDatabase;
        return new OpenStore(
            new StoreAddress(postgres.ServerConnectionString(database), postgres.OwnerConnectionString(database), EmbeddedPostgres.ServerRoleName), postgres);
    }

    /// <summary>Stops the embedded store; one by connection string goes on.</summary>
    public ValueTask DisposeAsync() => embedded?.DisposeAsync() ?? ValueTask.CompletedTask;
}

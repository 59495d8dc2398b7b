using Npgsql;

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

    /// <summary>Opens it.</summary>
    public static async Task<OpenStore> OpenAsync(StartSettings settings)
    {
        await Task.CompletedTask;
        if (settings.ConnectionString is not { } connectionString)
            throw new StartFailure("There is no connection string. Set ConnectionStrings__Ledger.");

        var role = settings.OwnerConnectionString is null ? null : new NpgsqlConnectionStringBuilder(connectionString).Username;
        return new OpenStore(new StoreAddress(connectionString, settings.OwnerConnectionString ?? connectionString, role), null);
    }

    /// <summary>Stops the embedded store; one by connection string goes on.</summary>
    public ValueTask DisposeAsync() => embedded?.DisposeAsync() ?? ValueTask.CompletedTask;
}

namespace ResponseLedger.TestDatabase;

/// <summary>A fresh, migrated database of one test's own; it is dropped at the end.</summary>
public sealed class TestStore : IAsyncDisposable
{
    private readonly TestServer server;

    internal TestStore(TestServer server, string name)
    {
        this.server = server;
        Name = name;
        OwnerConnectionString = server.OwnerConnectionString(name);
        ServerConnectionString = server.ServerConnectionString(name);
    }

    /// <summary>The database's name.</summary>
    public string Name { get; }

    /// <summary>Connects as the owner of the tables.</summary>
    public string OwnerConnectionString { get; }

    /// <summary>Connects as the server does, with the server's rights.</summary>
    public string ServerConnectionString { get; }

    /// <summary>The role of <see cref="ServerConnectionString"/>.</summary>
    public string ServerRoleName => server.ServerRoleName;

    /// <inheritdoc/>
    public async ValueTask DisposeAsync() => await server.DropAsync(Name);
}

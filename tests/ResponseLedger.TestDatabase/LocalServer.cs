using ResponseLedger.Store.Embedded;

namespace ResponseLedger.TestDatabase;

/// <summary>One cluster for this test process, from the machine's PostgreSQL programs, in a temporary folder.</summary>
internal sealed class LocalServer : TestServer
{
    private const string Prefix = "responseledger-test-";
    private const long BytesWanted = 4L << 30;

    private readonly string folder;
    private readonly EmbeddedPostgres postgres;

    private LocalServer(string folder, EmbeddedPostgres postgres)
    {
        this.folder = folder;
        this.postgres = postgres;
    }

    public override string ServerRoleName => EmbeddedPostgres.ServerRoleName;

    public static async Task<LocalServer> StartAsync()
    {
        // What a killed test process left. A young folder may be another's that has not taken hold of it yet.
        var old = TimeProvider.System.GetUtcNow().UtcDateTime.AddMinutes(-5);
        foreach (var abandoned in Directory.GetDirectories(Place(), Prefix + "*").Where(f => Directory.GetCreationTimeUtc(f) < old))
            await EmbeddedPostgres.TryRemoveAsync(abandoned, CancellationToken.None);
        var folder = Path.Combine(Place(), Prefix + Guid.CreateVersion7(TimeProvider.System.GetUtcNow()).ToString("N"));
        var options = new EmbeddedPostgresOptions { DataFolder = folder, Databases = [], MaxConnections = 400, FlushNewCluster = false };
        return new LocalServer(folder, await EmbeddedPostgres.StartAsync(options, CancellationToken.None));
    }

    public override string OwnerConnectionString(string database) => postgres.OwnerConnectionString(database);

    public override string ServerConnectionString(string database) => postgres.ServerConnectionString(database);

    public override async ValueTask DisposeAsync()
    {
        await postgres.DisposeAsync();
        Directory.Delete(folder, recursive: true);
    }

    // A file system in memory where there is a roomy one: the cluster lives for minutes, and every new database is a few hundred files.
    private static string Place()
    {
        const string inMemory = "/dev/shm";
        if (Environment.GetEnvironmentVariable(TestDatabases.FolderVariable) is { Length: > 0 } named)
            return named;
        return OperatingSystem.IsLinux() && Directory.Exists(inMemory) && new DriveInfo(inMemory).AvailableFreeSpace > BytesWanted
            ? inMemory
            : Path.GetTempPath();
    }
}

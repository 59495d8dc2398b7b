using Microsoft.Extensions.Logging.Abstractions;
using ResponseLedger.Store.Embedded;
using ResponseLedger.Store.Setup;

namespace ResponseLedger.TestDatabase;

/// <summary>
/// Owns the databases of this test process. Where they live is said by <c>RESPONSELEDGER_TEST_DATABASE</c>: <c>local</c> (the
/// default: the machine's PostgreSQL programs), <c>container</c> (image by <c>RESPONSELEDGER_TEST_IMAGE</c>, imported by
/// <c>RESPONSELEDGER_TEST_IMAGE_LOCAL=1</c>), or a connection string. Where there is none the test is skipped;
/// <c>RESPONSELEDGER_TEST_REQUIRE=1</c> makes it fail instead.
/// </summary>
public static class TestDatabases
{
    /// <summary>Name of the environment variable that names the folder in which a local cluster is made; left out, one in memory where there is one.</summary>
    public const string FolderVariable = "RESPONSELEDGER_TEST_FOLDER";

    // What xunit takes for a skip, whatever type the exception has.
    private const string SkipToken = "$XunitDynamicSkip$";

    private static readonly Lazy<Task<(TestServer Server, string Template)>> Shared = new(StartAsync);
    private static int count;

    /// <summary>Whether databases live in a container, so that a test of the local programs has nothing to say.</summary>
    public static string Kind => Environment.GetEnvironmentVariable("RESPONSELEDGER_TEST_DATABASE") is { Length: > 0 } kind ? kind : "local";

    /// <summary>Gives a fresh migrated database.</summary>
    public static async Task<TestStore> CreateAsync()
    {
        var (server, template) = await Shared.Value;
        var name = $"{template}_{Interlocked.Increment(ref count)}";
        await server.CreateAsync(name, template);
        return new TestStore(server, name);
    }

    /// <summary>Gives a fresh database without any table.</summary>
    public static async Task<TestStore> CreateEmptyAsync()
    {
        var (server, template) = await Shared.Value;
        var name = $"{template}_{Interlocked.Increment(ref count)}";
        await server.CreateAsync(name, template: null);
        return new TestStore(server, name);
    }

    private static async Task<(TestServer Server, string Template)> StartAsync()
    {
        var server = await FindServerAsync();
        var template = "t" + Guid.CreateVersion7(TimeProvider.System.GetUtcNow()).ToString("N");
        AppDomain.CurrentDomain.ProcessExit += (_, _) => EndAsync(server, template).GetAwaiter().GetResult();
        await server.CreateAsync(template, template: null);
        await StoreMigrator.MigrateAsync(server.OwnerConnectionString(template), server.ServerRoleName, NullLogger.Instance, CancellationToken.None);
        return (server, template);
    }

    private static async Task EndAsync(TestServer server, string template)
    {
        if (server is not LocalServer)
            await server.DropAsync(template);
        await server.DisposeAsync();
    }

    private static async Task<TestServer> FindServerAsync()
    {
        try
        {
            return Kind switch
            {
                "local" => await LocalServer.StartAsync(),
                "container" => await ContainerServer.StartAsync(
                    Environment.GetEnvironmentVariable("RESPONSELEDGER_TEST_IMAGE") ?? "postgres:15",
                    Environment.GetEnvironmentVariable("RESPONSELEDGER_TEST_IMAGE_LOCAL") == "1"),
                _ => await GivenAsync(Kind),
            };
        }
        catch (Exception e) when (IsAbsence(e) && Environment.GetEnvironmentVariable("RESPONSELEDGER_TEST_REQUIRE") != "1")
        {
            throw new InvalidOperationException(SkipToken + e.Message, e);
        }
    }

    private static async Task<TestServer> GivenAsync(string connectionString)
    {
        var server = new GivenServer(connectionString);
        await server.MakeRoleAsync();
        return server;
    }

    // Nothing to run on is an absence; something that runs and fails is a failure.
    private static bool IsAbsence(Exception e)
        => e is EmbeddedPostgresException { IsAbsence: true } or DotNet.Testcontainers.Builders.DockerUnavailableException;
}

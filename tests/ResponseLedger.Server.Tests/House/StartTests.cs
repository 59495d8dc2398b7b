using System.Net;
using Npgsql;
using ResponseLedger.TestDatabase;

namespace ResponseLedger.Server.Tests.House;

public sealed class StartTests
{
    // The lock under which migrations run.
    private const long MigrationLock = 0x5245_534C_4D49_47;

    [Fact]
    public async Task It_listens_at_once_and_is_ready_after_the_migrations()
    {
        await using var store = await TestDatabases.CreateEmptyAsync();
        await using var holder = new NpgsqlConnection(store.OwnerConnectionString + ";Pooling=false");
        await holder.OpenAsync();
        await using (var take = new NpgsqlCommand($"select pg_advisory_lock({MigrationLock})", holder))
            await take.ExecuteNonQueryAsync();
        await using var server = await RunningServer.StartAsync(Settings(store));
        using var client = server.Client();

        await (await client.GetAsync("/health/live")).ShouldBeAsync(HttpStatusCode.OK);
        var waiting = await (await client.GetAsync("/health/ready")).ShouldBeAsync(HttpStatusCode.ServiceUnavailable);
        Assert.NotEqual("ready", waiting.GetProperty("status").GetString());
        Assert.NotNull(waiting.GetProperty("waitsFor").GetString());
        var about = await (await client.GetAsync("/api/about")).ShouldBeAsync(HttpStatusCode.OK);
        Assert.False(about.GetProperty("ready").GetBoolean());
        using var early = await client.GetAsync("/api/session");
        await early.ShouldRefuseAsync(HttpStatusCode.ServiceUnavailable, "starting");
        Assert.NotNull(early.Headers.RetryAfter);

        await holder.CloseAsync();
        await server.ReadyAsync();
        await (await client.GetAsync("/api/session")).ShouldRefuseAsync(HttpStatusCode.Unauthorized);
        about = await (await client.GetAsync("/api/about")).ShouldBeAsync(HttpStatusCode.OK);
        Assert.True(about.GetProperty("ready").GetBoolean());
    }

    [Fact]
    public async Task A_second_start_on_the_same_store_makes_no_second_manager()
    {
        await using var store = await TestDatabases.CreateAsync();
        await (await (await RunningServer.StartAsync(Settings(store))).ReadyAsync()).DisposeAsync();
        await (await (await RunningServer.StartAsync(Settings(store, email: "other@example.test"))).ReadyAsync()).DisposeAsync();

        await using var connection = new NpgsqlConnection(store.OwnerConnectionString);
        await connection.OpenAsync();
        await using var count = new NpgsqlCommand("select count(*) from person", connection);
        Assert.Equal(1L, await count.ExecuteScalarAsync());
    }

    [Fact]
    public async Task A_database_that_goes_away_shows_in_readiness_and_not_in_liveness()
    {
        await using var store = await TestDatabases.CreateAsync();
        await using var server = await (await RunningServer.StartAsync(Settings(store))).ReadyAsync();
        using var client = server.Client();

        await store.DisposeAsync();

        await (await client.GetAsync("/health/ready")).ShouldBeAsync(HttpStatusCode.ServiceUnavailable);
        await (await client.GetAsync("/health/live")).ShouldBeAsync(HttpStatusCode.OK);
    }

    internal static Dictionary<string, string?> Settings(TestStore store, string email = Lab.ManagerEmail) => new()
    {
        ["urls"] = "http://127.0.0.1:0",
        ["ConnectionStrings:Ledger"] = store.ServerConnectionString,
        ["ConnectionStrings:LedgerOwner"] = store.OwnerConnectionString,
        ["RESPONSELEDGER_ADMIN_EMAIL"] = email,
        ["RESPONSELEDGER_ADMIN_PASSWORD"] = Lab.Password,
    };
}

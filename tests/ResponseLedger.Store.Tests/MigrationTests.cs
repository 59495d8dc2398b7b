using Microsoft.EntityFrameworkCore;
using Microsoft.Extensions.Logging.Abstractions;
using Npgsql;
using ResponseLedger.Store.Setup;
using ResponseLedger.TestDatabase;

namespace ResponseLedger.Store.Tests;

public sealed class MigrationTests
{
    [Fact]
    public async Task The_migrations_say_all_that_the_model_says()
    {
        await using var store = await TestDatabases.CreateAsync();
        await using var db = Contexts.Open(store.OwnerConnectionString);
        Assert.False(db.Database.HasPendingModelChanges());
        Assert.Empty(await db.Database.GetPendingMigrationsAsync(TestContext.Current.CancellationToken));
    }

    [Fact]
    public async Task Four_migrators_at_once_take_turns()
    {
        await using var store = await TestDatabases.CreateEmptyAsync();
        await Task.WhenAll(Enumerable.Range(0, 4).Select(_ => Task.Run(
            () => StoreMigrator.MigrateAsync(store.OwnerConnectionString, store.ServerRoleName, NullLogger.Instance, TestContext.Current.CancellationToken))));
        await using var server = Contexts.Open(store.ServerConnectionString);
        Assert.Empty(await server.Database.GetPendingMigrationsAsync(TestContext.Current.CancellationToken));
    }

    [Fact]
    public async Task A_role_that_does_not_wait_for_the_disk_is_refused()
    {
        await using var store = await TestDatabases.CreateEmptyAsync();
        await using (var owner = await Sql.OpenAsync(store.OwnerConnectionString))
            await Sql.RunAsync(owner, $"alter database \"{store.Name}\" set synchronous_commit = off");
        var refused = await Assert.ThrowsAsync<StoreRefusedException>(
            () => StoreMigrator.MigrateAsync(store.OwnerConnectionString, null, NullLogger.Instance, TestContext.Current.CancellationToken));
        Assert.Contains("synchronous_commit = on", refused.Message, StringComparison.Ordinal);
    }

    [Fact]
    public async Task A_server_role_that_does_not_exist_is_named()
    {
        await using var store = await TestDatabases.CreateEmptyAsync();
        var refused = await Assert.ThrowsAsync<StoreRefusedException>(
            () => StoreMigrator.MigrateAsync(store.OwnerConnectionString, "no_such_role", NullLogger.Instance, TestContext.Current.CancellationToken));
        Assert.Contains("no_such_role", refused.Message, StringComparison.Ordinal);
    }

    [Fact]
    public async Task Large_values_are_stored_as_the_design_says()
    {
        await using var store = await TestDatabases.CreateAsync();
        await using var owner = await Sql.OpenAsync(store.OwnerConnectionString);
        var rows = await Sql.RowsAsync(
            owner,
            "select attrelid::regclass::text, attstorage::text from pg_attribute where attname = 'planes' and attrelid in ('grid'::regclass, 'curve'::regclass) order by 1");
        Assert.Equal([["curve", "e"], ["grid", "e"]], rows);
        var hasLz4 = (await Sql.RowsAsync(owner, "select 1 from pg_settings where name = 'default_toast_compression' and 'lz4' = any (enumvals)")).Count == 1;
        Assert.Equal(hasLz4 ? "l" : "", (await Sql.ScalarAsync<char>(owner, "select attcompression from pg_attribute where attrelid = 'file'::regclass and attname = 'content'")).ToString().Trim('\0'));
    }

    [Fact]
    public async Task Down_takes_everything_away_again()
    {
        await using var store = await TestDatabases.CreateAsync();
        await using var db = Contexts.Open(store.OwnerConnectionString);
        await db.Database.MigrateAsync("0", TestContext.Current.CancellationToken);
        await using var owner = await Sql.OpenAsync(store.OwnerConnectionString);
        Assert.Equal(1L, await Sql.ScalarAsync<long>(owner, "select count(*) from pg_class where relnamespace = 'public'::regnamespace and relkind = 'r'"));
        Assert.Equal(0L, await Sql.ScalarAsync<long>(owner, "select count(*) from pg_proc where pronamespace = 'public'::regnamespace"));
    }

    [Fact]
    public void A_pool_size_that_was_not_named_is_capped()
    {
        Assert.Equal(StoreServices.MaxPoolSize, new NpgsqlConnectionStringBuilder(StoreServices.Capped("Host=h")).MaxPoolSize);
        Assert.Equal(7, new NpgsqlConnectionStringBuilder(StoreServices.Capped("Host=h;Maximum Pool Size=7")).MaxPoolSize);
    }
}

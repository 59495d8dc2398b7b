using Microsoft.EntityFrameworkCore;
using Npgsql;
using ResponseLedger.Store.Model;
using ResponseLedger.Store.Setup;
using ResponseLedger.TestDatabase;

namespace ResponseLedger.Store.Tests;

public sealed class FactGuardTests
{
    [Fact]
    public async Task Every_fact_refuses_update_delete_and_truncate_even_from_the_owner_of_its_table()
    {
        await using var store = await TestDatabases.CreateAsync();
        await using var db = Contexts.Open(store.OwnerConnectionString);
        await using var owner = await Sql.OpenAsync(store.OwnerConnectionString);
        var facts = db.Model.GetEntityTypes().Where(e => typeof(IFact).IsAssignableFrom(e.ClrType)).ToArray();
        Assert.NotEmpty(facts);
        foreach (var fact in facts)
        {
            var table = fact.GetTableName()!;
            var column = fact.GetProperties().First(p => p.ValueGenerated != Microsoft.EntityFrameworkCore.Metadata.ValueGenerated.OnAdd).GetColumnName();
            foreach (var statement in new[] { $"update \"{table}\" set \"{column}\" = \"{column}\"", $"delete from \"{table}\"", $"truncate \"{table}\" cascade" })
            {
                var refused = await Assert.ThrowsAsync<PostgresException>(() => Sql.RunAsync(owner, statement));
                Assert.True(refused.SqlState == PostgresErrorCodes.IntegrityConstraintViolation, $"{statement}: {refused.Message}");
                Assert.Contains("its rows are facts", refused.MessageText, StringComparison.Ordinal);
            }
        }
    }

    [Fact]
    public async Task A_session_in_the_replica_role_is_refused_too()
    {
        await using var store = await TestDatabases.CreateAsync();
        await using var owner = await Sql.OpenAsync(store.OwnerConnectionString);
        await Sql.RunAsync(owner, "set session_replication_role = replica");
        await Assert.ThrowsAsync<PostgresException>(() => Sql.RunAsync(owner, "delete from run"));
    }

    [Fact]
    public async Task The_servers_role_is_refused_by_privilege_on_every_fact()
    {
        await using var store = await TestDatabases.CreateAsync();
        await using var db = Contexts.Open(store.ServerConnectionString);
        await using var server = await Sql.OpenAsync(store.ServerConnectionString);
        foreach (var fact in db.Model.GetEntityTypes().Where(e => typeof(IFact).IsAssignableFrom(e.ClrType)))
        {
            var table = fact.GetTableName()!;
            var column = fact.GetProperties().First(p => p.GetColumnName() != StoreGrants.LockableColumn).GetColumnName();
            foreach (var statement in new[] { $"update \"{table}\" set \"{column}\" = \"{column}\"", $"delete from \"{table}\"", $"truncate \"{table}\"" })
            {
                var refused = await Assert.ThrowsAsync<PostgresException>(() => Sql.RunAsync(server, statement));
                Assert.True(refused.SqlState == PostgresErrorCodes.InsufficientPrivilege, $"{statement}: {refused.Message}");
            }
        }
    }

    [Fact]
    public async Task The_server_can_lock_a_lot_and_still_not_change_it()
    {
        await using var store = await TestDatabases.CreateAsync();
        await using var server = await Sql.OpenAsync(store.ServerConnectionString);
        await Sql.RunAsync(server, "select 1 from lot for share");
        await Sql.RunAsync(server, "select 1 from lot for update");
        var refused = await Assert.ThrowsAsync<PostgresException>(() => Sql.RunAsync(server, "update lot set id = id"));
        Assert.Equal(PostgresErrorCodes.IntegrityConstraintViolation, refused.SqlState);
    }

    [Fact]
    public async Task The_servers_role_cannot_remove_a_trigger_or_make_a_table()
    {
        await using var store = await TestDatabases.CreateAsync();
        await using var server = await Sql.OpenAsync(store.ServerConnectionString);
        foreach (var statement in new[] { "drop trigger fact_is_kept on run", "alter table run disable trigger all", "create table mine (id int)", "set session_replication_role = replica" })
        {
            var refused = await Assert.ThrowsAsync<PostgresException>(() => Sql.RunAsync(server, statement));
            Assert.True(refused.SqlState == PostgresErrorCodes.InsufficientPrivilege, $"{statement}: {refused.Message}");
        }
    }
}

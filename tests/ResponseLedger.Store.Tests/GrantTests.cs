using Microsoft.EntityFrameworkCore;
using ResponseLedger.Store.Model;
using ResponseLedger.Store.Setup;
using ResponseLedger.TestDatabase;

namespace ResponseLedger.Store.Tests;

public sealed class GrantTests
{
    private static readonly string[] Mutable =
    [
        "person", "role", "person_role", "person_claim", "person_login", "person_token", "role_claim", "data_protection_key", "mask_draft", "ledger_queue",
    ];

    [Fact]
    public async Task Every_table_of_the_database_carries_exactly_the_grants_of_its_kind()
    {
        await using var store = await TestDatabases.CreateAsync();
        await using var owner = await Sql.OpenAsync(store.OwnerConnectionString);
        var found = await Sql.RowsAsync(
            owner,
            $"""
             select c.relname, coalesce(string_agg(g.privilege_type, ',' order by g.privilege_type), '')
             from pg_class c
             left join lateral (select * from aclexplode(c.relacl) a where a.grantee = '{store.ServerRoleName}'::regrole or a.grantee = 0) g on true
             where c.relnamespace = 'public'::regnamespace and c.relkind in ('r', 'v', 'm', 'p', 'S') group by c.relname
             """);
        await using var db = Contexts.Open(store.OwnerConnectionString);
        var facts = db.Model.GetEntityTypes().Where(e => typeof(IFact).IsAssignableFrom(e.ClrType)).Select(e => e.GetTableName()!).ToHashSet();
        Assert.Equal(Mutable.Order(), db.Model.GetEntityTypes().Select(e => e.GetTableName()!).Except(facts).Order());
        foreach (var row in found)
        {
            var (table, grants) = ((string)row[0]!, (string)row[1]!);
            var expected = facts.Contains(table) ? "INSERT,SELECT" : Mutable.Contains(table) ? "DELETE,INSERT,SELECT,UPDATE" : table == "__EFMigrationsHistory" ? "SELECT" : "";
            Assert.True(expected == grants, $"{table}: expected {expected}, found {grants}");
        }

        Assert.Equal(facts.Count + Mutable.Length, found.Count(row => facts.Contains((string)row[0]!) || Mutable.Contains((string)row[0]!)));
    }

    [Fact]
    public async Task The_lots_id_is_the_only_column_with_a_grant_of_its_own()
    {
        await using var store = await TestDatabases.CreateAsync();
        await using var owner = await Sql.OpenAsync(store.OwnerConnectionString);
        var found = await Sql.RowsAsync(owner, "select attrelid::regclass::text || '.' || attname, a.privilege_type from pg_attribute, aclexplode(attacl) a where attacl is not null and attrelid >= 16384");
        var only = Assert.Single(found);
        Assert.Equal([$"{StoreGrants.LockableTable}.{StoreGrants.LockableColumn}", "UPDATE"], only);
    }

    [Fact]
    public async Task The_servers_role_owns_nothing_and_is_no_superuser()
    {
        await using var store = await TestDatabases.CreateAsync();
        await using var server = await Sql.OpenAsync(store.ServerConnectionString);
        var row = Assert.Single(await Sql.RowsAsync(
            server,
            """
            select (select count(*) from pg_class where relowner = current_user::regrole),
                   rolsuper or rolcreatedb or rolcreaterole or rolreplication or rolbypassrls,
                   (select count(*) from pg_auth_members where member = current_user::regrole)
            from pg_roles where rolname = current_user
            """));
        Assert.Equal([0L, false, 0L], row);
    }

    [Fact]
    public async Task The_servers_role_can_do_what_the_server_does_with_accounts()
    {
        await using var store = await TestDatabases.CreateAsync();
        await using var db = Contexts.Open(store.ServerConnectionString);
        var person = new Person { DisplayName = "Ada", UserName = "ada@example.test" };
        db.Users.Add(person);
        db.UserClaims.Add(new Microsoft.AspNetCore.Identity.IdentityUserClaim<Guid> { UserId = person.Id, ClaimType = "a", ClaimValue = "b" });
        await db.SaveChangesAsync(TestContext.Current.CancellationToken);
        person.DisplayName = "Ada L.";
        await db.SaveChangesAsync(TestContext.Current.CancellationToken);
        Assert.Equal("Ada L.", await db.Users.Select(p => p.DisplayName).SingleAsync(TestContext.Current.CancellationToken));
        Assert.Empty(await db.Database.GetPendingMigrationsAsync(TestContext.Current.CancellationToken));
    }
}

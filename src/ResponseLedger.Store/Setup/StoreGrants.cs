using System.Text;
using Microsoft.EntityFrameworkCore;
using Microsoft.EntityFrameworkCore.Metadata;
using Npgsql;
using ResponseLedger.Store.Model;

namespace ResponseLedger.Store.Setup;

/// <summary>
/// What the server's role may do, table by table: facts are read and added; accounts, drafts, the queue and the key ring
/// change freely; the history of migrations is read. Nothing else is granted, and what was granted before is taken away.
/// </summary>
public static class StoreGrants
{
    /// <summary>
    /// The one column of a fact that the role may name in an UPDATE. PostgreSQL lets nobody lock a row, FOR SHARE or FOR UPDATE,
    /// who could not update some column of it, and intake and decisions lock the lot. The trigger refuses the UPDATE itself.
    /// </summary>
    public const string LockableTable = "lot";

    /// <summary>The column of <see cref="LockableTable"/> that the grant names.</summary>
    public const string LockableColumn = "id";

    private static readonly string[] OfFacts = ["SELECT", "INSERT"];
    private static readonly string[] OfMutableTables = ["SELECT", "INSERT", "UPDATE", "DELETE"];

    /// <summary>The privileges on each table of the model, by table.</summary>
    public static IReadOnlyDictionary<string, string[]> PrivilegesByTable(IModel model)
    {
        ArgumentNullException.ThrowIfNull(model);
        return model.GetEntityTypes().ToDictionary(
            entity => entity.GetTableName()!,
            entity => typeof(IFact).IsAssignableFrom(entity.ClrType) ? OfFacts : OfMutableTables,
            StringComparer.Ordinal);
    }

    /// <summary>Grants exactly that to a role, in one transaction, as the owner of the tables.</summary>
    /// <exception cref="StoreRefusedException">There is no such role.</exception>
    internal static async Task GiveAsync(ResponseLedgerContext db, NpgsqlConnection owner, string role, CancellationToken cancellationToken)
    {
        await using (var known = new NpgsqlCommand("select exists (select from pg_roles where rolname = $1)", owner))
        {
            known.Parameters.AddWithValue(role);
            if (await known.ExecuteScalarAsync(cancellationToken) is not true)
                throw new StoreRefusedException($"The server's database role \"{role}\" does not exist. Create it (CREATE ROLE ... LOGIN PASSWORD ...) and start again.");
        }

        var quoted = Quote(role);
        var sql = new StringBuilder("begin;\n");
        sql.Append("do $$ begin execute format('grant connect on database %I to ', current_database()) || '").Append(quoted.Replace("'", "''", StringComparison.Ordinal)).Append("'; end $$;\n");
        sql.Append("grant usage on schema public to ").Append(quoted).Append(";\n");
        sql.Append("revoke all on all tables in schema public from ").Append(quoted).Append(";\n");
        sql.Append("revoke all on all sequences in schema public from ").Append(quoted).Append(";\n");
        foreach (var (table, privileges) in PrivilegesByTable(db.Model))
            sql.Append("grant ").AppendJoin(", ", privileges).Append(" on ").Append(Quote(table)).Append(" to ").Append(quoted).Append(";\n");
        sql.Append("grant update (").Append(LockableColumn).Append(") on ").Append(LockableTable).Append(" to ").Append(quoted).Append(";\n");
        sql.Append("grant select on \"__EFMigrationsHistory\" to ").Append(quoted).Append(";\ncommit;");
        await using var grant = new NpgsqlCommand(sql.ToString(), owner);
        await grant.ExecuteNonQueryAsync(cancellationToken);
    }

    private static string Quote(string name) => "\"" + name.Replace("\"", "\"\"", StringComparison.Ordinal) + "\"";
}

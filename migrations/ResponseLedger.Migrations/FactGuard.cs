using Microsoft.EntityFrameworkCore.Migrations;

namespace ResponseLedger.Migrations;

/// <summary>
/// The triggers that keep facts. They act by statement, so that even an UPDATE that meets no row is refused, and always, so that
/// a session in the replica role meets them too. A migration that adds a fact's table guards it by <see cref="GuardFact"/>.
/// </summary>
internal static class FactGuard
{
    /// <summary>Creates the function that refuses.</summary>
    public static void CreateFactGuard(this MigrationBuilder migration) => migration.Sql(
        """
        create function refuse_change_of_fact() returns trigger language plpgsql as $$
        begin
            raise exception '% is refused on %: its rows are facts and are never changed', tg_op, tg_table_name
                using errcode = 'integrity_constraint_violation', hint = 'A change of state is a new row.';
        end $$;
        """);

    /// <summary>Puts the triggers on a table.</summary>
    public static void GuardFact(this MigrationBuilder migration, string table) => migration.Sql(
        $"""
         create trigger fact_is_kept before update or delete on "{table}" for each statement execute function refuse_change_of_fact();
         create trigger fact_is_not_truncated before truncate on "{table}" for each statement execute function refuse_change_of_fact();
         alter table "{table}" enable always trigger fact_is_kept;
         alter table "{table}" enable always trigger fact_is_not_truncated;
         """);
}

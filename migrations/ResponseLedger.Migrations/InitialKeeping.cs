using Microsoft.EntityFrameworkCore.Migrations;

namespace ResponseLedger.Migrations;

/// <summary>What the generated part of the first migration cannot say: the guard of the facts, and how large values are stored.</summary>
public partial class Initial
{
    private static readonly string[] Facts =
    [
        "basis", "bench", "bench_columns", "bench_setting", "bench_token", "bench_uncertainty", "condition", "curve",
        "decision", "decision_verdict", "device", "device_setting", "disposition", "file", "golden_choice", "grid",
        "ledger_entry", "ledger_position", "lot", "lot_unit", "mask", "mask_revision", "reading", "reopening", "run",
        "run_assignment", "run_file", "run_invalidation", "second_signature", "token_binding", "token_revocation", "unit", "verdict",
    ];

    private static void Keep(MigrationBuilder migration)
    {
        migration.CreateFactGuard();
        foreach (var table in Facts)
            migration.GuardFact(table);

        // Planes of float64 hardly compress: EXTERNAL spares the attempt at every write and reads slices without decompressing.
        migration.Sql(
            """
            alter table grid alter column planes set storage external;
            alter table curve alter column planes set storage external;
            """);

        // A server built without lz4 refuses the method; its default (pglz) serves as well, more slowly.
        migration.Sql(
            """
            do $$
            begin
                alter table file alter column content set compression lz4;
            exception when feature_not_supported then
                raise notice 'this server was built without lz4: files are compressed with its default';
            end $$;
            """);
    }

    private static void Unkeep(MigrationBuilder migration) => migration.Sql("drop function refuse_change_of_fact();");
}

using Npgsql;

namespace ResponseLedger.Server.Tests.MainJob;

/// <summary>What holds in the store at any moment, read behind the server's back: nothing is half written, nothing is doubled.</summary>
internal static class StoreLaws
{
    // Each query counts what breaks its law.
    private static readonly (string Law, string Violations)[] All =
    [
        ("a run has its file, whose bytes have their digest",
            "select count(*) from run r where not exists (select 1 from run_file f join file c on c.sha256 = f.sha256 where f.run_id = r.id and sha256(c.content) = c.sha256)"),
        ("a run belongs to a unit and a condition",
            "select count(*) from run r where not exists (select 1 from run_assignment a join unit u on u.id = a.unit_id where a.run_id = r.id and a.number = 0)"),
        ("a run has a reading with its curve and grid, of the same length",
            """
            select count(*) from run r where not exists (
                select 1 from reading d join curve c on c.reading_id = d.id join grid g on g.sha256 = d.grid_sha256
                where d.run_id = r.id and sha256(g.planes) = g.sha256 and length(g.planes) = 8 * d.points and length(c.planes) = 16 * d.points)
            """),
        ("a run has its verdict",
            "select count(*) from run r where not exists (select 1 from reading d join verdict v on v.reading_id = d.id where d.run_id = r.id)"),
        ("a run has one ledger entry, and such an entry its run",
            """
            with entries as (select convert_from(bytes, 'UTF8')::jsonb #>> '{subject,runId}' as run, count(*) as n from ledger_entry where kind = 'run.received' group by 1)
            select count(*) from entries e full join run r on r.id::text = e.run where r.id is null or e.n is distinct from 1
            """),
        ("no file, reading or curve stands alone",
            """
            select (select count(*) from file f where not exists (select 1 from run_file r where r.sha256 = f.sha256))
                 + (select count(*) from run_file f where not exists (select 1 from run r where r.id = f.run_id))
                 + (select count(*) from reading d where not exists (select 1 from run r where r.id = d.run_id))
                 + (select count(*) from curve c where not exists (select 1 from reading d where d.id = c.reading_id))
            """),
        ("no unit has the same bytes twice",
            "select count(*) from (select 1 from run group by unit_id, lot_id, purpose, files_digest having count(*) > 1) doubled"),
        ("a ledger entry either has its position or waits for it",
            "select count(*) from ledger_entry e where (select count(*) from ledger_position p where p.entry_id = e.id) + (select count(*) from ledger_queue q where q.entry_id = e.id) <> 1"),
        ("positions have no gaps",
            "select coalesce(max(position) + 1, 0) - count(*) from ledger_position"),
        ("a decision's bytes have their digest",
            "select count(*) from decision where sha256(record) <> sha256"),
        ("a decision has one ledger entry that names its digest, and such an entry its decision",
            """
            with entries as (
                select convert_from(bytes, 'UTF8')::jsonb #>> '{subject,decisionId}' as decision, min(convert_from(bytes, 'UTF8')::jsonb #>> '{detail,recordSha256}') as digest, count(*) as n
                from ledger_entry where kind = 'lot.decided' group by 1)
            select count(*) from entries e full join decision d on d.id::text = e.decision
            where d.id is null or e.n is distinct from 1 or e.digest is distinct from encode(d.sha256, 'hex')
            """),
        ("a decision pins the verdicts of both units of its lot",
            "select count(*) from decision d where (select count(*) from decision_verdict v where v.decision_id = d.id and v.verdict_id is not null) <> 2"),
        ("a lot has one decision at most",
            "select count(*) from (select 1 from decision group by lot_id having count(*) > 1) doubled"),
    ];

    public static async Task HoldAsync(ServerProcess server)
    {
        await using var store = await server.OpenStoreAsync();
        foreach (var (law, violations) in All)
        {
            // Every statement stands above.
#pragma warning disable CA2100
            await using var command = new NpgsqlCommand(violations, store);
#pragma warning restore CA2100
            var broken = Convert.ToInt64(await command.ExecuteScalarAsync(), System.Globalization.CultureInfo.InvariantCulture);
            Assert.True(broken == 0, $"{broken} times it does not hold that {law}.\n{server.Said}");
        }
    }
}

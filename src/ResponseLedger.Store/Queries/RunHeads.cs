using System.Buffers.Binary;
using System.Text;
using Npgsql;
using NpgsqlTypes;
using ResponseLedger.Engine.Masks;
using ResponseLedger.Records.Verdicts;

namespace ResponseLedger.Store.Queries;

/// <summary>Lists runs, the newest first, by one statement; a filter reaches its runs by index, however many others there are.</summary>
public static class RunHeads
{
    private const string Sql =
        """
        select r.id, r.received_no, r.device_id, dev.part_number, dev.revision, a.condition_id, k.name, a.unit_id, u.serial,
               a.lot_id, l.number, r.bench_id, b.name, r.purpose, r.measured_at, r.at, coalesce(p.display_name, t.name),
               (select coalesce(json_agg(json_build_object('name', f.name, 'size', octet_length(s.content), 'sha256', encode(f.sha256, 'hex')) order by f.ordinal), '[]')::text
                from run_file f join file s on s.sha256 = f.sha256 where f.run_id = r.id),
               r.circumstances, rd.id, rd.number, rd.reader, rd.reader_version, rd.columns, rd.notes, rd.form, rd.points,
               substring(g.planes from 1 for 8), substring(g.planes from octet_length(g.planes) - 7 for 8),
               i.cause, i.reason, i.at, ip.display_name, a.number, v.basis_id, v.outcome, v.worst_index, v.margins, v.outcomes, v.frequencies_hz,
               case when r.purpose <> 'production' then 'notProduction'
                    when i.run_id is not null then 'invalidated'
                    when exists (
                        select 1 from run_assignment ea
                        join run e on e.id = ea.run_id and e.purpose = 'production' and e.received_no < r.received_no
                        where ea.lot_id = a.lot_id and ea.unit_id = a.unit_id and ea.condition_id = a.condition_id
                          and not exists (select 1 from run_assignment el where el.run_id = ea.run_id and el.number > ea.number)
                          and not exists (select 1 from run_invalidation ei where ei.run_id = ea.run_id)) then 'retest'
                    when ds.retests_allowed < (
                        select count(*) from run_assignment sa
                        join run e on e.id = sa.run_id and e.purpose = 'production' and e.received_no < r.received_no
                        join run_invalidation si on si.run_id = sa.run_id
                        where sa.lot_id = a.lot_id and sa.unit_id = a.unit_id and sa.condition_id = a.condition_id
                          and not exists (select 1 from run_assignment sl where sl.run_id = sa.run_id and sl.number > sa.number)) then 'retestsUsedUp'
                    else 'counting' end,
               case when decided.id is null then m.mask_id is not null else pinned.basis_id is not null end
        from run r
        join lateral (select * from run_assignment where run_id = r.id order by number desc limit 1) a on true
        join device dev on dev.id = r.device_id
        join condition k on k.id = a.condition_id
        join unit u on u.id = a.unit_id
        join bench b on b.id = r.bench_id
        left join lot l on l.id = a.lot_id
        left join person p on p.id = r.by_id
        left join bench_token t on t.id = r.token_id
        join lateral (select * from reading where run_id = r.id order by number desc limit 1) rd on true
        join grid g on g.sha256 = rd.grid_sha256
        left join run_invalidation i on i.run_id = r.id
        left join person ip on ip.id = i.by_id
        left join lateral (
            select id from decision d
            where d.lot_id = a.lot_id and not exists (select 1 from reopening undone where undone.decision_id = d.id)
            order by d.ordinal desc limit 1) decided on true
        left join lateral (
            select pv.basis_id from decision_verdict pin join verdict pv on pv.id = pin.verdict_id
            where pin.decision_id = decided.id and pin.condition_id = a.condition_id limit 1) pinned on true
        left join lateral (select mask_id from mask_revision where condition_id = a.condition_id order by number desc limit 1) m on true
        left join lateral (select reading_id from golden_choice where condition_id = a.condition_id order by number desc limit 1) gc on true
        left join lateral (select decision_rule, retests_allowed from device_setting where device_id = r.device_id order by number desc limit 1) ds on true
        left join lateral (
            select id from basis
            where decided.id is null and condition_id = a.condition_id and mask_id = m.mask_id
              and golden_reading_id is not distinct from gc.reading_id and decision_rule = ds.decision_rule and engine_version = @engine
            order by at desc limit 1) now on true
        left join lateral (
            select * from verdict
            where reading_id = rd.id and basis_id = case when decided.id is null then now.id else pinned.basis_id end
            order by at desc, id desc limit 1) v on true
        where true
        """;

    /// <summary>Up to <paramref name="take"/> runs received before <paramref name="before"/>, the newest first.</summary>
    public static Task<IReadOnlyList<RunHead>> ListAsync(
        ResponseLedgerContext db, RunFilter filter, long? before, int take, CancellationToken cancellationToken)
    {
        ArgumentNullException.ThrowIfNull(filter);
        var parameters = new List<NpgsqlParameter> { new("engine", Judge.EngineVersion), new("take", take) };
        var sql = new StringBuilder(Sql);
        foreach (var (clause, values) in Clauses(filter, before))
        {
            sql.Append("\n  and ").Append(clause);
            parameters.AddRange(values);
        }

        sql.Append("\norder by r.received_no desc limit @take");
        return RawQuery.ReadAsync(db, sql.ToString(), bound => bound.AddRange(parameters.Select(p => p.Clone()).ToArray()), ReadAsync, cancellationToken);
    }

    // Clauses on the assignment stand twice: once to reach the runs by index, once because only the assignment in force counts.
    private static IEnumerable<(string Clause, NpgsqlParameter[] Values)> Clauses(RunFilter filter, long? before)
    {
        if (before is { } number)
            yield return ("r.received_no < @before", [new("before", number)]);
        if (filter.Id is { } id)
            yield return ("r.id = @id", [new("id", id)]);
        if (filter.Device is { } device)
            yield return (
                "r.device_id in (select id from device where id = @deviceId or part_number = @device or part_number || '/' || revision = @device)",
                Named("device", device));
        if (filter.Lot is { } lot)
            yield return (
                "r.id in (select run_id from run_assignment where lot_id in (select id from lot where id = @lotId or number = @lot)) and (l.id = @lotId or l.number = @lot)",
                Named("lot", lot));
        if (filter.Serial is { } serial)
            yield return (
                "r.id in (select x.run_id from run_assignment x join unit y on y.id = x.unit_id where y.serial = @serial) and u.serial = @serial",
                [new("serial", serial)]);
        if (filter.Bench is { } bench)
            yield return ("r.bench_id in (select id from bench where id = @benchId or name = @bench)", Named("bench", bench));
        if (filter.FromMeasuredAt is { } from)
            yield return ("r.measured_at >= @from", [new("from", from)]);
        if (filter.ToMeasuredAt is { } to)
            yield return ("r.measured_at < @to", [new("to", to)]);
        if (filter.Outcome is { } outcome)
            yield return ("v.outcome = @outcome", [new("outcome", outcome)]);
        if (filter.Purpose is { } purpose)
            yield return ("r.purpose = @purpose", [new("purpose", purpose)]);
        if (filter.Condition is { } condition)
            yield return ("(k.id = @conditionId or k.name = @condition)", Named("condition", condition));
    }

    private static NpgsqlParameter[] Named(string name, string text) =>
    [
        new(name, text),
        new(name + "Id", NpgsqlDbType.Uuid) { Value = Guid.TryParse(text, out var id) ? id : DBNull.Value },
    ];

    private static async Task<IReadOnlyList<RunHead>> ReadAsync(NpgsqlDataReader rows, CancellationToken cancellationToken)
    {
        var heads = new List<RunHead>();
        while (await rows.ReadAsync(cancellationToken))
            heads.Add(Read(rows));
        return heads;
    }

    private static RunHead Read(NpgsqlDataReader row) => new(
        row.GetGuid(0),
        row.GetInt64(1),
        new RunPlace(
            row.GetGuid(2), row.GetString(3), row.GetString(4), row.GetGuid(5), row.GetString(6), row.GetGuid(7), row.GetString(8),
            row.GuidOrNull(9), row.TextOrNull(10), row.GetGuid(11), row.GetString(12)),
        row.GetString(13),
        row.GetFieldValue<DateTimeOffset>(14),
        row.GetFieldValue<DateTimeOffset>(15),
        row.TextOrNull(16),
        row.GetString(17),
        row.TextOrNull(18),
        new RunReading(
            row.GetGuid(19), row.GetInt32(20), row.GetString(21), row.GetInt32(22), row.TextOrNull(23), row.GetString(24), row.GetInt16(25),
            row.GetInt32(26), FrequencyHz(row, 27), FrequencyHz(row, 28)),
        row.GetString(40),
        row.IsDBNull(29)
            ? null
            : new RunInvalidationHead(row.GetString(29), row.GetString(30), row.GetFieldValue<DateTimeOffset>(31), row.TextOrNull(32)),
        row.GetInt32(33),
        row.GetBoolean(41),
        row.GuidOrNull(34),
        row.IsDBNull(35)
            ? null
            : new StoredVerdict(
                (Outcome)row.GetInt16(35),
                row.IsDBNull(36) ? null : row.GetInt16(36),
                row.GetFieldValue<double?[]>(37),
                row.GetFieldValue<short[]>(38),
                row.GetFieldValue<double?[]>(39)));

    private static double FrequencyHz(NpgsqlDataReader row, int column) => BinaryPrimitives.ReadDoubleLittleEndian(row.GetFieldValue<byte[]>(column));
}

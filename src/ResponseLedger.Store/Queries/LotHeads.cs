using System.Text.Json;
using Npgsql;
using NpgsqlTypes;
using ResponseLedger.Records.Verdicts;

namespace ResponseLedger.Store.Queries;

/// <summary>Which lots a list is asked for.</summary>
/// <param name="State"><c>open</c>, <c>approved</c>, <c>approvedWithConcession</c>, <c>rejected</c>, <c>decided</c> for the last three, or null for all.</param>
/// <param name="Device">Id, part number or PART/REV of the device, or null.</param>
/// <param name="Search">Part of a lot's number or part number in any case, or a unit's whole serial number; or null.</param>
/// <param name="BeforeId">The last lot of the page before, or null for the first page.</param>
/// <param name="Limit">How many.</param>
public sealed record LotFilter(string? State, string? Device, string? Search, Guid? BeforeId, int Limit);

/// <summary>Lots as lists show them: each page is one statement, and costs the same however many runs the store holds.</summary>
public static class LotHeads
{
    private const string Columns = FirstPass.Chain +
        """
        , least as (
            select distinct on (lot_id, basis_id, outcome, worst_index)
                   lot_id, basis_id, outcome, worst_index, margins[worst_index + 1] as margin, frequencies_hz[worst_index + 1] as frequency_hz, unit_id, run_id
            from counting where verdict_id is not null and worst_index is not null
            order by lot_id, basis_id, outcome, worst_index, margins[worst_index + 1] nulls first
        ),
        worst as (
            select least.lot_id, json_agg(json_build_object('BasisId', basis_id, 'Outcome', outcome, 'WorstIndex', worst_index, 'Margin', margin,
                   'FrequencyHz', frequency_hz, 'Serial', u.serial, 'RunId', run_id)) as margins
            from least join unit u on u.id = least.unit_id group by least.lot_id
        )
        select c.id, c.device_id, c.part_number, c.revision, s.title, c.number, c.size, c.at,
               c.decision_id, c.decision_ordinal, c.decision_kind, c.decision_reason, c.decision_at, c.decision_sha256,
               (c.signer ->> 'personId')::uuid, c.signer ->> 'name', c.signer ->> 'email', c.meaning,
               (select json_agg(json_build_object('Id', q.condition_id, 'Name', q.name, 'MaskId', q.mask_id, 'MaskRevision', q.mask_revision,
                       'GoldenRunId', q.golden_run_id, 'GoldenReadingId', q.golden_reading_id) order by q.ordinal)
                from required q where q.lot_id = c.id),
               t.units::int, t.tested::int, t.passed::int, t.failed::int, t.inconclusive::int, t.withdrawn::int, t.retests::int,
               t.cleared::int, t.conceded::int, t.stale::int, s.signing_needs_two,
               coalesce(f.tested, 0), coalesce(f.passed, 0), w.margins, r.last_at
        from chosen c
        join lateral (select title, signing_needs_two from device_setting where device_id = c.device_id order by number desc limit 1) s on true
        left join (
            select lot_id, count(*) as units, count(*) filter (where tested) as tested, count(*) filter (where passes) as passed,
                   count(*) filter (where outcome in (2, 4)) as failed, count(*) filter (where outcome = 3) as inconclusive,
                   count(*) filter (where withdrawn) as withdrawn, sum(retests) as retests,
                   count(*) filter (where passes or withdrawn) as cleared, count(*) filter (where disposition = 'concession') as conceded,
                   sum(stale) as stale
            from standing group by lot_id) t on t.lot_id = c.id
        left join first_pass f on f.lot_id = c.id
        left join worst w on w.lot_id = c.id
        left join (select lot_id, max(at) as last_at from ordered group by lot_id) r on r.lot_id = c.id
        order by c.id desc
        """;

    private static readonly string OneSql = LotStandingSql.Chosen("where l.id = @lot") + LotStandingSql.Chain + Columns;

    // Ids rise with time (UUIDv7), so that the newest lots are the end of the primary key. Conditions that were not asked for are left out of the text, for a plan of its own.
    private static string PageSql(LotFilter filter) => LotStandingSql.Chosen(
        $"""
         where true
             {(filter.BeforeId is null ? "" : "and l.id < @before")}
             {(filter.Device is null ? "" : "and l.device_id in (select id from device where id::text = lower(@device) or part_number = @device or part_number || '/' || revision = @device)")}
             {(filter.State is null ? "" : filter.State == LotStates.Open ? "and decided.id is null" : filter.State == LotStates.Decided ? "and decided.id is not null" : "and decided.kind = @kind")}
             {(filter.Search is null ? "" : """
              and (position(lower(@search) in lower(l.number)) > 0 or position(lower(@search) in lower(dev.part_number)) > 0
                   or l.id in (select d.lot_id from lot_unit d join unit u on u.id = d.unit_id where u.serial = @search)
                   or l.id in (select a.lot_id from run_assignment a join unit u on u.id = a.unit_id where u.serial = @search
                               and not exists (select 1 from run_assignment later where later.run_id = a.run_id and later.number > a.number)))
              """)}
         order by l.id desc limit @limit
         """) + LotStandingSql.Chain + Columns;

    /// <summary>One lot, or null when there is none.</summary>
    public static Task<LotHead?> FindAsync(ResponseLedgerContext db, Guid lotId, CancellationToken cancellationToken)
        => RawQuery.ReadAsync(
            db,
            OneSql,
            parameters =>
            {
                parameters.AddWithValue("engine", Judge.EngineVersion);
                parameters.AddWithValue("lot", lotId);
            },
            async (rows, token) => await rows.ReadAsync(token) ? Read(rows) : null,
            cancellationToken);

    /// <summary>A page of lots, newest first, with one more than the limit where there is a next page.</summary>
    public static Task<List<LotHead>> PageAsync(ResponseLedgerContext db, LotFilter filter, CancellationToken cancellationToken)
    {
        ArgumentNullException.ThrowIfNull(filter);
        return RawQuery.ReadAsync(
            db,
            PageSql(filter),
            parameters =>
            {
                parameters.AddWithValue("engine", Judge.EngineVersion);
                parameters.AddWithValue("limit", filter.Limit + 1);
                AddText(parameters, "device", filter.Device);
                AddText(parameters, "search", filter.Search);
                AddText(parameters, "kind", filter.State is { } state and not (LotStates.Open or LotStates.Decided) ? LotStates.KindOf(state) : null);
                if (filter.BeforeId is { } before)
                    parameters.AddWithValue("before", before);
            },
            async (rows, token) =>
            {
                var heads = new List<LotHead>();
                while (await rows.ReadAsync(token))
                    heads.Add(Read(rows));
                return heads;
            },
            cancellationToken);
    }

    private static void AddText(NpgsqlParameterCollection parameters, string name, string? value)
    {
        if (value is not null)
            parameters.Add(new NpgsqlParameter(name, NpgsqlDbType.Text) { Value = value });
    }

    private static LotHead Read(NpgsqlDataReader row) => new(
        row.GetGuid(0),
        row.GetGuid(1),
        row.GetString(2),
        row.GetString(3),
        row.GetString(4),
        row.GetString(5),
        row.GetInt32(6),
        row.GetFieldValue<DateTimeOffset>(7),
        row.IsDBNull(8) ? null : new DecisionHead(
            row.GetGuid(8),
            row.GetInt32(9),
            row.GetString(10),
            row.GetString(11),
            row.GetFieldValue<DateTimeOffset>(12),
            row.GetGuid(14),
            row.GetString(15),
            row.GetString(16),
            row.GetString(17),
            row.GetFieldValue<byte[]>(13)),
        row.IsDBNull(18) ? [] : JsonSerializer.Deserialize<LotCondition[]>(row.GetString(18))!,
        row.IsDBNull(19)
            ? new LotTally(0, 0, 0, 0, 0, 0, 0, 0, 0, 0)
            : new LotTally(
                row.GetInt32(19), row.GetInt32(20), row.GetInt32(21), row.GetInt32(22), row.GetInt32(23), row.GetInt32(24),
                row.GetInt32(25), row.GetInt32(26), row.GetInt32(27), row.GetInt32(28)),
        row.GetBoolean(29),
        new FirstPass(row.GetInt32(30), row.GetInt32(31)),
        row.IsDBNull(32) ? [] : JsonSerializer.Deserialize<LotMargin[]>(row.GetString(32))!,
        row.IsDBNull(33) ? null : row.GetFieldValue<DateTimeOffset>(33));
}

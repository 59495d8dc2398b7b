namespace ResponseLedger.Store.Queries;

/// <summary>
/// The one derivation of how lots stand, as a chain of common table expressions. It starts from <c>chosen</c>, the lots asked
/// for, and reaches everything else by index from there, so that it costs the same however many runs the store holds.
/// An open lot is derived from what is in force now; a decided one from what its decision pinned.
/// </summary>
internal static class LotStandingSql
{
    // Read in one pass and for the picked lots alone, for a record of a thousand units is long. A record is what somebody signed, whatever stands in
    // it: PostgreSQL's text has no zero character, and its JSON would refuse the whole record for one of them.
    private const string RecordJson = @"replace(convert_from(p.record, 'UTF8'), '\u0000', '\ufffd')::json";

    /// <summary>Columns of <c>chosen</c> for lots that <paramref name="which"/> picks; parameters of the filter are the caller's.</summary>
    /// <param name="which">Everything after <c>from lot l join device dev ...</c>: conditions, order and limit.</param>
    public static string Chosen(string which) =>
        $"""
         with picked as materialized (
             select l.id, l.device_id, l.number, l.size, l.at, dev.part_number, dev.revision,
                    decided.id as decision_id, decided.ordinal as decision_ordinal, decided.kind as decision_kind, decided.reason as decision_reason,
                    decided.at as decision_at, decided.sha256 as decision_sha256,
                    decided.record
             from lot l
             join device dev on dev.id = l.device_id
             left join lateral (
                 select d.* from decision d
                 where d.lot_id = l.id and not exists (select 1 from reopening undone where undone.decision_id = d.id)
                 order by d.ordinal desc limit 1) decided on true
             {which}
         ),
         chosen as materialized (
             select p.*, said.signer, said.meaning, said.conditions
             from picked p
             left join lateral json_to_record({RecordJson}) as said(signer json, meaning text, conditions json) on true
         ),
         """;

    /// <summary>
    /// <c>required</c> (conditions with mask, golden run and basis), <c>ordered</c> (runs of the lot with their rank), <c>counting</c>
    /// (the run that counts with its verdict), <c>standing</c> (a row a unit). Needs the parameter <c>engine</c>.
    /// </summary>
    public const string Chain =
        """
        required as materialized (
            select c.id as lot_id, k.id as condition_id, k.ordinal, k.name, m.mask_id, m.number as mask_revision,
                   g.run_id as golden_run_id, g.reading_id as golden_reading_id, b.id as basis_id
            from chosen c
            join condition k on k.device_id = c.device_id
            left join lateral (select mask_id, number from mask_revision where condition_id = k.id order by number desc limit 1) m on true
            left join lateral (select run_id, reading_id from golden_choice where condition_id = k.id order by number desc limit 1) g on true
            left join lateral (select decision_rule from device_setting where device_id = c.device_id order by number desc limit 1) s on true
            left join lateral (
                select id from basis
                where condition_id = k.id and mask_id = m.mask_id and golden_reading_id is not distinct from g.reading_id
                    and decision_rule = s.decision_rule and engine_version = @engine
                order by at desc limit 1) b on true
            where c.decision_id is null
            union all
            select c.id, k.id, k.ordinal, k.name, (pinned ->> 'maskRevisionId')::uuid, (pinned ->> 'maskRevision')::int,
                   (pinned ->> 'goldenRunId')::uuid, (pinned ->> 'goldenReadingId')::uuid, null
            from chosen c
            cross join lateral json_array_elements(c.conditions) pinned
            join condition k on k.id = (pinned ->> 'conditionId')::uuid
            where c.decision_id is not null
        ),
        ordered as materialized (
            select a.lot_id, a.unit_id, a.condition_id, a.run_id, c.decision_id, r.received_no, r.at, r.measured_at, r.by_id,
                   i.run_id is not null as invalidated, i.cause, i.reason,
                   row_number() over (partition by a.lot_id, a.unit_id, a.condition_id order by i.run_id is not null, r.received_no) as place
            from chosen c
            join run_assignment a on a.lot_id = c.id
            join run r on r.id = a.run_id and r.purpose = 'production'
            left join run_invalidation i on i.run_id = r.id
            where not exists (select 1 from run_assignment later where later.run_id = a.run_id and later.number > a.number)
        ),
        counting as materialized (
            select o.lot_id, o.unit_id, o.condition_id, o.run_id, o.at, o.measured_at, rd.id as reading_id,
                   v.id as verdict_id, v.basis_id, v.outcome, v.worst_index, v.margins, v.outcomes, v.frequencies_hz
            from ordered o
            join required q on q.lot_id = o.lot_id and q.condition_id = o.condition_id
            join lateral (select id from reading where run_id = o.run_id order by number desc limit 1) rd on true
            left join lateral (
                select * from verdict where reading_id = rd.id and basis_id = q.basis_id order by at desc, id desc limit 1) v on true
            where o.decision_id is null and o.place = 1 and not o.invalidated
            union all
            select o.lot_id, o.unit_id, o.condition_id, o.run_id, o.at, o.measured_at, pin.reading_id,
                   v.id, v.basis_id, v.outcome, v.worst_index, v.margins, v.outcomes, v.frequencies_hz
            from chosen c
            join decision_verdict pin on pin.decision_id = c.decision_id
            join ordered o on o.lot_id = c.id and o.run_id = pin.run_id
            left join verdict v on v.id = pin.verdict_id
        ),
        members as materialized (
            select d.lot_id, d.unit_id from lot_unit d join chosen c on c.id = d.lot_id
            union
            select lot_id, unit_id from ordered
        ),
        results as materialized (
            select m.lot_id, m.unit_id,
                   count(k.run_id) = count(q.condition_id) and count(q.condition_id) > 0 as tested,
                   case when max(k.outcome) >= 3 then max(k.outcome)
                        when count(k.outcome) = count(q.condition_id) then max(k.outcome) end as outcome,
                   count(*) filter (where k.run_id is not null and q.mask_id is not null and k.verdict_id is null) as stale,
                   max(k.at) as received_at
            from members m
            left join required q on q.lot_id = m.lot_id
            left join counting k on k.lot_id = m.lot_id and k.unit_id = m.unit_id and k.condition_id = q.condition_id
            group by m.lot_id, m.unit_id
        ),
        sent as materialized (
            select o.lot_id, o.unit_id, count(*) as runs,
                   count(*) filter (where not o.invalidated and k.run_id is null) as retests,
                   count(*) filter (where o.invalidated) as invalidated
            from ordered o
            left join counting k on k.lot_id = o.lot_id and k.run_id = o.run_id
            group by o.lot_id, o.unit_id
        ),
        standing as materialized (
            select r.lot_id, r.unit_id, r.tested, r.outcome, r.stale, coalesce(r.outcome <= 1, false) as passes,
                   coalesce(s.runs, 0) as runs, coalesce(s.retests, 0) as retests, coalesce(s.invalidated, 0) as invalidated,
                   d.kind as disposition, d.reason as disposition_reason, coalesce(d.kind <> 'concession', false) as withdrawn
            from results r
            left join sent s on s.lot_id = r.lot_id and s.unit_id = r.unit_id
            left join lateral (
                select kind, reason, at from disposition where lot_id = r.lot_id and unit_id = r.unit_id order by number desc limit 1) d
                on not coalesce(r.outcome <= 1, false) or (d.kind <> 'concession' and r.received_at <= d.at)
        )
        """;
}

using ResponseLedger.Records.Verdicts;

namespace ResponseLedger.Store.Queries;

/// <summary>
/// What a lot came to at the first try: by the run received first of each unit in each condition, whatever was invalidated since,
/// on the basis by which the lot is judged.
/// </summary>
/// <param name="Tested">Units with a run in every condition.</param>
/// <param name="Passed">Units whose first run passes in every condition.</param>
public sealed record FirstPass(int Tested, int Passed)
{
    /// <summary>
    /// Further links of the chain: <c>tried</c>, a row for each unit and the conditions that it was tried and passed in. A first
    /// run that counts has its verdict in the chain already; only where the first one was invalidated it is looked up.
    /// </summary>
    internal const string Chain =
        """
        , judged as materialized (
            select q.lot_id, q.condition_id, coalesce(q.basis_id, pinned.basis_id) as basis_id
            from required q
            left join (select distinct on (lot_id, condition_id) lot_id, condition_id, basis_id from counting where basis_id is not null) pinned
                on pinned.lot_id = q.lot_id and pinned.condition_id = q.condition_id
        ),
        first as (
            select distinct on (lot_id, unit_id, condition_id) lot_id, unit_id, condition_id, run_id
            from ordered order by lot_id, unit_id, condition_id, received_no
        ),
        tried as (
            select f.lot_id, f.unit_id, count(*) as conditions, count(*) filter (where coalesce(k.outcome, v.outcome) <= 1) as passed
            from first f
            join judged j on j.lot_id = f.lot_id and j.condition_id = f.condition_id
            left join counting k on k.lot_id = f.lot_id and k.unit_id = f.unit_id and k.condition_id = f.condition_id and k.run_id = f.run_id
            left join lateral (
                select verdict.outcome from reading rd
                left join verdict on verdict.reading_id = rd.id and verdict.basis_id = j.basis_id
                where rd.run_id = f.run_id and k.run_id is null
                order by rd.number desc, verdict.at desc nulls last, verdict.id desc limit 1) v on true
            group by f.lot_id, f.unit_id
        ),
        first_pass as (
            select t.lot_id, count(*)::int as tested, (count(*) filter (where t.passed = n.conditions))::int as passed
            from tried t
            join (select lot_id, count(*) as conditions from judged group by lot_id) n on n.lot_id = t.lot_id and n.conditions = t.conditions
            group by t.lot_id
        )
        """;

    private static readonly string Sql = LotStandingSql.Chosen("where l.id = @lot") + LotStandingSql.Chain + Chain
        + " select tested, passed from first_pass";

    /// <summary>Counts what a lot came to at the first try.</summary>
    public static Task<FirstPass> ReadAsync(ResponseLedgerContext db, Guid lotId, CancellationToken cancellationToken)
        => RawQuery.ReadAsync(
            db,
            Sql,
            parameters =>
            {
                parameters.AddWithValue("engine", Judge.EngineVersion);
                parameters.AddWithValue("lot", lotId);
            },
            async (rows, token) => await rows.ReadAsync(token) ? new FirstPass(rows.GetInt32(0), rows.GetInt32(1)) : new FirstPass(0, 0),
            cancellationToken);
}

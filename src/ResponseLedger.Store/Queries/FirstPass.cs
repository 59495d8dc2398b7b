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
    private static readonly string Sql = LotStandingSql.Chosen("where l.id = @lot") + LotStandingSql.Chain +
        """
        , judged as (
            select q.condition_id, coalesce(q.basis_id, (select k.basis_id from counting k where k.condition_id = q.condition_id and k.basis_id is not null limit 1)) as basis_id
            from required q
        ),
        first as (
            select distinct on (unit_id, condition_id) unit_id, condition_id, run_id from ordered order by unit_id, condition_id, received_no
        ),
        tried as (
            select f.unit_id, count(*) as conditions, count(*) filter (where v.outcome <= 1) as passed
            from first f
            join judged j on j.condition_id = f.condition_id
            join lateral (select id from reading where run_id = f.run_id order by number desc limit 1) rd on true
            left join lateral (select outcome from verdict where reading_id = rd.id and basis_id = j.basis_id order by at desc, id desc limit 1) v on true
            group by f.unit_id
        )
        select count(*)::int, (count(*) filter (where t.passed = n.conditions))::int
        from tried t
        cross join (select count(*) as conditions from judged) n
        where t.conditions = n.conditions
        """;

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
            async (rows, token) =>
            {
                await rows.ReadAsync(token);
                return new FirstPass(rows.GetInt32(0), rows.GetInt32(1));
            },
            cancellationToken);
}

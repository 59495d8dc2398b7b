using Npgsql;
using ResponseLedger.Engine.Masks;
using ResponseLedger.Records.Verdicts;

namespace ResponseLedger.Store.Queries;

/// <summary>How every unit of a lot stands, read by one statement and so of one moment.</summary>
/// <param name="LotId">The lot.</param>
/// <param name="Conditions">The device's conditions in their order; of a decided lot those that were pinned.</param>
/// <param name="Units">Every unit that was declared or has runs, by serial number.</param>
public sealed record LotStanding(Guid LotId, IReadOnlyList<LotCondition> Conditions, IReadOnlyList<UnitStanding> Units)
{
    private static readonly string Sql = LotStandingSql.Chosen("where l.id = @lot") + LotStandingSql.Chain +
        """
        select q.condition_id, q.name, q.mask_id, q.mask_revision, q.golden_run_id, q.golden_reading_id,
               s.unit_id, u.serial, s.outcome, s.tested, s.disposition, s.disposition_reason,
               s.runs::int, s.retests::int, s.invalidated::int, s.stale::int,
               k.run_id, k.reading_id, k.verdict_id, k.basis_id, k.outcome, k.worst_index, k.margins, k.outcomes, k.frequencies_hz,
               k.measured_at, k.at
        from required q
        left join standing s on s.lot_id = q.lot_id
        left join unit u on u.id = s.unit_id
        left join counting k on k.lot_id = q.lot_id and k.unit_id = s.unit_id and k.condition_id = q.condition_id
        order by u.serial, s.unit_id, q.ordinal
        """;

    /// <summary>The counts.</summary>
    public LotTally Tally => LotTally.Of(Units);

    /// <summary>Reads how a lot stands. A lot that does not exist has no conditions and no units.</summary>
    public static Task<LotStanding> ReadAsync(ResponseLedgerContext db, Guid lotId, CancellationToken cancellationToken)
        => RawQuery.ReadAsync(
            db,
            Sql,
            parameters =>
            {
                parameters.AddWithValue("engine", Judge.EngineVersion);
                parameters.AddWithValue("lot", lotId);
            },
            (rows, token) => ReadRowsAsync(rows, lotId, token),
            cancellationToken);

    private static async Task<LotStanding> ReadRowsAsync(NpgsqlDataReader rows, Guid lotId, CancellationToken cancellationToken)
    {
        var conditions = new List<LotCondition>();
        var units = new List<UnitStanding>();
        List<CountingRunRow> counting = [];
        while (await rows.ReadAsync(cancellationToken))
        {
            // The rows of a unit stand together, and the first unit's name every condition.
            var unitId = rows.GuidOrNull(6);
            if (units.Count == 0 || units[^1].UnitId == unitId)
                AddCondition(conditions, rows);
            if (unitId is not { } id)
                continue;
            if (units.Count == 0 || units[^1].UnitId != id)
            {
                counting = [];
                units.Add(ReadUnit(rows, id, counting));
            }

            if (!rows.IsDBNull(16))
                counting.Add(ReadCounting(rows));
        }

        return new LotStanding(lotId, conditions, units);
    }

    private static void AddCondition(List<LotCondition> conditions, NpgsqlDataReader row)
    {
        var id = row.GetGuid(0);
        if (conditions.Exists(c => c.Id == id))
            return;
        conditions.Add(new LotCondition(id, row.GetString(1), row.GuidOrNull(2), row.IntOrNull(3), row.GuidOrNull(4), row.GuidOrNull(5)));
    }

    private static UnitStanding ReadUnit(NpgsqlDataReader row, Guid unitId, IReadOnlyList<CountingRunRow> counting) => new(
        unitId,
        row.GetString(7),
        row.IsDBNull(8) ? null : (Outcome)row.GetInt16(8),
        row.GetBoolean(9),
        row.IsDBNull(10) ? null : new UnitDispositionInForce(row.GetString(10), row.GetString(11)),
        row.GetInt32(12),
        row.GetInt32(13),
        row.GetInt32(14),
        row.GetInt32(15),
        counting);

    private static CountingRunRow ReadCounting(NpgsqlDataReader row) => new(
        row.GetGuid(0),
        row.GetGuid(16),
        row.GetGuid(17),
        row.GuidOrNull(18),
        row.GuidOrNull(19),
        row.IsDBNull(18)
            ? null
            : new StoredVerdict(
                (Outcome)row.GetInt16(20),
                row.IsDBNull(21) ? null : row.GetInt16(21),
                row.GetFieldValue<double?[]>(22),
                row.GetFieldValue<short[]>(23),
                row.GetFieldValue<double?[]>(24)),
        row.GetFieldValue<DateTimeOffset>(25),
        row.GetFieldValue<DateTimeOffset>(26));
}

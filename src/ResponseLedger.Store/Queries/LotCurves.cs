using System.Collections.Frozen;
using ResponseLedger.Engine.Masks;
using ResponseLedger.Engine.Sweeps;
using ResponseLedger.Records.Verdicts;
using ResponseLedger.Store.Curves;

namespace ResponseLedger.Store.Queries;

/// <summary>A curve of a lot in one condition.</summary>
/// <param name="RunId">The run.</param>
/// <param name="Serial">Serial number of its unit.</param>
/// <param name="Outcome">The run's outcome; null where it is not judged, and for the golden run.</param>
/// <param name="Sweep">What was measured.</param>
public sealed record LotCurve(Guid RunId, string Serial, Outcome? Outcome, Sweep Sweep);

/// <summary>The curves of a lot's counting runs in one condition, with what they are drawn against.</summary>
/// <param name="Condition">The condition.</param>
/// <param name="MaskDocument">Canonical bytes of the mask revision, or null where none is released.</param>
/// <param name="GainUnit">Unit of the device's gain.</param>
/// <param name="Golden">The golden run, or null where none is set.</param>
/// <param name="Runs">The counting runs by serial number.</param>
public sealed record LotCurves(LotCondition Condition, byte[]? MaskDocument, string GainUnit, LotCurve? Golden, IReadOnlyList<LotCurve> Runs)
{
    // Kinds of row: the condition first, each grid once, then the curves.
    private const int ConditionRow = 0;
    private const int GridRow = 1;
    private const int GoldenRow = 2;

    private static readonly string Sql = LotStandingSql.Chosen("where l.id = @lot") + LotStandingSql.Chain +
        """
        , asked as materialized (
            select * from required
            where @condition is null or condition_id::text = lower(@condition) or name = @condition
            order by (condition_id::text = lower(@condition)) desc, ordinal limit 1
        ),
        drawn as materialized (
            select 3 as kind, k.run_id, u.serial, k.outcome, k.reading_id
            from counting k join asked q on q.condition_id = k.condition_id join unit u on u.id = k.unit_id
            union all
            select 2, q.golden_run_id, u.serial, null, q.golden_reading_id
            from asked q
            join lateral (select unit_id from run_assignment where run_id = q.golden_run_id order by number desc limit 1) a on true
            join unit u on u.id = a.unit_id
        )
        select 0 as kind, q.condition_id as id, q.name as text, null::smallint as outcome, null::bytea as grid_sha256, m.document as bytes, null::smallint as form,
               q.mask_id, q.mask_revision, q.golden_run_id, q.golden_reading_id, d.gain_unit, null::double precision as noise_floor_db
        from asked q
        left join mask_revision m on m.mask_id = q.mask_id
        cross join chosen c
        join device d on d.id = c.device_id
        union all
        select 1, null, null, null, g.sha256, g.planes, null, null, null, null, null, null, null
        from grid g where g.sha256 in (select rd.grid_sha256 from drawn join reading rd on rd.id = drawn.reading_id)
        union all
        select drawn.kind, drawn.run_id, drawn.serial, drawn.outcome, rd.grid_sha256, v.planes, rd.form, null, null, null, null, null, rd.noise_floor_db
        from drawn
        join reading rd on rd.id = drawn.reading_id
        join curve v on v.reading_id = drawn.reading_id
        """;

    /// <summary>Reads the curves; null where the lot has no such condition. The sweeps are made on several cores.</summary>
    /// <param name="db">The store.</param>
    /// <param name="lotId">The lot.</param>
    /// <param name="condition">Id or name of the condition; null for the first.</param>
    /// <param name="cancellationToken">Stops it.</param>
    public static async Task<LotCurves?> ReadAsync(ResponseLedgerContext db, Guid lotId, string? condition, CancellationToken cancellationToken)
    {
        var raw = await RawQuery.ReadAsync(
            db,
            Sql,
            parameters =>
            {
                parameters.AddWithValue("engine", Judge.EngineVersion);
                parameters.AddWithValue("lot", lotId);
                parameters.Add(new Npgsql.NpgsqlParameter("condition", NpgsqlTypes.NpgsqlDbType.Text) { Value = (object?)condition ?? DBNull.Value });
            },
            ReadRowsAsync,
            cancellationToken);
        if (raw.Head is not { } head)
            return null;

        var curves = new LotCurve[raw.Curves.Count];
        Parallel.For(0, curves.Length, i => curves[i] = Unpack(raw.Curves[i], raw.Grids));
        var isGolden = raw.Curves.Select(c => c.IsGolden).ToArray();
        return new LotCurves(
            head.Condition,
            head.Mask,
            head.GainUnit,
            curves.Where((_, i) => isGolden[i]).FirstOrDefault(),
            [.. curves.Where((_, i) => !isGolden[i]).OrderBy(c => c.Serial, StringComparer.Ordinal)]);
    }

    private static LotCurve Unpack(RawCurve curve, FrozenDictionary<Key, byte[]> grids)
        => new(curve.RunId, curve.Serial, curve.Outcome, CurveCodec.Unpack(curve.Form, grids[curve.Grid], curve.Planes, curve.NoiseFloorDb));

    private static async Task<Raw> ReadRowsAsync(Npgsql.NpgsqlDataReader rows, CancellationToken cancellationToken)
    {
        Head? head = null;
        var grids = new Dictionary<Key, byte[]>();
        var curves = new List<RawCurve>();
        while (await rows.ReadAsync(cancellationToken))
        {
            var kind = rows.GetInt32(0);
            if (kind == ConditionRow)
            {
                head = new Head(
                    new LotCondition(rows.GetGuid(1), rows.GetString(2), rows.GuidOrNull(7), rows.IntOrNull(8), rows.GuidOrNull(9), rows.GuidOrNull(10)),
                    rows.IsDBNull(5) ? null : rows.GetFieldValue<byte[]>(5),
                    rows.GetString(11));
            }
            else if (kind == GridRow)
            {
                grids[Key.Of(rows.GetFieldValue<byte[]>(4))] = rows.GetFieldValue<byte[]>(5);
            }
            else
            {
                curves.Add(new RawCurve(
                    kind == GoldenRow,
                    rows.GetGuid(1),
                    rows.GetString(2),
                    rows.IsDBNull(3) ? null : (Outcome)rows.GetInt16(3),
                    Key.Of(rows.GetFieldValue<byte[]>(4)),
                    (SweepForm)rows.GetInt16(6),
                    rows.GetFieldValue<byte[]>(5),
                    rows.IsDBNull(12) ? null : rows.GetDouble(12)));
            }
        }

        return new Raw(head, grids.ToFrozenDictionary(), curves);
    }

    // A SHA-256 compared by value.
    private readonly record struct Key(UInt128 High, UInt128 Low)
    {
        public static Key Of(ReadOnlySpan<byte> sha256)
            => new(System.Buffers.Binary.BinaryPrimitives.ReadUInt128BigEndian(sha256), System.Buffers.Binary.BinaryPrimitives.ReadUInt128BigEndian(sha256[16..]));
    }

    private sealed record Head(LotCondition Condition, byte[]? Mask, string GainUnit);

    private sealed record RawCurve(bool IsGolden, Guid RunId, string Serial, Outcome? Outcome, Key Grid, SweepForm Form, byte[] Planes, double? NoiseFloorDb);

    private sealed record Raw(Head? Head, FrozenDictionary<Key, byte[]> Grids, List<RawCurve> Curves);
}

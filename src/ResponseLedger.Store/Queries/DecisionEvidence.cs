using Microsoft.EntityFrameworkCore;
using ResponseLedger.Records.Verdicts;
using ResponseLedger.Store.Model;

namespace ResponseLedger.Store.Queries;

/// <summary>A production run of a lot, whether or not it counts.</summary>
/// <param name="RunId">The run.</param>
/// <param name="UnitId">Its unit.</param>
/// <param name="ConditionId">Its condition.</param>
/// <param name="IsInvalidated">Whether it was invalidated.</param>
/// <param name="Cause">The assignable cause, of an invalidated run.</param>
/// <param name="Reason">The reason given for the invalidation.</param>
/// <param name="MeasuredAt">When it was measured.</param>
/// <param name="ReceivedAt">When it was received.</param>
/// <param name="ById">The person who sent it, or null when a bench did.</param>
/// <param name="FilesSha256">SHA-256 of each file, in the run's order.</param>
public sealed record LotRun(
    Guid RunId,
    Guid UnitId,
    Guid ConditionId,
    bool IsInvalidated,
    string? Cause,
    string? Reason,
    DateTimeOffset MeasuredAt,
    DateTimeOffset ReceivedAt,
    Guid? ById,
    IReadOnlyList<byte[]> FilesSha256);

/// <summary>What a decision pins beside the standing of the units. Read it under the lot's lock: then nothing in it changes.</summary>
/// <param name="Device">The lot's device.</param>
/// <param name="Runs">Every production run of the lot.</param>
/// <param name="MaskSha256">SHA-256 of the mask revisions asked for, by id.</param>
/// <param name="GoldenFilesSha256">Digest over the files of the golden runs asked for, by run.</param>
public sealed record DecisionEvidence(
    Device Device,
    IReadOnlyList<LotRun> Runs,
    IReadOnlyDictionary<Guid, byte[]> MaskSha256,
    IReadOnlyDictionary<Guid, byte[]> GoldenFilesSha256)
{
    private static readonly string Sql = LotStandingSql.Chosen("where l.id = @lot") + LotStandingSql.Chain +
        """
        select o.run_id, o.unit_id, o.condition_id, o.invalidated, o.cause, o.reason, o.measured_at, o.at, o.by_id,
               (select array_agg(f.sha256 order by f.ordinal) from run_file f where f.run_id = o.run_id)
        from ordered o
        order by o.received_no
        """;

    /// <summary>Reads the evidence of a lot.</summary>
    public static async Task<DecisionEvidence> ReadAsync(ResponseLedgerContext db, Lot lot, LotStanding standing, CancellationToken cancellationToken)
    {
        ArgumentNullException.ThrowIfNull(db);
        ArgumentNullException.ThrowIfNull(lot);
        ArgumentNullException.ThrowIfNull(standing);
        var masks = standing.Conditions.Select(c => c.MaskId).OfType<Guid>().ToArray();
        var golden = standing.Conditions.Select(c => c.GoldenRunId).OfType<Guid>().ToArray();
        return new DecisionEvidence(
            await db.Devices.AsNoTracking().SingleAsync(d => d.Id == lot.DeviceId, cancellationToken),
            await ReadRunsAsync(db, lot.Id, cancellationToken),
            await db.MaskRevisions.Where(m => masks.Contains(m.MaskId)).ToDictionaryAsync(m => m.MaskId, m => m.Sha256, cancellationToken),
            await db.Runs.Where(r => golden.Contains(r.Id)).ToDictionaryAsync(r => r.Id, r => r.FilesDigest, cancellationToken));
    }

    private static Task<List<LotRun>> ReadRunsAsync(ResponseLedgerContext db, Guid lotId, CancellationToken cancellationToken)
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
                var runs = new List<LotRun>();
                while (await rows.ReadAsync(token))
                {
                    runs.Add(new LotRun(
                        rows.GetGuid(0),
                        rows.GetGuid(1),
                        rows.GetGuid(2),
                        rows.GetBoolean(3),
                        rows.TextOrNull(4),
                        rows.TextOrNull(5),
                        rows.GetFieldValue<DateTimeOffset>(6),
                        rows.GetFieldValue<DateTimeOffset>(7),
                        rows.GuidOrNull(8),
                        rows.IsDBNull(9) ? [] : rows.GetFieldValue<byte[][]>(9)));
                }

                return runs;
            },
            cancellationToken);
}

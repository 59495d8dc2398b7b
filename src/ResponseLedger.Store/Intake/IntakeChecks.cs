using Npgsql;
using ResponseLedger.Store.Queries;
using static ResponseLedger.Store.Queries.PreparedBatch;

namespace ResponseLedger.Store.Intake;

/// <summary>What stands in the store against a file, or beside it.</summary>
/// <param name="DecidedLot">Number of the lot, where it is decided; else null.</param>
/// <param name="First">The first run of the same bytes for the same unit, lot and purpose, or null.</param>
/// <param name="PlacedElsewhere">Whether that run was reassigned since.</param>
/// <param name="OtherSerial">A unit of the lot for which the same bytes stand, or null.</param>
/// <param name="CountingRunId">The valid production run of the unit in the condition that was received first, or null.</param>
internal sealed record IntakeFindings(string? DecidedLot, Guid? First, bool PlacedElsewhere, string? OtherSerial, Guid? CountingRunId);

/// <summary>
/// Looks for duplicates, the same bytes elsewhere in the lot, and an earlier valid run: one round trip. Inside an act it first shares
/// the lot's lock as <see cref="LotGate.EnterAsync"/> does, and takes two more, so that files sent at the same time see each other.
/// Each statement sees what was committed before it began, so what follows the locks is read after they are held.
/// </summary>
internal static class IntakeChecks
{
    // Classes of advisory locks. Every file takes them in this order and holds one of each, so no two files wait for each other.
    private const int SameBytesLock = 0x524C_0001;
    private const int SameUnitLock = 0x524C_0002;

    private const string ShareLotSql = "select 1 from lot where id = $1 for share";

    private const string DecidedSql =
        """
        select l.number from lot l
        join decision d on d.lot_id = l.id and not exists (select 1 from reopening undone where undone.decision_id = d.id)
        where l.id = $1
        """;

    private const string LockSql = "select pg_advisory_xact_lock($1, hashtext($2))";

    private const string SameBytesSql =
        """
        select r.id, r.purpose,
               rd.device_id = $3 and rd.serial = $4 and r.lot_id is not distinct from $5 as received_here,
               ad.device_id = $3 and ad.serial = $4 and a.lot_id is not distinct from $5 as placed_here,
               ad.serial, a.lot_id is not distinct from $5 as in_lot
        from run_file f
        join run r on r.id = f.run_id and r.files_digest = $2
        join unit rd on rd.id = r.unit_id
        join lateral (select unit_id, lot_id from run_assignment where run_id = r.id order by number desc limit 1) a on true
        join unit ad on ad.id = a.unit_id
        where f.sha256 = $1 and f.ordinal = 0
          and (r.lot_id is not distinct from $5 or a.lot_id is not distinct from $5)
        order by r.received_no
        """;

    private const string CountingSql =
        """
        select r.id
        from unit u
        join run_assignment a on a.unit_id = u.id and a.lot_id = $3 and a.condition_id = $4
        join run r on r.id = a.run_id
        where u.device_id = $1 and u.serial = $2 and r.purpose = 'production'
          and not exists (select 1 from run_assignment later where later.run_id = a.run_id and later.number > a.number)
          and not exists (select 1 from run_invalidation i where i.run_id = r.id)
        order by r.received_no
        limit 1
        """;

    public static async Task<IntakeFindings> FindAsync(
        ResponseLedgerContext db, IntakeOrder order, IntakeFile file, byte[] filesDigest, bool locking, CancellationToken cancellationToken)
    {
        await using var batch = On(db);
        if (locking)
        {
            batch.Add(ShareLotSql, Of(order.LotId));
            var place = order.LotId?.ToString() ?? order.DeviceId.ToString();
            batch.Add(LockSql, Of(SameBytesLock), Of(place + Convert.ToHexString(filesDigest)));
            batch.Add(LockSql, Of(SameUnitLock), Of(place + order.ConditionId + file.Serial));
        }

        batch.Add(DecidedSql, Of(order.LotId));
        batch.Add(SameBytesSql, Of(file.Sha256), Of(filesDigest), Of(order.DeviceId), Of(file.Serial), Of(order.LotId));
        batch.Add(CountingSql, Of(order.DeviceId), Of(file.Serial), Of(order.LotId), Of(order.ConditionId));
        await batch.PrepareAsync(cancellationToken);
        await using var reader = await batch.ExecuteReaderAsync(cancellationToken);
        for (var skipped = locking ? 3 : 0; skipped > 0; skipped--)
            await reader.NextResultAsync(cancellationToken);
        return await ReadAsync(reader, order, cancellationToken);
    }

    private static async Task<IntakeFindings> ReadAsync(NpgsqlDataReader reader, IntakeOrder order, CancellationToken cancellationToken)
    {
        var decidedLot = await reader.ReadAsync(cancellationToken) ? reader.GetString(0) : null;
        await reader.NextResultAsync(cancellationToken);
        Guid? first = null;
        var placedElsewhere = false;
        string? otherSerial = null;
        while (await reader.ReadAsync(cancellationToken))
        {
            var receivedHere = reader.GetBoolean(2);
            var placedHere = reader.GetBoolean(3);
            if (first is null && reader.GetString(1) == order.Purpose && (receivedHere || placedHere))
            {
                first = reader.GetGuid(0);
                placedElsewhere = !placedHere;
            }
            else if (order.LotId is not null && reader.GetBoolean(5) && !placedHere)
            {
                otherSerial ??= reader.GetString(4);
            }
        }

        await reader.NextResultAsync(cancellationToken);
        var counting = order.Purpose == RunPurposes.Production && await reader.ReadAsync(cancellationToken) ? reader.GetGuid(0) : (Guid?)null;
        return new IntakeFindings(decidedLot, first, placedElsewhere, otherSerial, counting);
    }
}

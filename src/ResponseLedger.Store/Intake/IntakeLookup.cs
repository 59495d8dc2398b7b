using Microsoft.EntityFrameworkCore;
using Npgsql;
using ResponseLedger.Records.Verdicts;
using ResponseLedger.Store.Judging;
using ResponseLedger.Store.Queries;
using static ResponseLedger.Store.Queries.PreparedBatch;

namespace ResponseLedger.Store.Intake;

/// <summary>What a sender calls the place of a run, as they wrote it; null where it was left out.</summary>
/// <param name="Device">Id, part number or <c>PART/REV</c>.</param>
/// <param name="Lot">Id or number.</param>
/// <param name="Bench">Id or name.</param>
/// <param name="BoundBenchId">The bench that the sender's token is bound to, or null.</param>
/// <param name="TokenId">The sender's token, or null for a person.</param>
public sealed record PlaceNames(string? Device, string? Lot, string? Bench, Guid? BoundBenchId, Guid? TokenId);

/// <summary>A device that fits.</summary>
public sealed record FoundDevice(Guid Id, string PartNumber, string Revision);

/// <summary>A lot that fits.</summary>
public sealed record FoundLot(Guid Id, Guid DeviceId, string Number);

/// <summary>A condition of a device that fits, in the device's order, with what its runs are judged by now; null where it has no released mask.</summary>
public sealed record FoundCondition(Guid Id, Guid DeviceId, string Name, CurrentBasis? Basis);

/// <summary>A bench that fits, with its pattern for serial numbers in file names.</summary>
/// <param name="Id">The bench.</param>
/// <param name="Name">Its name.</param>
/// <param name="SerialPattern">The pattern in force, or null.</param>
/// <param name="NoiseFloorDb">The noise floor in force in dB, or null.</param>
/// <param name="IsBound">Whether the sender's token is bound to this one.</param>
/// <param name="IsNamed">Whether the sender named this one.</param>
public sealed record FoundBench(Guid Id, string Name, string? SerialPattern, double? NoiseFloorDb, bool IsBound, bool IsNamed);

/// <summary>Everything that fits the names; it is for the caller to refuse none or several.</summary>
public sealed record FoundPlaces(
    IReadOnlyList<FoundDevice> Devices,
    IReadOnlyList<FoundLot> Lots,
    IReadOnlyList<FoundCondition> Conditions,
    IReadOnlyList<FoundBench> Benches);

/// <summary>Finds devices, lots, conditions and benches by the names that senders use: one round trip.</summary>
public static class IntakeLookup
{
    private const string DevicesSql =
        """
        select id, part_number, revision from device
        where id = $1 or part_number = $2 or (part_number = $3 and revision = $4)
        order by part_number, revision
        limit 20
        """;

    // Those of the device that was named come first: a number that many devices use must not push them over the edge.
    private const string LotsSql =
        """
        select id, device_id, number from lot
        where id = $1 or number = $2
        order by device_id in (select id from device where id = $3 or part_number = $4 or (part_number = $5 and revision = $6)) desc, device_id
        limit 50
        """;

    private static readonly string ConditionsSql =
        $"""
         select c.id, c.device_id, c.name, f.*
         from condition c
         left join lateral ({CurrentBases.InForceOf("$7")}) f on true
         where c.device_id in (select id from device where id = $1 or part_number = $2 or (part_number = $3 and revision = $4))
            or c.device_id in (select device_id from lot where id = $5 or number = $6)
         order by c.device_id, c.ordinal
         """;

    private const string BenchesSql =
        """
        select b.id, b.name, s.serial_pattern, s.noise_floor_db,
               b.id = $3 or exists (select 1 from token_binding t where t.token_id = $4 and t.bench_id = b.id),
               b.id = $1 or b.name = $2
        from bench b
        left join lateral (select serial_pattern, noise_floor_db from bench_setting where bench_id = b.id order by number desc limit 1) s on true
        where b.id = $1 or b.name = $2 or b.id = $3 or b.id in (select bench_id from token_binding where token_id = $4)
        """;

    /// <summary>Finds what fits.</summary>
    public static async Task<FoundPlaces> FindAsync(ResponseLedgerContext db, PlaceNames names, CancellationToken cancellationToken)
    {
        ArgumentNullException.ThrowIfNull(db);
        ArgumentNullException.ThrowIfNull(names);
        await db.Database.OpenConnectionAsync(cancellationToken);
        try
        {
            await using var batch = On(db);
            batch.Add(DevicesSql, DeviceKeys(names.Device));
            batch.Add(LotsSql, [.. Keys(names.Lot), .. DeviceKeys(names.Device)]);
            batch.Add(ConditionsSql, [.. DeviceKeys(names.Device), .. Keys(names.Lot), Of(Judge.EngineVersion)]);
            batch.Add(BenchesSql, [.. Keys(names.Bench), Of(names.BoundBenchId), Of(names.TokenId)]);
            await batch.PrepareAsync(cancellationToken);
            await using var reader = await batch.ExecuteReaderAsync(cancellationToken);
            return new FoundPlaces(
                await ListAsync(reader, r => new FoundDevice(r.GetGuid(0), r.GetString(1), r.GetString(2)), cancellationToken),
                await ListAsync(reader, r => new FoundLot(r.GetGuid(0), r.GetGuid(1), r.GetString(2)), cancellationToken),
                await ListAsync(reader, ReadCondition, cancellationToken),
                await ListAsync(reader, ReadBench, cancellationToken));
        }
        finally
        {
            await db.Database.CloseConnectionAsync();
        }
    }

    private static FoundCondition ReadCondition(NpgsqlDataReader row)
        => new(row.GetGuid(0), row.GetGuid(1), row.GetString(2), CurrentBases.Read(row, row.GetGuid(0), 3));

    private static FoundBench ReadBench(NpgsqlDataReader row)
        => new(row.GetGuid(0), row.GetString(1), row.IsDBNull(2) ? null : row.GetString(2), row.IsDBNull(3) ? null : row.GetDouble(3), IsTrue(row, 4), IsTrue(row, 5));

    // A comparison with a name that was left out is null, which means no.
    private static bool IsTrue(NpgsqlDataReader row, int column) => !row.IsDBNull(column) && row.GetBoolean(column);

    private static NpgsqlParameter[] Keys(string? text) => [Of(Guid.TryParse(text, out var id) ? id : (Guid?)null), OfText(text)];

    private static NpgsqlParameter[] DeviceKeys(string? text)
    {
        // At the first slash: a part number has none, and a revision may.
        var slash = text?.IndexOf('/', StringComparison.Ordinal) ?? -1;
        return slash <= 0
            ? [.. Keys(text), OfText(null), OfText(null)]
            : [.. Keys(text), OfText(text![..slash]), OfText(text[(slash + 1)..])];
    }

    private static async Task<List<T>> ListAsync<T>(NpgsqlDataReader reader, Func<NpgsqlDataReader, T> read, CancellationToken cancellationToken)
    {
        var list = new List<T>();
        while (await reader.ReadAsync(cancellationToken))
            list.Add(read(reader));
        await reader.NextResultAsync(cancellationToken);
        return list;
    }
}

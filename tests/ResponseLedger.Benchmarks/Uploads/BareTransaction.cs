using System.Security.Cryptography;
using Microsoft.Extensions.DependencyInjection;
using Npgsql;
using ResponseLedger.Benchmarks.Lab;
using ResponseLedger.Engine.Sweeps;
using ResponseLedger.Formats;
using ResponseLedger.Records.Decisions;
using ResponseLedger.Store.Curves;

namespace ResponseLedger.Benchmarks.Uploads;

/// <summary>
/// The yardstick of an upload: one transaction of one prepared batch that inserts the rows which an upload leaves, and nothing
/// else, on the server's own connections. No request, no parsing, no judging, no question before it; the values are made beforehand.
/// </summary>
internal sealed class BareTransaction
{
    private const string FileSql = "insert into file (sha256, content, at) values ($1, $2, $3) on conflict do nothing";
    private const string GridSql = "insert into grid (sha256, points, planes) values ($1, $2, $3) on conflict do nothing";
    private const string UnitSql = "insert into unit (id, device_id, serial, at) values ($1, $2, $3, $4)";

    private const string RunSql =
        """
        insert into run (id, device_id, unit_id, lot_id, bench_id, purpose, files_digest, measured_at, at)
        values ($1, $2, $3, $4, $5, 'production', $6, $7, $7)
        """;

    private const string RunFileSql = "insert into run_file (run_id, ordinal, sha256, name) values ($1, 0, $2, $3)";
    private const string AssignmentSql = "insert into run_assignment (run_id, number, unit_id, lot_id, condition_id, at) values ($1, 0, $2, $3, $4, $5)";

    private const string ReadingSql =
        """
        insert into reading (id, run_id, number, reader, reader_version, columns, grid_sha256, form, points, notes, at)
        values ($1, $2, 1, 'delimited', 1, $3, $4, $5, $6, $7, $8)
        """;

    private const string CurveSql = "insert into curve (reading_id, planes) values ($1, $2)";

    private const string VerdictSql =
        """
        insert into verdict (id, reading_id, basis_id, outcome, worst_index, margins, outcomes, frequencies_hz, reasons, at)
        values ($1, $2, $3, 0, 0, $4, $5, $4, $6, $7)
        """;

    private const string EntrySql = "insert into ledger_entry (id, kind, bytes, at) values ($1, 'run.received', $2, $3)";
    private const string QueueSql = "insert into ledger_queue (entry_id) values ($1)";

    private readonly NpgsqlDataSource source;
    private readonly BenchDevice device;
    private readonly Guid lotId;
    private readonly Guid benchId;
    private readonly Guid basisId;
    private readonly byte[] entry;

    private BareTransaction(NpgsqlDataSource source, BenchDevice device, Guid lotId, Guid benchId, Guid basisId, byte[] entry)
    {
        this.source = source;
        this.device = device;
        this.lotId = lotId;
        this.benchId = benchId;
        this.basisId = basisId;
        this.entry = entry;
    }

    /// <summary>Prepares for a device to which at least one upload was sent: it takes that one's ledger entry for its size.</summary>
    public static async Task<BareTransaction> OfAsync(BenchLab lab, BenchDevice device, Guid lotId)
    {
        var source = lab.Services.GetRequiredService<NpgsqlDataSource>();
        await using var ask = source.CreateCommand(
            """
            select (select bench_id from run where device_id = $1 limit 1), (select id from basis where condition_id = $2 order by at desc limit 1),
                   (select bytes from ledger_entry where kind = 'run.received' limit 1)
            """);
        ask.Parameters.AddWithValue(device.Id);
        ask.Parameters.AddWithValue(device.ConditionId);
        await using var row = await ask.ExecuteReaderAsync();
        await row.ReadAsync();
        return new BareTransaction(source, device, lotId, row.GetGuid(0), row.GetGuid(1), row.GetFieldValue<byte[]>(2));
    }

    /// <summary>The values of one run's rows.</summary>
    public Rows Prepare(byte[] content, string serial)
    {
        var reading = SweepFileReader.Read(content, "unit.csv");
        var sweep = reading.Sweep!;
        var grid = CurveCodec.PackGrid(sweep);
        var sha256 = SHA256.HashData(content);
        return new Rows(
            content, sha256, RunFilesDigest.Of([sha256]), serial, NewId(), NewId(), NewId(), NewId(), NewId(), sweep, grid, CurveCodec.GridKey(grid),
            CurveCodec.PackPlanes(sweep), reading.Choices!.ToJson(), System.Text.Json.JsonSerializer.Serialize(reading.Notes), entry, TimeProvider.System.GetUtcNow());
    }

    /// <summary>Inserts them: one round trip for the rows, one for the commit.</summary>
    public async Task InsertAsync(Rows r)
    {
        await using var connection = await source.OpenConnectionAsync();
        await using var transaction = await connection.BeginTransactionAsync();
        await using var batch = new NpgsqlBatch(connection, transaction);
        Add(batch, FileSql, r.Sha256, r.Content, r.At);
        Add(batch, GridSql, r.GridKey, r.Sweep.Count, r.Grid);
        Add(batch, UnitSql, r.UnitId, device.Id, r.Serial, r.At);
        Add(batch, RunSql, r.RunId, device.Id, r.UnitId, lotId, benchId, r.Digest, r.At);
        Add(batch, RunFileSql, r.RunId, r.Sha256, r.Serial + "_sweep.csv");
        Add(batch, AssignmentSql, r.RunId, r.UnitId, lotId, device.ConditionId, r.At);
        Add(batch, ReadingSql, r.ReadingId, r.RunId, r.Columns, r.GridKey, (short)r.Sweep.Form, r.Sweep.Count, r.Notes, r.At);
        Add(batch, CurveSql, r.ReadingId, r.Planes);
        Add(batch, VerdictSql, r.VerdictId, r.ReadingId, basisId, Margins, Outcomes, Reasons, r.At);
        Add(batch, EntrySql, r.EntryId, r.Entry, r.At);
        Add(batch, QueueSql, r.EntryId);
        await batch.PrepareAsync();
        await batch.ExecuteNonQueryAsync();
        await transaction.CommitAsync();
    }

    private static double?[] Margins => [0.1, 0.2, 0.3, 0.4, 0.5, 0.6];

    private static short[] Outcomes => [0, 0, 0, 0, 0, 0];

    private static string?[] Reasons => new string?[6];

    private static Guid NewId() => Guid.CreateVersion7(TimeProvider.System.GetUtcNow());

    private static void Add(NpgsqlBatch batch, string sql, params ReadOnlySpan<object> values)
    {
        var command = new NpgsqlBatchCommand(sql);
        foreach (var value in values)
            command.Parameters.Add(new NpgsqlParameter { Value = value });
        batch.BatchCommands.Add(command);
    }

    /// <summary>The values of one run's rows.</summary>
    internal sealed record Rows(
        byte[] Content, byte[] Sha256, byte[] Digest, string Serial, Guid UnitId, Guid RunId, Guid ReadingId, Guid VerdictId, Guid EntryId, Sweep Sweep,
        byte[] Grid, byte[] GridKey, byte[] Planes, string Columns, string Notes, byte[] Entry, DateTimeOffset At);
}

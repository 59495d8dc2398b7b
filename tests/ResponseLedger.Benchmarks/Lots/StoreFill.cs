using System.Security.Cryptography;
using Npgsql;
using NpgsqlTypes;
using ResponseLedger.Benchmarks.Lab;
using ResponseLedger.Engine.Sweeps;
using ResponseLedger.Store.Curves;

namespace ResponseLedger.Benchmarks.Lots;

/// <summary>
/// Fills a store with other lots of the same device: 100 units each, with readings, curves of 801 points and verdicts, copied in
/// bulk by the owner of the tables. Files are small here; lots' pages never look at them.
/// </summary>
internal sealed class StoreFill(BenchLab lab, BenchDevice device)
{
    private const int UnitsOfLot = 100;
    private const int Points = 801;

    private int made;

    /// <summary>Adds runs until there are this many in the store.</summary>
    public async Task UpToAsync(int runs)
    {
        var missing = runs - (int)await lab.CountAsync("select count(*) from run");
        if (missing > 0)
            await AddAsync(missing);

        // What autovacuum does by itself after a while.
        await lab.CountAsync("analyze");
    }

    private async Task AddAsync(int count)
    {
        var (frequencyHz, gainDb, phaseDeg) = SweepFile.Curve(Points, 0);
        var sweep = Sweep.Create(SweepForm.LevelPhase, frequencyHz, gainDb, phaseDeg);
        var gridKey = CurveCodec.GridKey(CurveCodec.PackGrid(sweep));
        var planes = CurveCodec.PackPlanes(sweep);
        var runs = Enumerable.Range(0, count).Select(i => new Run(NewId(), NewId(), NewId(), NewId(), $"FILL{made + i:000000}")).ToArray();
        var lots = runs.Chunk(UnitsOfLot).Select((_, i) => (Id: NewId(), Number: $"FILL-{made}-{i}")).ToArray();
        made += count;
        var at = TimeProvider.System.GetUtcNow();

        await using var connection = new NpgsqlConnection(lab.Store.OwnerConnectionString);
        await connection.OpenAsync();
        await using var transaction = await connection.BeginTransactionAsync();
        var (bench, basis, by) = await KnownAsync(connection);
        await CopyAsync(connection, "lot (id, device_id, number, size, at, by_id)", lots, (w, l) => w.Row(l.Id, device.Id, l.Number, UnitsOfLot, at, by));
        await CopyAsync(connection, "unit (id, device_id, serial, at)", runs, (w, r) => w.Row(r.Unit, device.Id, r.Serial, at));
        await CopyAsync(connection, "file (sha256, content, at)", runs, (w, r) => w.Row(r.Sha256, r.Content, at));
        await CopyAsync(
            connection, "run (id, device_id, unit_id, lot_id, bench_id, purpose, files_digest, measured_at, at)", runs,
            (w, r, i) => w.Row(r.Id, device.Id, r.Unit, lots[i / UnitsOfLot].Id, bench, "production", r.Sha256, at, at));
        await CopyAsync(connection, "run_file (run_id, ordinal, sha256, name)", runs, (w, r) => w.Row(r.Id, 0, r.Sha256, r.Serial + ".csv"));
        await CopyAsync(
            connection, "run_assignment (run_id, number, unit_id, lot_id, condition_id, at)", runs,
            (w, r, i) => w.Row(r.Id, 0, r.Unit, lots[i / UnitsOfLot].Id, device.ConditionId, at));
        await CopyAsync(
            connection, "reading (id, run_id, number, reader, reader_version, grid_sha256, form, points, notes, at)", runs,
            (w, r) => w.Row(r.Reading, r.Id, 1, "delimited", 1, gridKey, (short)SweepForm.LevelPhase, Points, "[]", at));
        await CopyAsync(connection, "curve (reading_id, planes)", runs, (w, r) => w.Row(r.Reading, planes));
        await CopyAsync(
            connection, "verdict (id, reading_id, basis_id, outcome, worst_index, margins, outcomes, frequencies_hz, reasons, at)", runs,
            (w, r) => w.Row(
                r.Verdict, r.Reading, basis, (short)0, (short)0, new double[] { 0.1, 0.2, 0.3, 0.4, 0.5, 0.6 }, new short[6],
                new double[] { 10, 20, 30, 40, 50, 60 }, new string?[6], at));
        await transaction.CommitAsync();
    }

    private async Task<(Guid Bench, Guid Basis, Guid By)> KnownAsync(NpgsqlConnection connection)
    {
        await using var ask = new NpgsqlCommand(
            "select (select id from bench limit 1), (select id from basis where condition_id = $1 order by at desc limit 1), (select id from person limit 1)", connection);
        ask.Parameters.AddWithValue(device.ConditionId);
        await using var row = await ask.ExecuteReaderAsync();
        await row.ReadAsync();
        return (row.GetGuid(0), row.GetGuid(1), row.GetGuid(2));
    }

    private static Task CopyAsync<T>(NpgsqlConnection connection, string into, T[] rows, Action<NpgsqlBinaryImporter, T> write)
        => CopyAsync(connection, into, rows, (writer, row, _) => write(writer, row));

    private static async Task CopyAsync<T>(NpgsqlConnection connection, string into, T[] rows, Action<NpgsqlBinaryImporter, T, int> write)
    {
        await using var writer = await connection.BeginBinaryImportAsync($"copy {into} from stdin (format binary)");
        for (var i = 0; i < rows.Length; i++)
            write(writer, rows[i], i);
        await writer.CompleteAsync();
    }

    private static Guid NewId() => Guid.CreateVersion7(TimeProvider.System.GetUtcNow());

    private sealed record Run(Guid Id, Guid Unit, Guid Reading, Guid Verdict, string Serial)
    {
        public byte[] Content { get; } = System.Text.Encoding.UTF8.GetBytes(Serial);

        public byte[] Sha256 => SHA256.HashData(Content);
    }
}

/// <summary>Writes a row by the types of its values.</summary>
internal static class CopiedRow
{
    public static void Row(this NpgsqlBinaryImporter writer, params ReadOnlySpan<object> values)
    {
        writer.StartRow();
        foreach (var value in values)
        {
            switch (value)
            {
                case Guid id: writer.Write(id, NpgsqlDbType.Uuid); break;
                case string text: writer.Write(text, NpgsqlDbType.Text); break;
                case int number: writer.Write(number, NpgsqlDbType.Integer); break;
                case short number: writer.Write(number, NpgsqlDbType.Smallint); break;
                case byte[] bytes: writer.Write(bytes, NpgsqlDbType.Bytea); break;
                case DateTimeOffset at: writer.Write(at, NpgsqlDbType.TimestampTz); break;
                case double[] numbers: writer.Write(numbers, NpgsqlDbType.Array | NpgsqlDbType.Double); break;
                case short[] numbers: writer.Write(numbers, NpgsqlDbType.Array | NpgsqlDbType.Smallint); break;
                case string?[] texts: writer.Write(texts, NpgsqlDbType.Array | NpgsqlDbType.Text); break;
                default: throw new ArgumentException($"No column takes a {value.GetType()}.", nameof(values));
            }
        }
    }
}

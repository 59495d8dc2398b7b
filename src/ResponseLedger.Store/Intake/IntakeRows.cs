using System.Text.Json;
using Npgsql;
using NpgsqlTypes;
using ResponseLedger.Engine.Sweeps;
using ResponseLedger.Formats;
using ResponseLedger.Records.Verdicts;
using ResponseLedger.Store.Acts;
using ResponseLedger.Store.Queries;
using static ResponseLedger.Store.Queries.PreparedBatch;

namespace ResponseLedger.Store.Intake;

/// <summary>
/// Writes everything that a taken file is: its bytes, grid and unit where they are new, the run, its first assignment, its
/// first reading with the curve, the verdict, and the act's ledger entries. One round trip.
/// </summary>
internal static class IntakeRows
{
    private const string FileSql = "insert into file (sha256, content, at) values ($1, $2, $3) on conflict do nothing";
    private const string GridSql = "insert into grid (sha256, points, planes) values ($1, $2, $3) on conflict do nothing";
    private const string UnitSql = "insert into unit (id, device_id, serial, at) values ($1, $2, $3, $4) on conflict do nothing";

    // The unit may have been made by somebody else in the meantime, so it is found by its key.
    private const string RunSql =
        """
        insert into run (id, device_id, unit_id, lot_id, bench_id, purpose, files_digest, measured_at, circumstances, at, by_id, token_id)
        values ($1, $2, (select id from unit where device_id = $2 and serial = $3), $4, $5, $6, $7, $8, $9, $10, $11, $12)
        """;

    private const string RunFileSql = "insert into run_file (run_id, ordinal, sha256, name) values ($1, 0, $2, $3)";

    private const string AssignmentSql =
        """
        insert into run_assignment (run_id, number, unit_id, lot_id, condition_id, at, by_id)
        select id, 0, unit_id, lot_id, $2, at, by_id from run where id = $1
        """;

    private const string ReadingSql =
        """
        insert into reading (id, run_id, number, reader, reader_version, columns, grid_sha256, form, points, notes, at, by_id, noise_floor_db)
        values ($1, $2, 1, $3, $4, $5, $6, $7, $8, $9, $10, $11, $12)
        """;

    private const string CurveSql = "insert into curve (reading_id, planes) values ($1, $2)";

    public static async Task WriteAsync(
        Act act, IntakeOrder order, IntakeFile file, byte[] content, byte[] filesDigest, Guid runId, FileReading reading, IntakeWork work,
        CancellationToken cancellationToken)
    {
        var sweep = reading.Sweep!;
        var readingId = act.NewId();
        await using var batch = On(act.Db);
        batch.Add(FileSql, Of(file.Sha256), Of(content), Of(act.At));
        batch.Add(GridSql, Of(work.GridKey), Of(sweep.Count), Of(work.Grid));
        batch.Add(UnitSql, Of(act.NewId()), Of(order.DeviceId), Of(file.Serial), Of(act.At));
        batch.Add(
            RunSql,
            Of(runId), Of(order.DeviceId), Of(file.Serial), Of(order.LotId), Of(order.BenchId), Of(order.Purpose), Of(filesDigest),
            Of(order.MeasuredAt ?? act.At), OfText(order.Circumstances), Of(act.At), Of(act.PersonId), Of(act.TokenId));
        batch.Add(RunFileSql, Of(runId), Of(file.Sha256), Of(file.Name));
        batch.Add(AssignmentSql, Of(runId), Of(order.ConditionId));
        AddReading(batch, act, runId, readingId, work.GridKey, sweep, reading);
        batch.Add(CurveSql, Of(readingId), Of(work.Planes));
        if (work.Verdict is { } verdict)
            verdict.AddTo(batch, act.NewId(), readingId, act.At);
        LedgerRows.AddTo(batch, act);
        await batch.PrepareAsync(cancellationToken);
        await batch.ExecuteNonQueryAsync(cancellationToken);
    }

    private static void AddReading(NpgsqlBatch batch, Act act, Guid runId, Guid readingId, byte[] gridKey, Sweep sweep, FileReading reading)
        => batch.Add(
            ReadingSql,
            Of(readingId), Of(runId), Of(reading.Reader), Of(reading.ReaderVersion), OfText(reading.Choices?.ToJson()), Of(gridKey),
            Of((short)sweep.Form), Of(sweep.Count), Of(JsonSerializer.Serialize(reading.Notes, JsonSerializerOptions.Web)), Of(act.At), Of(act.PersonId),
            new NpgsqlParameter { Value = (object?)sweep.PhaseFloorDb ?? DBNull.Value, NpgsqlDbType = NpgsqlDbType.Double });
}

/// <summary>A verdict as its row takes it.</summary>
/// <param name="BasisId">The basis.</param>
/// <param name="Judgement">What the reading came to on it.</param>
internal sealed record StoredVerdictRow(Guid BasisId, Judgement Judgement)
{
    private const string Sql =
        """
        insert into verdict (id, reading_id, basis_id, outcome, worst_index, margins, outcomes, frequencies_hz, reasons, at)
        values ($1, $2, $3, $4, $5, $6, $7, $8, $9, $10)
        on conflict do nothing
        """;

    public void AddTo(NpgsqlBatch batch, Guid id, Guid readingId, DateTimeOffset at)
    {
        var stored = Judgement.Stored;
        string?[] reasons = [.. Judgement.Evaluation.Criteria.Select(c => c.Reason?.Code)];
        var worst = new NpgsqlParameter { Value = stored.WorstIndex is { } index ? (short)index : DBNull.Value, NpgsqlDbType = NpgsqlDbType.Smallint };
        batch.Add(
            Sql,
            Of(id), Of(readingId), Of(BasisId), Of((short)stored.Outcome), worst, Of(stored.Margins), Of(stored.Outcomes),
            Of(stored.FrequenciesHz), Of(reasons), Of(at));
    }
}

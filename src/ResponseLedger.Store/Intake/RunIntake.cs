using System.Text.Json.Nodes;
using Microsoft.EntityFrameworkCore;
using Npgsql;
using ResponseLedger.Engine.Sweeps;
using ResponseLedger.Formats;
using ResponseLedger.Ledger;
using ResponseLedger.Records.Decisions;
using ResponseLedger.Records.Verdicts;
using ResponseLedger.Store.Acts;
using ResponseLedger.Store.Judging;
using ResponseLedger.Store.Queries;

namespace ResponseLedger.Store.Intake;

/// <summary>
/// The one way in for runs. Each file is read and judged first and then taken in an act of its own: a bad one leaves no trace,
/// and the others of its batch stand.
/// </summary>
public sealed class RunIntake(
    ActRunner acts, IDbContextFactory<ResponseLedgerContext> contexts, JudgingMaterial material, ColumnMemory columns)
{
    private const string SameFilesIndexColumns = "files_digest";

    /// <summary>Takes the files in their order, and tells what became of each.</summary>
    public async Task<IReadOnlyList<IntakeResult>> TakeAsync(
        Actor actor, IntakeOrder order, IReadOnlyList<IntakeFile> files, CancellationToken cancellationToken)
    {
        ArgumentNullException.ThrowIfNull(order);
        CurrentBasis? current;
        await using (var db = await contexts.CreateDbContextAsync(cancellationToken))
            current = await CurrentBases.FindAsync(db, order.ConditionId, cancellationToken);
        return await TakeAsync(actor, order, current, files, cancellationToken);
    }

    /// <summary>Takes the files in their order, and tells what became of each.</summary>
    /// <param name="actor">Who sends them.</param>
    /// <param name="order">Where they belong.</param>
    /// <param name="current">The basis in force of the condition as it was just looked up; null where it has no released mask.</param>
    /// <param name="files">The files.</param>
    /// <param name="cancellationToken">Stops between files.</param>
    public async Task<IReadOnlyList<IntakeResult>> TakeAsync(
        Actor actor, IntakeOrder order, CurrentBasis? current, IReadOnlyList<IntakeFile> files, CancellationToken cancellationToken)
    {
        ArgumentNullException.ThrowIfNull(actor);
        ArgumentNullException.ThrowIfNull(order);
        ArgumentNullException.ThrowIfNull(files);

        // A basis never changes. One that is replaced while the batch runs leaves verdicts that are merely stale.
        var basis = current is null ? null : await material.OfAsync(current.BasisId, cancellationToken);
        var results = new List<IntakeResult>(files.Count);
        var settledHeads = new HashSet<string>(StringComparer.Ordinal);
        foreach (var file in files)
            results.Add(await TakeAsync(actor, order, file, current, basis, settledHeads, cancellationToken));
        return results;
    }

    private async Task<IntakeResult> TakeAsync(
        Actor actor, IntakeOrder order, IntakeFile file, CurrentBasis? current, JudgementBasis? basis, HashSet<string> settledHeads,
        CancellationToken cancellationToken)
    {
        var content = await file.Open(cancellationToken);
        var filesDigest = RunFilesDigest.Of([file.Sha256]);
        var read = await ReadAsync(order, file, content, settledHeads, cancellationToken);
        if (read.Reading.Sweep is null)
            return await WithoutSweepAsync(order, file, filesDigest, read.Reading, cancellationToken);

        var sweep = read.Reading.Sweep;
        if (order.NoiseFloorDb is { } noiseFloorDb)
        {
            sweep = Sweep.Create(sweep.Form, sweep.FrequencyHz, sweep.FirstPlane, sweep.SecondPlane, phaseFloorDb: noiseFloorDb);
            read = read with { Reading = read.Reading with { Sweep = sweep } };
        }

        var work = new Lazy<IntakeWork>(() => IntakeWork.Of(sweep, current, basis));
        try
        {
            return await acts.RunAsync(actor, (act, token) => TakeAsync(act, order, file, content, filesDigest, read, work, token), cancellationToken);
        }
        catch (NotTakenException notTaken)
        {
            return notTaken.Result;
        }
        catch (PostgresException exception) when (IsSameFiles(exception))
        {
            return await WithoutSweepAsync(order, file, filesDigest, read.Reading, cancellationToken);
        }
    }

    private static async Task<IntakeResult> TakeAsync(
        Act act, IntakeOrder order, IntakeFile file, byte[] content, byte[] filesDigest, ReadFile read, Lazy<IntakeWork> work, CancellationToken cancellationToken)
    {
        var (found, made) = await WhileWaiting.DoAsync(
            IntakeChecks.FindAsync(act.Db, order, file, filesDigest, locking: true, cancellationToken), () => work.Value);
        if (found.First is { } first)
            throw new NotTakenException(IntakeResult.Duplicate(file.Name, file.Serial, first, found.PlacedElsewhere));
        if (found.DecidedLot is { } decided)
            throw Refuse(file, IntakeNotes.LotDecided, IntakeNotes.DecidedSentence(decided));
        if (found.OtherSerial is { } other && !order.OtherUnitAcknowledged)
            throw Refuse(file, IntakeNotes.SameFileOtherUnit, IntakeNotes.OtherUnitSentence(other));

        var runId = act.NewId();
        if (read.ToRemember is { } choice)
            ColumnMemory.Remember(act, order, choice);
        Record(act, order, file, runId, made.Judged);
        await IntakeRows.WriteAsync(act, order, file, content, filesDigest, runId, read.Reading, made, cancellationToken);
        return new IntakeResult(
            file.Name, file.Serial, IntakeOutcome.Accepted, runId, made.Judged, NotesOf(order, read, found), [], []);
    }

    private async Task<ReadFile> ReadAsync(
        IntakeOrder order, IntakeFile file, byte[] content, HashSet<string> settledHeads, CancellationToken cancellationToken)
    {
        var reading = file.Reading ?? SweepFileReader.Read(content, file.Name, order.Columns, cancellationToken);
        if (order.Columns is { } chosen)
        {
            // Only a choice that settled something new is worth remembering, and without heads there is nothing to know files by.
            var remembering = reading is { Sweep: not null, HeadsDigest: { } digest } && settledHeads.Add(digest)
                && ColumnMemory.IsOpen(SweepFileReader.Read(content, file.Name, null, cancellationToken))
                && (await columns.RecallAsync(order.BenchId, digest, cancellationToken))?.ToJson() != chosen.ToJson();
            return new ReadFile(reading, remembering ? new RememberedColumns(reading.HeadsDigest!, chosen) : null, false);
        }

        if (!ColumnMemory.IsOpen(reading) || reading.HeadsDigest is not { } heads
            || await columns.RecallAsync(order.BenchId, heads, cancellationToken) is not { } recalled)
            return new ReadFile(reading, null, false);
        var again = SweepFileReader.Read(content, file.Name, recalled, cancellationToken);
        return again.Sweep is null ? new ReadFile(reading, null, false) : new ReadFile(again, null, true);
    }

    // A file that the reader refuses may have been taken before, with columns chosen: then it is a duplicate all the same.
    private async Task<IntakeResult> WithoutSweepAsync(
        IntakeOrder order, IntakeFile file, byte[] filesDigest, FileReading reading, CancellationToken cancellationToken)
    {
        await using var db = await contexts.CreateDbContextAsync(cancellationToken);
        await db.Database.OpenConnectionAsync(cancellationToken);
        var found = await IntakeChecks.FindAsync(db, order, file, filesDigest, locking: false, cancellationToken);
        return found.First is { } first
            ? IntakeResult.Duplicate(file.Name, file.Serial, first, found.PlacedElsewhere)
            : IntakeResult.Refused(file.Name, file.Serial, reading);
    }

    private static List<ReadNote> NotesOf(IntakeOrder order, ReadFile read, IntakeFindings found)
    {
        var notes = new List<ReadNote>(read.Reading.Notes);
        if (read.Recalled)
            notes.Add(IntakeNotes.Remembered(order.BenchName));
        if (found.OtherSerial is { } other)
            notes.Add(IntakeNotes.Acknowledged(other));
        if (found.CountingRunId is { } counting)
            notes.Add(IntakeNotes.Retest(counting, order.ConditionName));
        return notes;
    }

    private static void Record(Act act, IntakeOrder order, IntakeFile file, Guid runId, IntakeVerdict? judged) => act.Record(
        "run.received",
        new JsonObject
        {
            ["runId"] = runId.ToString(),
            ["deviceId"] = order.DeviceId.ToString(),
            ["serial"] = file.Serial,
            ["lot"] = order.LotNumber,
        },
        new JsonObject
        {
            ["files"] = new JsonArray(new JsonObject { ["name"] = file.Name, ["sha256"] = Convert.ToHexStringLower(file.Sha256) }),
            ["bench"] = order.BenchName,
            ["condition"] = order.ConditionName,
            ["purpose"] = order.Purpose,
            ["measuredAt"] = Microseconds.Format(order.MeasuredAt ?? act.At),
            ["outcome"] = judged is null ? null : OutcomeWords.Format(judged.Judgement.Stored.Outcome),
            ["maskRevision"] = judged?.Basis.Mask.Revision,
            ["engine"] = Judge.EngineVersion,
            ["acknowledged"] = order.OtherUnitAcknowledged ? IntakeNotes.SameFileOtherUnit : null,
        });

    private static NotTakenException Refuse(IntakeFile file, string code, string sentence)
        => new(IntakeResult.Refused(file.Name, file.Serial, code, sentence));

    private static bool IsSameFiles(PostgresException exception)
        => exception.SqlState == PostgresErrorCodes.UniqueViolation && exception.TableName == "run"
            && exception.ConstraintName?.Contains(SameFilesIndexColumns, StringComparison.Ordinal) == true;

    private sealed record ReadFile(FileReading Reading, RememberedColumns? ToRemember, bool Recalled);

    // Rolls the act back and carries out of it what became of the file.
    private sealed class NotTakenException(IntakeResult result) : Exception("The file was not taken.")
    {
        public IntakeResult Result { get; } = result;
    }
}

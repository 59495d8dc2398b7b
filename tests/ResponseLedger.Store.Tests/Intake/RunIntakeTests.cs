using System.Globalization;
using System.Security.Cryptography;
using System.Text;
using Microsoft.EntityFrameworkCore;
using ResponseLedger.Ledger;
using ResponseLedger.Store.Curves;
using ResponseLedger.Store.Intake;
using ResponseLedger.Store.Judging;
using ResponseLedger.Store.Model;
using ResponseLedger.TestDatabase;

namespace ResponseLedger.Store.Tests.Intake;

/// <summary>What the intake keeps of a file, and that a file that is not taken leaves nothing.</summary>
public sealed class RunIntakeTests
{
    private static readonly Actor Ada = Actor.Person(SampleRows.NewId(), "Ada");
    private readonly SampleRows rows = new();

    private static CancellationToken Cancellation => TestContext.Current.CancellationToken;

    [Fact]
    public async Task A_taken_file_is_kept_with_its_bytes_and_reads_back_as_the_same_doubles()
    {
        await using var store = await OpenAsync();
        var content = File("0.1,-0.30000000000000004");
        var result = await TakeAsync(store, Order(noiseFloorDb: -60), IntakeFile.Of("S1.csv", "S1", content));
        Assert.Equal(IntakeOutcome.Accepted, result.Outcome);

        await using var db = Contexts.Open(store.ServerConnectionString);
        var reading = await db.Readings.SingleAsync(r => r.RunId == result.RunId, Cancellation);
        var sweep = await db.SweepOfAsync(reading.Id, Cancellation);
        Assert.Equal([10.0, 20.0], sweep!.FrequencyHz.ToArray());
        Assert.Equal([1.0, 0.1], sweep.FirstPlane.ToArray());
        Assert.Equal([0.0, -0.30000000000000004], sweep.SecondPlane.ToArray());
        Assert.Equal(-60, sweep.PhaseFloorDb);
        Assert.Equal(content, await db.Files.Where(f => f.Sha256 == SHA256.HashData(content)).Select(f => f.Content).SingleAsync(Cancellation));
        Assert.Equal(1, await db.LedgerEntries.CountAsync(e => e.Kind == "run.received", Cancellation));
    }

    [Fact]
    public async Task Files_and_grids_are_kept_once_however_many_runs_share_them()
    {
        await using var store = await OpenAsync();
        await TakeAsync(store, Order(), IntakeFile.Of("S1.csv", "S1", File("1,0")));
        await TakeAsync(store, Order() with { OtherUnitAcknowledged = true }, IntakeFile.Of("S2.csv", "S2", File("1,0")));
        await TakeAsync(store, Order(), IntakeFile.Of("S3.csv", "S3", File("2,0")));
        await using var db = Contexts.Open(store.ServerConnectionString);
        Assert.Equal((3, 2, 1, 3), (
            await db.Runs.CountAsync(Cancellation), await db.Files.CountAsync(Cancellation), await db.Grids.CountAsync(Cancellation), await db.Units.CountAsync(Cancellation)));
    }

    [Fact]
    public async Task A_refused_file_leaves_no_row_of_any_kind()
    {
        await using var store = await OpenAsync();
        await using (var db = Contexts.Open(store.OwnerConnectionString))
        {
            var record = "{}"u8.ToArray();
            db.Add(new Decision
            {
                Id = SampleRows.NewId(),
                LotId = rows.Lot.Id,
                Ordinal = 1,
                Kind = "reject",
                Reason = "r",
                Record = record,
                Sha256 = SHA256.HashData(record),
                At = SampleRows.At,
                ById = SampleRows.NewId(),
            });
            await db.SaveChangesAsync(Cancellation);
        }

        var decided = await TakeAsync(store, Order(), IntakeFile.Of("S1.csv", "S1", File("1,0")));
        var unread = await TakeAsync(store, Order(), IntakeFile.Of("S2.csv", "S2", File("1,NaN")));
        Assert.Equal([IntakeNotes.LotDecided], decided.Issues.Select(i => i.Code));
        Assert.Equal(IntakeOutcome.Refused, unread.Outcome);
        await using var after = Contexts.Open(store.ServerConnectionString);
        Assert.Equal((0, 0, 0, 0, 0), (
            await after.Runs.CountAsync(Cancellation), await after.Files.CountAsync(Cancellation), await after.Grids.CountAsync(Cancellation),
            await after.Units.CountAsync(Cancellation), await after.LedgerEntries.CountAsync(Cancellation)));
    }

    [Fact]
    public async Task A_connection_cut_around_the_commit_leaves_the_run_taken_exactly_once_with_its_entry_in_the_queue()
    {
        await using var store = await OpenAsync();
        for (var at = 1; ; at++)
        {
            var faults = new Faults(at, transient: true);
            var result = await TakeAsync(store, Order(), IntakeFile.Of($"S{at}.csv", $"S{at}", File($"{at},0")), faults);
            await using var db = Contexts.Open(store.ServerConnectionString);
            Assert.Equal((IntakeOutcome.Accepted, at, at, at, at), (
                result.Outcome, await db.Runs.CountAsync(Cancellation), await db.Curves.CountAsync(Cancellation),
                await db.LedgerEntries.CountAsync(e => e.Kind == "run.received", Cancellation), await db.LedgerQueue.CountAsync(Cancellation)));
            Assert.True(await db.Runs.AnyAsync(r => r.Id == result.RunId, Cancellation), $"cut {at}: another run was told than the one that is kept");
            if (!faults.Struck)
            {
                Assert.True(at > 2, "A commit was to be cut before and after it took effect.");
                return;
            }
        }
    }

    private static byte[] File(string secondRow) => Encoding.UTF8.GetBytes(string.Create(CultureInfo.InvariantCulture, $"frequency_hz,real,imag\n10,1,0\n20,{secondRow}\n"));

    private async Task<TestStore> OpenAsync()
    {
        var store = await TestDatabases.CreateAsync();
        await using var db = Contexts.Open(store.OwnerConnectionString);
        db.AddRange([rows.Device, rows.Condition, rows.Bench, rows.Lot]);
        await db.SaveChangesAsync(Cancellation);
        return store;
    }

    private IntakeOrder Order(double? noiseFloorDb = null)
        => new(rows.Device.Id, rows.Condition.Id, "standard", rows.Lot.Id, "L1", rows.Bench.Id, "Bench 1", RunPurposes.Production, NoiseFloorDb: noiseFloorDb);

    private static async Task<IntakeResult> TakeAsync(TestStore store, IntakeOrder order, IntakeFile file, Faults? faults = null)
    {
        await using var contexts = faults is null ? new Contexts(store.ServerConnectionString) : new Contexts(store.ServerConnectionString, faults);
        using var sequencer = contexts.Sequencer();
        var intake = new RunIntake(contexts.Acts(sequencer), contexts, new JudgingMaterial(contexts), new ColumnMemory(contexts));
        return Assert.Single(await intake.TakeAsync(Ada, order, [file], Cancellation));
    }
}

using System.Security.Cryptography;
using System.Text;
using Microsoft.Extensions.DependencyInjection;
using ResponseLedger.Engine.Sweeps;
using ResponseLedger.Ledger;
using ResponseLedger.Store;
using ResponseLedger.Store.Acts;
using ResponseLedger.Store.Curves;
using ResponseLedger.Store.Model;

namespace ResponseLedger.Server.Tests.Reevaluation;

/// <summary>
/// Puts lots and runs into the store by one act, without any verdict, so that thousands of them are there in a moment. Each
/// run is flat at its level from 100 Hz to 10 kHz, of a unit of its own.
/// </summary>
internal static class StoredRuns
{
    private static readonly double[] FrequencyHz = [100, 200, 500, 1_000, 2_000, 5_000, 10_000];

    public static async Task<Guid> NewLotAsync(this Lab lab, Guid deviceId, int size = 10)
        => await lab.ActAsync("lot.created", act =>
        {
            var lot = new Lot { Id = act.NewId(), DeviceId = deviceId, Number = Lab.Unique("LOT"), Size = size, At = act.At, ById = act.ById };
            act.Db.Add(lot);
            return lot.Id;
        });

    /// <summary>Adds a run for each level; the ids in the same order.</summary>
    public static async Task<IReadOnlyList<Guid>> AddRunsAsync(
        this Lab lab, Guid deviceId, Guid conditionId, Guid? lotId, IEnumerable<double> levelsDb, string purpose = "production")
        => await lab.ActAsync("run.received", act =>
        {
            var bench = new Bench { Id = act.NewId(), Name = Lab.Unique("stored bench"), At = act.At, ById = act.ById };
            act.Db.Add(bench);
            var ids = new List<Guid>();
            foreach (var levelDb in levelsDb)
            {
                var serial = Lab.Unique("SN");
                var unit = new Unit { Id = act.NewId(), DeviceId = deviceId, Serial = serial, At = act.At };
                var run = new Run
                {
                    Id = act.NewId(),
                    DeviceId = deviceId,
                    UnitId = unit.Id,
                    LotId = lotId,
                    BenchId = bench.Id,
                    Purpose = purpose,
                    FilesDigest = SHA256.HashData(Encoding.UTF8.GetBytes(serial)),
                    MeasuredAt = act.At,
                    At = act.At,
                };
                act.Db.AddRange(unit, run, new RunAssignment { RunId = run.Id, Number = 0, UnitId = unit.Id, LotId = lotId, ConditionId = conditionId, At = act.At });
                AddReading(act, run.Id, 1, Flat(levelDb));
                ids.Add(run.Id);
            }

            return ids;
        }, GridFirst);

    /// <summary>Reads a run anew: its next reading, flat at another level.</summary>
    public static Task<Guid> ReadAgainAsync(this Lab lab, Guid runId, int number, double levelDb)
        => lab.ActAsync("run.readAgain", act => AddReading(act, runId, number, Flat(levelDb)), GridFirst);

    /// <summary>Runs an act of the server with one entry.</summary>
    public static async Task<T> ActAsync<T>(this Lab lab, string kind, Func<Act, T> add, Func<Act, Task>? first = null)
        => await lab.Services.GetRequiredService<ActRunner>().RunAsync(
            Actor.Server,
            async (act, token) =>
            {
                if (first is not null)
                    await first(act);
                act.Record(kind, [], []);
                return add(act);
            },
            TestContext.Current.CancellationToken);

    /// <summary>A context to look with.</summary>
    public static ResponseLedgerContext Look(this Lab lab)
        => lab.Services.GetRequiredService<Microsoft.EntityFrameworkCore.IDbContextFactory<ResponseLedgerContext>>().CreateDbContext();

    private static Guid AddReading(Act act, Guid runId, int number, Sweep sweep)
    {
        var reading = new Reading
        {
            Id = act.NewId(),
            RunId = runId,
            Number = number,
            Reader = "delimited",
            ReaderVersion = 1,
            GridSha256 = CurveCodec.GridKey(CurveCodec.PackGrid(sweep)),
            Form = (short)sweep.Form,
            Points = sweep.Count,
            Notes = "[]",
            At = act.At,
        };
        act.Db.AddRange(reading, new Curve { ReadingId = reading.Id, Planes = CurveCodec.PackPlanes(sweep) });
        return reading.Id;
    }

    private static Sweep Flat(double levelDb)
        => Sweep.Create(SweepForm.LevelPhase, FrequencyHz, [.. FrequencyHz.Select(_ => levelDb)], [.. FrequencyHz.Select(_ => -10.0)]);

    private static async Task GridFirst(Act act)
    {
        var planes = CurveCodec.PackGrid(Flat(0));
        var key = CurveCodec.GridKey(planes);
        await Microsoft.EntityFrameworkCore.RelationalDatabaseFacadeExtensions.ExecuteSqlAsync(
            act.Db.Database, $"insert into grid (sha256, points, planes) values ({key}, {FrequencyHz.Length}, {planes}) on conflict do nothing");
    }
}

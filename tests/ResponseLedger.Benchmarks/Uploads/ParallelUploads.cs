using System.Collections.Concurrent;
using System.Diagnostics;
using System.Net;
using ResponseLedger.Benchmarks.Lab;
using ResponseLedger.Benchmarks.Measuring;

namespace ResponseLedger.Benchmarks.Uploads;

/// <summary>
/// Sixteen uploaders at once. First files of their own, for the throughput against as many bare transactions at once. Then the
/// same files of all of them together, each file sent by everybody: whatever the order, each is taken once and no row is double.
/// </summary>
internal static class ParallelUploads
{
    private const int Uploaders = 16;
    private const string RunsSql = "select count(*) from run where lot_id = '{0}'";

    // Everything that hangs on the lot's runs, each counted by itself: a run without one of them, or with two, shows.
    private static readonly (string What, string Sql)[] RowsOfRuns =
    [
        ("runs", RunsSql),
        ("numbers of receipt", "select count(distinct received_no) from run where lot_id = '{0}'"),
        ("files of runs", "select count(*) from run_file f join run r on r.id = f.run_id join file c on c.sha256 = f.sha256 where r.lot_id = '{0}'"),
        ("assignments", "select count(*) from run_assignment a join run r on r.id = a.run_id where r.lot_id = '{0}' and a.number = 0"),
        ("readings with curve and grid", "select count(*) from reading d join run r on r.id = d.run_id join curve c on c.reading_id = d.id join grid g on g.sha256 = d.grid_sha256 where r.lot_id = '{0}'"),
        ("verdicts", "select count(*) from verdict v join reading d on d.id = v.reading_id join run r on r.id = d.run_id where r.lot_id = '{0}'"),
        ("ledger entries", "select count(*) from ledger_entry e join run r on r.id::text = convert_from(e.bytes, 'UTF8')::json -> 'subject' ->> 'runId' where e.kind = 'run.received' and r.lot_id = '{0}'"),
        ("positions in the ledger", "select count(*) from ledger_position p join ledger_entry e on e.id = p.entry_id join run r on r.id::text = convert_from(e.bytes, 'UTF8')::json -> 'subject' ->> 'runId' where e.kind = 'run.received' and r.lot_id = '{0}'"),
    ];

    public static async Task RunAsync(BenchLab lab, Report report, Effort effort)
    {
        var each = effort.Of(60, 4);
        var device = await BenchDevice.NewAsync(lab);
        var warm = await device.NewLotAsync(10_000);
        await SendAllAsync(lab, device, warm, effort.Of(20, 2), shared: false, seed: 500_000);
        var bare = await BareTransaction.OfAsync(lab, device, warm);
        await InsertAllAsync(lab, bare, effort.Of(20, 2), "warm");

        var own = await device.NewLotAsync(10_000);
        var ownSent = await SendAllAsync(lab, device, own, each, shared: false, seed: 600_000);
        var bareSeconds = await InsertAllAsync(lab, bare, each, "measured");
        var shared = await device.NewLotAsync(10_000);
        var sharedSent = await SendAllAsync(lab, device, shared, effort.Of(20, 4), shared: true, seed: 700_000);
        await lab.SettleAsync();

        var files = Uploaders * each;
        report.Table(
            [$"{Uploaders} uploaders, {each} files each", "seconds", "files a second", "median ms", "p95 ms"],
            ["bare transactions", Report.Ratio(bareSeconds), Report.Number(files / bareSeconds), "", ""],
            ["uploads to their verdict", Report.Ratio(ownSent.Seconds), Report.Number(files / ownSent.Seconds), Report.Ms(ownSent.ServerMs.Median), Report.Ms(ownSent.ServerMs.P95)]);

        var rows = new List<string[]>();
        await CheckAsync(lab, report, rows, "own files", own, ownSent, expectedAccepted: files, sent: files);
        await CheckAsync(lab, report, rows, "each file by everybody", shared, sharedSent, expectedAccepted: effort.Of(20, 4), sent: Uploaders * effort.Of(20, 4));
        report.Table(["nothing lost, nothing double", "sent", "accepted", "duplicate", "other", .. RowsOfRuns.Select(r => r.What)], rows);
    }

    private static async Task CheckAsync(BenchLab lab, Report report, List<string[]> rows, string what, Guid lotId, Sent result, int expectedAccepted, long sent)
    {
        var accepted = result.Outcomes.GetValueOrDefault("accepted");
        var duplicate = result.Outcomes.GetValueOrDefault("duplicate");
        report.Same($"{what}: accepted", expectedAccepted, accepted);
        report.Same($"{what}: duplicates", sent - expectedAccepted, duplicate);
        report.Same($"{what}: run ids told", expectedAccepted, result.RunIds);
        var counts = new List<string>();
        foreach (var (name, sql) in RowsOfRuns)
        {
            var count = await lab.CountAsync(string.Format(System.Globalization.CultureInfo.InvariantCulture, sql, lotId));
            report.Same($"{what}: {name}", expectedAccepted, count);
            counts.Add(Report.Number(count));
        }

        rows.Add([what, Report.Number(sent), Report.Number(accepted), Report.Number(duplicate), Report.Number(sent - accepted - duplicate), .. counts]);
    }

    private static async Task<Sent> SendAllAsync(BenchLab lab, BenchDevice device, Guid lotId, int each, bool shared, int seed)
    {
        var files = Enumerable.Range(0, shared ? each : Uploaders * each).Select(i => SweepFile.Csv(UploadBenchmark.Points, seed + i)).ToArray();
        var outcomes = new ConcurrentDictionary<string, int>();
        var runIds = new ConcurrentDictionary<string, bool>();
        var times = new ConcurrentBag<double>();
        var start = Stopwatch.GetTimestamp();
        await Task.WhenAll(Enumerable.Range(0, Uploaders).Select(uploader => Task.Run(async () =>
        {
            for (var i = 0; i < each; i++)
            {
                var at = shared ? i : uploader * each + i;
                using var request = device.Upload(lotId, $"{seed}-{at}", files[at]);
                var answer = await lab.TimeAsync(lab.Bench, request);
                times.Add(answer.ServerMs);
                if (answer.Status is not (HttpStatusCode.OK or HttpStatusCode.Created))
                {
                    outcomes.AddOrUpdate($"status {(int)answer.Status}", 1, (_, n) => n + 1);
                    continue;
                }

                var result = answer.Json.GetProperty("results")[0];
                outcomes.AddOrUpdate(result.GetProperty("outcome").GetString()!, 1, (_, n) => n + 1);
                runIds[result.GetProperty("runId").GetString()!] = true;
            }
        })));
        var seconds = Stopwatch.GetElapsedTime(start).TotalSeconds;
        var serverMs = new Samples();
        foreach (var ms in times)
            serverMs.Add(ms);
        return new Sent(seconds, serverMs, new Dictionary<string, int>(outcomes), runIds.Count);
    }

    private static async Task<double> InsertAllAsync(BenchLab lab, BareTransaction bare, int each, string name)
    {
        var rows = Enumerable.Range(0, Uploaders * each).Select(i => bare.Prepare(SweepFile.Csv(UploadBenchmark.Points, 800_000 + name.Length * 10_000 + i), $"{name}{i}")).ToArray();
        await lab.SettleAsync();
        var start = Stopwatch.GetTimestamp();
        await Task.WhenAll(Enumerable.Range(0, Uploaders).Select(uploader => Task.Run(async () =>
        {
            for (var i = 0; i < each; i++)
                await bare.InsertAsync(rows[uploader * each + i]);
        })));
        return Stopwatch.GetElapsedTime(start).TotalSeconds;
    }

    private sealed record Sent(double Seconds, Samples ServerMs, IReadOnlyDictionary<string, int> Outcomes, int RunIds);
}

using System.Diagnostics;
using System.Security.Cryptography;
using Microsoft.AspNetCore.Http;
using Microsoft.EntityFrameworkCore;
using Microsoft.Extensions.DependencyInjection;
using ResponseLedger.Benchmarks.Lab;
using ResponseLedger.Benchmarks.Measuring;
using ResponseLedger.Formats;
using ResponseLedger.Ledger;
using ResponseLedger.Records.Verdicts;
using ResponseLedger.Server.Runs.Upload;
using ResponseLedger.Store;
using ResponseLedger.Store.Intake;
using ResponseLedger.Store.Judging;

namespace ResponseLedger.Benchmarks.Uploads;

/// <summary>The parts of an upload, each by itself: the same code on the same bytes, called in process.</summary>
internal static class UploadParts
{
    public static async Task RunAsync(BenchLab lab, BenchDevice device, Guid lotId, Samples whole, Report report, Effort effort)
    {
        var (warmUp, rounds) = (effort.Of(200, 10), effort.Of(500, 25));
        var content = SweepFile.Csv(UploadBenchmark.Points, 77_777);
        var contexts = lab.Services.GetRequiredService<IDbContextFactory<ResponseLedgerContext>>();
        CurrentBasis current;
        await using (var db = await contexts.CreateDbContextAsync())
            current = (await CurrentBases.FindAsync(db, device.ConditionId, default))!;
        var basis = await lab.Services.GetRequiredService<JudgingMaterial>().OfAsync(current.BasisId, default);

        var empty = await HttpAsync(lab.Manager, "/api/measures");
        var emptyByToken = await HttpAsync(lab.Bench, "/api/measures");
        using var request = device.Upload(lotId, "parts", content);
        var body = await request.Content!.ReadAsByteArrayAsync();
        var boundary = request.Content.Headers.ContentType!.ToString();
        var form = await Samples.OfAsync(warmUp, rounds, async _ =>
        {
            var http = new DefaultHttpContext();
            http.Request.ContentType = boundary;
            http.Request.Body = new MemoryStream(body);
            await using var read = await UploadForm.ReadAsync(http.Request, UploadFields.Names, default);
        });
        var hashing = Samples.Of(warmUp, rounds, _ => SHA256.HashData(content));
        var reading = Samples.Of(warmUp, rounds, _ => SweepFileReader.Read(content, "unit.csv"));
        var sweeps = Enumerable.Range(0, warmUp + rounds).Select(_ => SweepFileReader.Read(content, "unit.csv").Sweep!).ToArray();
        var judging = Samples.Of(warmUp, rounds, i => Judge.Evaluate(sweeps[i], basis));
        var places = await Samples.OfAsync(warmUp, rounds, async _ =>
        {
            await using var db = await contexts.CreateDbContextAsync();
            await IntakeLookup.FindAsync(db, new PlaceNames(device.Id.ToString(), lotId.ToString(), BenchLab.BenchName, null, null), default);
        });
        var intake = await IntakeAsync(lab, device, lotId, current, warmUp, rounds);
        var act = intake.Median - reading.Median - judging.Median;
        var sum = emptyByToken.Median + form.Median + places.Median + intake.Median;

        string[] Row(string what, double ms, double p95) => [what, Report.Ms(ms), double.IsNaN(p95) ? "" : Report.Ms(p95), Report.Ratio(ms / whole.Median)];
        report.Table(
            ["parts of an upload", "median ms", "p95 ms", "share"],
            Row("pipeline and session cookie (a request that does nothing)", empty.Median, empty.P95),
            Row("bench token: the store is asked at every request", emptyByToken.Median - empty.Median, double.NaN),
            Row("multipart body out of memory, with its SHA-256", form.Median, form.P95),
            Row("- of which SHA-256 alone", hashing.Median, hashing.P95),
            Row("lookup of device, lot, condition with its basis, bench", places.Median, places.P95),
            Row("reading the file", reading.Median, reading.P95),
            Row("judging", judging.Median, judging.P95),
            Row("act: locks, checks, rows, ledger entry, commit", act, double.NaN),
            Row("sum of the parts", sum, double.NaN),
            Row("rest: the body's way over the socket, validation, answer", whole.Median - sum, double.NaN));

        async Task<Samples> HttpAsync(HttpClient client, string path)
        {
            var samples = new Samples();
            for (var i = -warmUp; i < rounds; i++)
            {
                var answer = await lab.GetAsync(client, path);
                if (i >= 0)
                    samples.Add(answer.ServerMs);
            }

            return samples;
        }
    }

    private static async Task<Samples> IntakeAsync(BenchLab lab, BenchDevice device, Guid lotId, CurrentBasis current, int warmUp, int rounds)
    {
        var intake = lab.Services.GetRequiredService<RunIntake>();
        var benchId = (await lab.GetAsync(lab.Manager, "/api/benches")).Json.GetProperty("items")[0].GetProperty("id").GetGuid();
        var actor = Actor.Person(Guid.CreateVersion7(TimeProvider.System.GetUtcNow()), "Lab manager");
        var order = new IntakeOrder(device.Id, device.ConditionId, "standard", lotId, "L", benchId, BenchLab.BenchName, RunPurposes.Production);
        var samples = new Samples();
        for (var i = -warmUp; i < rounds; i++)
        {
            var file = IntakeFile.Of("unit.csv", $"parts{i}", SweepFile.Csv(UploadBenchmark.Points, 100_000 + i));
            await lab.SettleAsync();
            var start = Stopwatch.GetTimestamp();
            var results = await intake.TakeAsync(actor, order, current, [file], default);
            var took = Stopwatch.GetElapsedTime(start).TotalMilliseconds;
            if (results[0].Outcome != IntakeOutcome.Accepted)
                throw new InvalidOperationException("A file of the benchmark was not taken.");
            if (i >= 0)
                samples.Add(took);
        }

        return samples;
    }
}

using System.Diagnostics;
using ResponseLedger.Benchmarks.Lab;
using ResponseLedger.Benchmarks.Measuring;

namespace ResponseLedger.Benchmarks.Uploads;

/// <summary>One upload of a 1,601-point file to its verdict, against one bare transaction of the same rows; then where its time goes.</summary>
internal static class UploadBenchmark
{
    public const int Points = 1_601;

    private const double GoalRatio = 2;

    public static async Task RunAsync(BenchLab lab, Report report, Effort effort)
    {
        var device = await BenchDevice.NewAsync(lab);
        var lotId = await device.NewLotAsync(10_000);
        var warmUp = effort.Of(700, 15);
        var rounds = effort.Of(500, 25);
        await device.SendAsync(lab.Bench, lotId, "first", SweepFile.Csv(Points, -1));
        var bare = await BareTransaction.OfAsync(lab, device, lotId);

        var (byToken, byTokenClient) = (new Samples(), new Samples());
        var (byCookie, byCookieClient) = (new Samples(), new Samples());
        var bareTimes = new Samples();
        for (var i = -warmUp; i < rounds; i++)
        {
            var (first, second, third) = (Content(i, 0), Content(i, 1), Content(i, 2));
            var rows = bare.Prepare(third, $"bare{i}");

            await lab.SettleAsync();
            var token = await device.SendAsync(lab.Bench, lotId, $"token{i}", first);
            await lab.SettleAsync();
            var cookie = await device.SendAsync(lab.Manager, lotId, $"cookie{i}", second);
            await lab.SettleAsync();
            var start = Stopwatch.GetTimestamp();
            await bare.InsertAsync(rows);
            var bareMs = Stopwatch.GetElapsedTime(start).TotalMilliseconds;
            if (i < 0)
                continue;
            byToken.Add(token.ServerMs);
            byTokenClient.Add(token.ClientMs);
            byCookie.Add(cookie.ServerMs);
            byCookieClient.Add(cookie.ClientMs);
            bareTimes.Add(bareMs);
        }

        string[] Row(string what, Samples samples) =>
            [what, Report.Ms(samples.Median), Report.Ms(samples.P95), Report.Ratio(samples.Median / bareTimes.Median)];
        report.Table(
            [$"upload of {Points} points, {SizeKiB()} KiB, to its verdict ({rounds} each, in turn)", "median ms", "p95 ms", "ratio"],
            Row("one bare transaction of the same rows", bareTimes),
            Row($"server, by bench token (goal: ratio {Report.Ratio(GoalRatio)} or less)", byToken),
            Row("server, by session cookie", byCookie),
            Row("client, by bench token: sent to answered", byTokenClient),
            Row("client, by session cookie", byCookieClient));
        await UploadParts.RunAsync(lab, device, lotId, byToken, report, effort);

        byte[] Content(int round, int of) => SweepFile.Csv(Points, 3 * (round + 1_000) + of);
        string SizeKiB() => Report.Number(Content(0, 0).Length / 1024.0);
    }
}

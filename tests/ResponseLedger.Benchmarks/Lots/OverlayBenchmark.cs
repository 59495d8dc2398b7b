using ResponseLedger.Benchmarks.Lab;
using ResponseLedger.Benchmarks.Measuring;

namespace ResponseLedger.Benchmarks.Lots;

/// <summary>The overlay of a lot of 96 units (24 in the short form) with 801 points each, as the page asks for it.</summary>
internal static class OverlayBenchmark
{
    private const int Points = 801;
    private const string Arrow = "application/vnd.apache.arrow.stream";

    private static readonly (string What, string Query, string? Accept)[] Asked =
    [
        ("gain as measured", "quantity=gain&basis=asMeasured&points=800", null),
        ("gain minus golden", "quantity=gain&basis=minusGolden&points=800", null),
        ("phase as measured", "quantity=phase&basis=asMeasured&points=800", null),
        ("phase minus golden", "quantity=phase&basis=minusGolden&points=800", null),
        ("gain as measured, Arrow", "quantity=gain&basis=asMeasured&points=800", Arrow),
        ("gain minus golden, Arrow", "quantity=gain&basis=minusGolden&points=800", Arrow),
        ("phase minus golden, Arrow", "quantity=phase&basis=minusGolden&points=800", Arrow),
    ];

    public static async Task RunAsync(BenchLab lab, Report report, Effort effort)
    {
        var units = effort.Of(96, 24);
        var lotId = await NewLotAsync(lab, units);
        var (warmUp, rounds) = (effort.Of(60, 5), effort.Of(200, 10));
        var times = Asked.Select(_ => (Server: new Samples(), Client: new Samples())).ToArray();
        var sizes = new long[Asked.Length];
        for (var i = -warmUp; i < rounds; i++)
        {
            for (var k = 0; k < Asked.Length; k++)
            {
                var answer = await lab.GetAsync(lab.Manager, $"/api/lots/{lotId}/overlay?{Asked[k].Query}", Asked[k].Accept);
                sizes[k] = answer.Body.Length;
                if (i < 0)
                    continue;
                times[k].Server.Add(answer.ServerMs);
                times[k].Client.Add(answer.ClientMs);
            }
        }

        var one = (await lab.GetAsync(lab.Manager, $"/api/lots/{lotId}/overlay?{Asked[0].Query}")).Json;
        report.Same("runs of the overlay", units, one.GetProperty("runs").GetArrayLength());
        report.Table(
            [$"overlay of {units} units x {Points} points, 800 asked for (goal: server under 30 ms)", "server median ms", "server p95 ms", "client median ms", "KiB"],
            Asked.Select((a, k) => (string[])
                [a.What, Report.Ms(times[k].Server.Median), Report.Ms(times[k].Server.P95), Report.Ms(times[k].Client.Median), Report.Number(sizes[k] / 1024.0)]));
    }

    /// <summary>A lot of a new device with a golden run, each unit sent through the server.</summary>
    public static async Task<Guid> NewLotAsync(BenchLab lab, int units)
    {
        var device = await BenchDevice.NewAsync(lab);
        await device.SetGoldenAsync(Points, 0);
        return await FillAsync(lab, device, units);
    }

    /// <summary>A further lot of a device.</summary>
    public static async Task<Guid> FillAsync(BenchLab lab, BenchDevice device, int units)
    {
        var lotId = await device.NewLotAsync(units);
        for (var i = 1; i <= units; i++)
            await device.SendAsync(lab.Manager, lotId, lab.Unique($"SN{i:000}"), SweepFile.Csv(Points, units * 1_000 + i));
        return lotId;
    }
}

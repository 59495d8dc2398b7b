using ResponseLedger.Benchmarks.Lab;
using ResponseLedger.Benchmarks.Measuring;

namespace ResponseLedger.Benchmarks.Lots;

/// <summary>
/// What a lot's page asks for, against the runs in the store (it should not matter) and against the units in the lot (it should
/// be linear). The same lots of the same device are asked, before and after the store is filled.
/// </summary>
internal static class LotPageBenchmark
{
    private static readonly (string What, string Path)[] Asked =
    [
        ("lot", "/api/lots/{0}"),
        ("units, by margin", "/api/lots/{0}/units?limit=500"),
        ("overlay of gain", "/api/lots/{0}/overlay?quantity=gain&basis=asMeasured&points=800"),
        ("overlay of gain minus golden", "/api/lots/{0}/overlay?quantity=gain&basis=minusGolden&points=800"),
    ];

    public static async Task RunAsync(BenchLab lab, Report report, Effort effort)
    {
        var (few, many) = effort.Of((1_000, 10_000), (300, 900));
        var device = await BenchDevice.NewAsync(lab);
        await device.SetGoldenAsync(801, 0);
        var lots = new List<Guid>();
        int[] sizes = effort.Of<int[]>([24, 48, 96], [6, 12, 24]);
        foreach (var size in sizes)
            lots.Add(await OverlayBenchmark.FillAsync(lab, device, size));

        var fill = new StoreFill(lab, device);
        await fill.UpToAsync(few);
        var before = await MeasureAsync(lab, lots, effort);
        await fill.UpToAsync(many);
        var after = await MeasureAsync(lab, lots, effort);
        report.Same("runs in the store", many, await lab.CountAsync("select count(*) from run"));

        report.Table(
            [$"server median ms; lot of {sizes[^1]} units", $"{Report.Number(few)} runs in the store", $"{Report.Number(many)} runs", "ratio (flat is 1)"],
            Asked.Select((a, k) => (string[])
                [a.What, Report.Ms(before[k][^1]), Report.Ms(after[k][^1]), Report.Ratio(after[k][^1] / before[k][^1])]));
        report.Table(
            [$"server median ms; {Report.Number(many)} runs in the store", .. sizes.Select(s => $"{s} units"), "last over first (linear is 4 or less)"],
            Asked.Select((a, k) => (string[])[a.What, .. after[k].Select(Report.Ms), Report.Ratio(after[k][^1] / after[k][0])]));
    }

    private static async Task<double[][]> MeasureAsync(BenchLab lab, List<Guid> lots, Effort effort)
    {
        var (warmUp, rounds) = (effort.Of(30, 3), effort.Of(150, 8));
        var times = Asked.Select(_ => lots.Select(_ => new Samples()).ToArray()).ToArray();
        for (var i = -warmUp; i < rounds; i++)
        {
            for (var k = 0; k < Asked.Length; k++)
            {
                for (var l = 0; l < lots.Count; l++)
                {
                    var answer = await lab.GetAsync(lab.Manager, string.Format(System.Globalization.CultureInfo.InvariantCulture, Asked[k].Path, lots[l]));
                    if (i >= 0)
                        times[k][l].Add(answer.ServerMs);
                }
            }
        }

        return [.. times.Select(ofLots => ofLots.Select(s => s.Median).ToArray())];
    }
}

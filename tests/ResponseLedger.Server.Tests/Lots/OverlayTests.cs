using System.Net;
using System.Net.Http.Headers;
using System.Text.Json;
using Apache.Arrow;
using Apache.Arrow.Ipc;

namespace ResponseLedger.Server.Tests.Lots;

public sealed class OverlayTests(Lab lab)
{
    private const int Points = 201;

    [Theory]
    [InlineData("gain", "gainDb", "dB")]
    [InlineData("phase", "phaseDeg", "deg")]
    public async Task An_overlay_shows_the_traces_of_all_counting_runs(string quantity, string member, string unit)
    {
        var scene = await LotScene.NewAsync(lab, 3);
        await scene.SendAsync("b", Response(1_000, -0.2));
        await scene.SendAsync("a", Response(1_100, 0.1));
        await scene.SendAsync("a", Response(900, 0.3));

        var overlay = await OverlayAsync(scene, $"quantity={quantity}");

        Assert.Equal((quantity, "asMeasured", unit), (overlay.GetProperty("quantity").GetString(), overlay.GetProperty("basis").GetString(), overlay.GetProperty("unit").GetString()));
        var runs = overlay.GetProperty("runs").EnumerateArray().ToList();
        Assert.Equal(["a", "b"], runs.Select(r => r.GetProperty("serial").GetString()!));
        foreach (var run in runs)
        {
            var trace = await scene.GetAsync($"/api/runs/{run.GetProperty("runId").GetString()}/trace");
            Assert.Equal(Numbers(trace, "frequencyHz"), Numbers(overlay, "frequencyHz"));
            Assert.Equal(Numbers(trace, member), Numbers(run, "values"));
        }
    }

    [Fact]
    public async Task Delay_is_that_of_a_pure_delay()
    {
        var scene = await LotScene.NewAsync(lab, 1);
        await scene.SendAsync("a", LotScene.Csv(Grid(10, 1_000, 301).Select(f => (f, 0.0, -360 * f * 0.0005))));

        var overlay = await OverlayAsync(scene, "quantity=delay");

        Assert.Equal("s", overlay.GetProperty("unit").GetString());
        Assert.All(Numbers(overlay.GetProperty("runs")[0], "values"), v => Assert.Equal(0.0005, v!.Value, 1e-12));
    }

    [Fact]
    public async Task Too_many_points_are_reduced_and_no_peak_and_no_notch_is_lost()
    {
        var scene = await LotScene.NewAsync(lab, 1);
        var grid = Grid(10, 10_000, 4_001);
        var points = grid.Select((f, i) => (f, i == 1_234 ? 0.9 : i == 2_777 ? -0.8 : 0.001 * Math.Sin(i), 0.0)).ToList();
        await scene.SendAsync("a", LotScene.Csv(points));

        var overlay = await OverlayAsync(scene, "points=200");

        var frequencies = Numbers(overlay, "frequencyHz");
        var values = Numbers(overlay.GetProperty("runs")[0], "values");
        Assert.InRange(frequencies.Count, 100, 200);
        Assert.Equal(frequencies.Count, values.Count);
        Assert.Equal((10.0, 10_000.0), (frequencies[0]!.Value, Math.Round(frequencies[^1]!.Value, 6)));
        Assert.All(frequencies.Zip(frequencies.Skip(1)), pair => Assert.True(pair.First < pair.Second));
        Assert.Equal((0.9, -0.8), (values.Max(), values.Min()));

        // In the order in which they occur, and near where they are.
        var (peak, notch) = (values.IndexOf(0.9), values.IndexOf(-0.8));
        Assert.Equal(grid[1_234], frequencies[peak]!.Value, grid[1_234] * 0.08);
        Assert.Equal(grid[2_777], frequencies[notch]!.Value, grid[2_777] * 0.08);
    }

    [Fact]
    public async Task Runs_on_other_grids_share_one_axis_and_end_where_they_end()
    {
        var scene = await LotScene.NewAsync(lab, 2);
        await scene.SendAsync("coarse", LotScene.Csv([(10, 0, 0), (1_000, 2, 0)]));
        await scene.SendAsync("fine", LotScene.Csv([(100, 1, 0), (200, 1, 0), (10_000, 1, 0)]));

        var overlay = await OverlayAsync(scene, "");

        Assert.Equal([10, 100, 200, 1_000, 10_000], Numbers(overlay, "frequencyHz"));
        var coarse = Numbers(overlay.GetProperty("runs")[0], "values");
        Assert.Equal(1, coarse[1]!.Value, 1e-12);
        Assert.Equal(1 + Math.Log10(2), coarse[2]!.Value, 1e-12);
        Assert.Equal((0, 2, null), (coarse[0], coarse[3], coarse[4]));
        Assert.Equal([null, 1, 1, 1, 1], Numbers(overlay.GetProperty("runs")[1], "values"));
    }

    [Fact]
    public async Task A_gain_of_exactly_zero_is_absent()
    {
        var scene = await LotScene.NewAsync(lab, 1);
        await scene.SendAsync("a", "frequency_hz,magnitude,phase_deg\n10,1,0\n100,0,0\n1000,1,0\n"u8.ToArray());

        Assert.Equal([0, null, 0], Numbers((await OverlayAsync(scene, "")).GetProperty("runs")[0], "values"));
    }

    [Fact]
    public async Task Minus_golden_is_the_difference_of_levels_and_the_phase_of_the_ratio()
    {
        var scene = await LotScene.NewAsync(lab, 1);
        var golden = await scene.SendAsync("golden", Response(1_000, 0), purpose: "golden");
        await scene.SetGoldenAsync(golden);
        var run = await scene.SendAsync("a", Response(1_100, 0.25));
        var (own, reference) = (await scene.GetAsync($"/api/runs/{run}/trace"), await scene.GetAsync($"/api/runs/{golden}/trace"));

        var gain = await OverlayAsync(scene, "basis=minusGolden");
        var phase = await OverlayAsync(scene, "basis=minusGolden&quantity=phase");

        foreach (var (overlay, member) in new[] { (gain, "gainDb"), (phase, "phaseDeg") })
        {
            var expected = Numbers(own, member).Zip(Numbers(reference, member), (a, b) => a!.Value - b!.Value).ToList();
            var shown = Numbers(overlay.GetProperty("runs")[0], "values");
            for (var i = 0; i < expected.Count; i++)
                Assert.Equal(expected[i], shown[i]!.Value, 1e-9);
            Assert.Equal(golden, overlay.GetProperty("golden").GetProperty("runId").GetString());
            Assert.All(Numbers(overlay.GetProperty("golden"), "values"), v => Assert.Equal(0, v!.Value, 1e-12));
        }

        // An absolute limit of 1 dB lies 1 dB less the golden run's level away.
        var top = Assert.Single(gain.GetProperty("limits").EnumerateArray(), l => l.GetProperty("name").GetString() == "top");
        var (at, level) = (Numbers(top, "frequencyHz"), Numbers(reference, "gainDb"));
        for (var i = 0; i < at.Count; i++)
            Assert.Equal(1 - level[Numbers(reference, "frequencyHz").IndexOf(at[i])]!.Value, Numbers(top, "values")[i]!.Value, 1e-9);
    }

    [Fact]
    public async Task Without_a_golden_run_there_is_no_difference_from_it()
    {
        var scene = await LotScene.NewAsync(lab, 1);
        await scene.SendAsync("a", Response(1_000, 0));

        await (await scene.Engineer.GetAsync($"/api/lots/{scene.LotId}/overlay?basis=minusGolden")).ShouldRefuseAsync(HttpStatusCode.Conflict, "noGoldenRun");
        Assert.Equal(JsonValueKind.Null, (await OverlayAsync(scene, "")).GetProperty("golden").ValueKind);
    }

    [Fact]
    public async Task Phases_get_the_whole_turns_that_bring_them_nearest_to_the_golden_run()
    {
        var scene = await LotScene.NewAsync(lab, 1);
        await scene.SetGoldenAsync(await scene.SendAsync("golden", LotScene.Csv(Grid(10, 10_000, 31).Select(f => (f, 0.0, 179.0))), purpose: "golden"));
        await scene.SendAsync("a", LotScene.Csv(Grid(10, 10_000, 31).Select(f => (f, 0.0, -179.0))));

        var overlay = await OverlayAsync(scene, "quantity=phase");

        Assert.All(Numbers(overlay.GetProperty("golden"), "values"), v => Assert.Equal(179, v!.Value, 1e-9));
        Assert.All(Numbers(overlay.GetProperty("runs")[0], "values"), v => Assert.Equal(181, v!.Value, 1e-9));
    }

    [Fact]
    public async Task Limits_are_drawn_by_their_corners_and_the_condition_may_be_chosen()
    {
        var scene = await LotScene.NewAsync(lab, 1, furtherConditions: ["hot"]);
        await scene.SendAsync("a", 0);
        var hot = await scene.SendAsync("a", 0.5, "hot");

        var overlay = await OverlayAsync(scene, "condition=hot");

        Assert.Equal("hot", overlay.GetProperty("condition").GetProperty("name").GetString());
        Assert.Equal(hot, Assert.Single(overlay.GetProperty("runs").EnumerateArray()).GetProperty("runId").GetString());
        Assert.Equal("pass", overlay.GetProperty("runs")[0].GetProperty("outcome").GetString());
        Assert.Equal(
            ["top upper 10..10000 1", "bottom lower 10..10000 -1"],
            overlay.GetProperty("limits").EnumerateArray().Select(l => FormattableString.Invariant(
                $"{l.GetProperty("name").GetString()} {l.GetProperty("side").GetString()} {Numbers(l, "frequencyHz")[0]}..{Numbers(l, "frequencyHz")[^1]} {Numbers(l, "values").Distinct().Single()}")));
        Assert.Equal(overlay.ToString(), (await OverlayAsync(scene, $"condition={overlay.GetProperty("condition").GetProperty("id").GetString()}")).ToString());
    }

    [Fact]
    public async Task A_lot_without_runs_has_an_empty_overlay()
    {
        var scene = await LotScene.NewAsync(lab, 1, mask: false);

        var overlay = await OverlayAsync(scene, "");

        Assert.Empty(overlay.GetProperty("frequencyHz").EnumerateArray());
        Assert.Empty(overlay.GetProperty("runs").EnumerateArray());
        Assert.Equal("noReleasedMask", Assert.Single(overlay.GetProperty("notes").EnumerateArray()).GetProperty("code").GetString());
    }

    [Fact]
    public async Task The_same_numbers_come_as_an_Arrow_stream()
    {
        var scene = await LotScene.NewAsync(lab, 2);
        await scene.SendAsync("a", Response(1_000, 0));
        await scene.SendAsync("b", LotScene.Csv([(100, 0.5, 0), (1_000, 0.5, 0)]));
        var json = await OverlayAsync(scene, "");
        using var request = new HttpRequestMessage(HttpMethod.Get, $"/api/lots/{scene.LotId}/overlay");
        request.Headers.Accept.Add(new MediaTypeWithQualityHeaderValue("application/vnd.apache.arrow.stream"));

        using var response = await scene.Engineer.SendAsync(request);

        Assert.Equal("application/vnd.apache.arrow.stream", response.Content.Headers.ContentType?.MediaType);
        using var reader = new ArrowStreamReader(await response.Content.ReadAsStreamAsync());
        using var batch = await reader.ReadNextRecordBatchAsync();
        Assert.Equal(3, batch.ColumnCount);
        Assert.Equal(Numbers(json, "frequencyHz"), ((DoubleArray)batch.Column(0)).ToList(includeNulls: true));
        for (var run = 0; run < 2; run++)
            Assert.Equal(Numbers(json.GetProperty("runs")[run], "values"), ((DoubleArray)batch.Column(run + 1)).ToList(includeNulls: true));
    }

    private static double[] Grid(double fromHz, double toHz, int points)
        => [.. Enumerable.Range(0, points).Select(i => fromHz * Math.Pow(toHz / fromHz, i / (points - 1.0)))];

    // A first-order low pass with an offset of its level.
    private static byte[] Response(double cornerHz, double offsetDb)
        => LotScene.Csv(Grid(10, 10_000, Points).Select(f =>
            (f, offsetDb - 10 * Math.Log10(1 + f / cornerHz * (f / cornerHz)), -Math.Atan(f / cornerHz) * (180 / Math.PI))));

    private static Task<JsonElement> OverlayAsync(LotScene scene, string query) => scene.GetAsync($"/api/lots/{scene.LotId}/overlay?{query}");

    private static List<double?> Numbers(JsonElement element, string member)
        => [.. element.GetProperty(member).EnumerateArray().Select(v => v.ValueKind == JsonValueKind.Null ? (double?)null : v.GetDouble())];
}

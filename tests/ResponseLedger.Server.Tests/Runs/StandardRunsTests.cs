using System.Globalization;
using System.Net;
using System.Net.Http.Json;
using System.Text;
using System.Text.Json;

namespace ResponseLedger.Server.Tests.Runs;

/// <summary>Published weightings sent as files and judged by masks made of the standards' tables; sources stand in tests/reference/README.md.</summary>
public sealed class StandardRunsTests(Lab lab)
{
    /// <summary>Rec. ITU-R BS.468-4: Table 1 allows nothing at 6.3 kHz, and its own network stands 0.0166 dB above it there.</summary>
    [Fact]
    public async Task Bs468_network_misses_the_bare_table_narrowly()
    {
        var verdict = await Bs468Async(openedDb: 0, factor: 1);

        Assert.Equal("fail", verdict.GetProperty("outcome").GetString());
        var (upper, lower) = (verdict.GetProperty("criteria")[0], verdict.GetProperty("criteria")[1]);
        Assert.Equal(-0.0166296, upper.GetProperty("margin").GetDouble(), 1e-7);
        Assert.Equal(6_303.096, upper.GetProperty("frequencyHz").GetDouble(), 1e-3);
        Assert.Equal(0.01662283, lower.GetProperty("margin").GetDouble(), 1e-7);
        Assert.Equal(6_300, lower.GetProperty("frequencyHz").GetDouble());
    }

    [Theory]
    [InlineData(1, "pass")]
    [InlineData(1.06, "fail")]
    [InlineData(1 / 1.06, "fail")]
    public async Task Bs468_network_passes_with_the_rounding_of_the_table_and_fails_six_percent_off(double factor, string outcome)
        => Assert.Equal(outcome, (await Bs468Async(openedDb: 0.05, factor)).GetProperty("outcome").GetString());

    /// <summary>IEC 61672-1:2013, Annex E and Table 3, class 1.</summary>
    [Theory]
    [InlineData(1, "pass")]
    [InlineData(1.06, "fail")]
    [InlineData(1 / 1.06, "fail")]
    public async Task A_weighting_passes_class_one_and_fails_six_percent_off(double factor, string outcome)
    {
        var table = Table("iec-61672-1-weightings.csv");
        var scene = await RunScene.NewAsync(lab, mask: false);
        await ReleaseAsync(
            scene,
            Corners(table, row => (row["exact_hz"], row["a_exact_db"] + row["class1_upper_db"])),
            Corners(table, row => (row["exact_hz"], row["a_exact_db"] + row["class1_lower_db"])));
        var points = Enumerable.Range(0, 801).Select(i => 10 * Math.Pow(2_000, i / 800.0)).Select(hz => $"{Text(hz)},{Text(WeightingDb(hz / factor))}");

        Assert.Equal(outcome, (await JudgeAsync(scene, "Frequency (Hz),Gain (dB)", points)).GetProperty("outcome").GetString());
    }

    /// <summary>IEC 60098, time constants 3180, 318 and 75 microseconds: the level of every row of the reference file, over HTTP.</summary>
    [Fact]
    public async Task Riaa_equalisation_is_measured_as_its_analytic_values()
    {
        var table = Table("iec-60098-riaa.csv");
        var scene = await RunScene.NewAsync(lab, mask: false);
        var runId = await scene.AcceptedAsync("U1.csv", File("frequency_hz,gain_db,phase_deg", table.Select(row => $"{Text(row["frequency_hz"])},{Text(row["level_db"])},{Text(row["phase_deg"])}")));

        var found = await scene.MeasureAsync(runId, [.. table.Select(row => new { measure = "level", parameters = new { frequencyHz = row["frequency_hz"] } })]);

        Assert.Equal(52, found.Count);
        foreach (var (row, result) in table.Zip(found))
            Assert.Equal(row["level_db"], result.Output("gainDb")!.Value, 1e-6);
    }

    private async Task<JsonElement> Bs468Async(double openedDb, double factor)
    {
        var table = Table("itu-r-bs468-4.csv");
        var scene = await RunScene.NewAsync(lab, mask: false);
        await ReleaseAsync(
            scene,
            Corners(table, row => (row["frequency_hz"], row["response_db"] + row["tolerance_plus_db"] + openedDb)),
            Corners(table, row => (row["frequency_hz"], row["response_db"] - row["tolerance_minus_db"] - openedDb)));
        return await JudgeAsync(
            scene, "frequency_hz,real,imag", Table("itu-r-bs468-4-network.csv").Select(row => $"{Text(row["frequency_hz"] * factor)},{Text(row["real"])},{Text(row["imag"])}"));
    }

    private static async Task<JsonElement> JudgeAsync(RunScene scene, string head, IEnumerable<string> rows)
    {
        var result = await scene.SendOneAsync("U1.csv", File(head, rows));
        Assert.Equal("accepted", result.GetProperty("outcome").GetString());
        return result.GetProperty("verdict");
    }

    private static async Task ReleaseAsync(RunScene scene, object[] upper, object[] lower)
    {
        var draft = await (await scene.Engineer.PostAsJsonAsync($"/api/devices/{scene.DeviceId}/masks", new
        {
            title = "Of the standard",
            limits = new[]
            {
                new { name = "upper", quantity = "gainDb", side = "upper", basis = "absolute", corners = upper },
                new { name = "lower", quantity = "gainDb", side = "lower", basis = "absolute", corners = lower },
            },
            requirements = Array.Empty<object>(),
        })).ShouldBeAsync(HttpStatusCode.Created);
        await (await scene.Engineer.PostAsJsonAsync($"/api/masks/{draft.GetProperty("id").GetString()}/release", new { reason = "for the test" })).ShouldBeAsync(HttpStatusCode.OK);
    }

    private static object[] Corners(List<Dictionary<string, double>> table, Func<Dictionary<string, double>, (double FrequencyHz, double Value)> corner)
        => [.. table.Select(corner).Where(c => double.IsFinite(c.Value)).Select(c => new { frequencyHz = c.FrequencyHz, value = c.Value })];

    private static List<Dictionary<string, double>> Table(string file)
    {
        var lines = System.IO.File.ReadLines(Path.Combine(ReferenceCases.Folder(), file)).Where(line => line.Length > 0 && line[0] != '#').ToList();
        var heads = lines[0].Split(',');
        return [.. lines.Skip(1).Select(line => heads.Zip(line.Split(',')).Where(cell => cell.Second.Length > 0).ToDictionary(cell => cell.First, cell => Number(cell.Second)))];
    }

    private static double Number(string cell) => cell switch
    {
        "inf" => double.PositiveInfinity,
        "-inf" => double.NegativeInfinity,
        _ => double.TryParse(cell, NumberStyles.Float, CultureInfo.InvariantCulture, out var number) ? number : double.NaN,
    };

    private static byte[] File(string head, IEnumerable<string> rows) => Encoding.UTF8.GetBytes($"{head}\n{string.Join('\n', rows)}\n");

    private static string Text(double number) => number.ToString("R", CultureInfo.InvariantCulture);

    // IEC 61672-1 Annex E, with the pole frequencies that stand in the head of the reference file.
    private static double WeightingDb(double hz)
    {
        const double F1 = 20.598997057568144, F2 = 107.65264864304627, F3 = 737.86223073628988, F4 = 12194.21714799801;
        return 20 * Math.Log10(Raw(hz) / Raw(1000));

        static double Raw(double f)
            => F4 * F4 * f * f * f * f / ((f * f + F1 * F1) * Math.Sqrt(f * f + F2 * F2) * Math.Sqrt(f * f + F3 * F3) * (f * f + F4 * F4));
    }
}

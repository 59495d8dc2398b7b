using System.Net;
using System.Net.Http.Json;
using System.Text.Json;
using ResponseLedger.Server.Tests.Runs;

namespace ResponseLedger.Server.Tests.MainJob;

/// <summary>The low-pass filter that the lab tests, in two conditions, each with a released mask and a golden run.</summary>
internal sealed record LowPassDevice(string Id, IReadOnlyDictionary<string, string> GoldenRuns)
{
    public const string Standard = "standard";
    public const string Hot = "hot";

    /// <summary>The golden unit in each condition: the heat moves its corner.</summary>
    public static LowPass Golden(string condition) => new(condition == Hot ? 9_500 : 10_000);

    /// <summary>The engineer makes it, releases its masks, and chooses its golden runs.</summary>
    public static async Task<LowPassDevice> PrepareAsync(LabPeople people)
    {
        var engineer = people.Engineer;
        var device = await engineer.MadeAsync("/api/devices", new { partNumber = "LPF-1", revision = "A", title = "Low pass", kind = "transfer" });
        var id = device.Text("id");
        await engineer.MadeAsync($"/api/devices/{id}/conditions", new { name = Hot });
        var golden = new Dictionary<string, string>();
        foreach (var condition in (string[])[Standard, Hot])
        {
            var draft = await engineer.MadeAsync($"/api/devices/{id}/masks", Mask(condition));
            Assert.Equal("draft", draft.Text("state"));
            var released = await (await engineer.PostAsJsonAsync($"/api/masks/{draft.Text("id")}/release", new { reason = "Agreed with the customer." })).ShouldBeAsync(HttpStatusCode.OK);
            Assert.Equal(1, released.GetProperty("revision").GetInt32());
            golden[condition] = await ChooseGoldenAsync(people, id, condition);
        }

        return new LowPassDevice(id, golden);
    }

    // Sending a golden run does not make it the golden run: somebody chooses it.
    private static async Task<string> ChooseGoldenAsync(LabPeople people, string deviceId, string condition)
    {
        using var response = await RunScene.SendAsync(
            people.Bench, [("device", "LPF-1/A"), ("purpose", "golden"), ("condition", condition)], [("GOLD1_ref.csv", Golden(condition).CommaCsv(condition))]);
        var sent = Assert.Single((await response.ShouldBeAsync(HttpStatusCode.Created)).GetProperty("results").EnumerateArray());
        Assert.Equal("inconclusive", sent.GetProperty("verdict").Text("outcome"));
        var before = await people.Engineer.SeeAsync($"/api/devices/{deviceId}/golden");
        Assert.Equal(JsonValueKind.Null, before.Item("condition", condition).GetProperty("golden").ValueKind);

        await (await people.Engineer.PutAsJsonAsync($"/api/devices/{deviceId}/golden", new { runId = sent.Text("runId"), reason = "Typical of the first lots." })).ShouldBeAsync(HttpStatusCode.OK);
        var verdict = await people.Engineer.SeeAsync($"/api/runs/{sent.Text("runId")}/verdict");
        Assert.Equal("pass", verdict.Text("outcome"));
        return sent.Text("runId");
    }

    private static object Mask(string condition) => new
    {
        title = $"Low pass, {condition}",
        condition,
        limits = new[]
        {
            Limit("pass band top", "upper", "absolute", (100, 0.5), (2_000, 0.5)),
            Limit("pass band bottom", "lower", "absolute", (100, -0.5), (2_000, -0.5)),
            Limit("stop band", "upper", "absolute", (30_000, -8), (100_000, -18)),
            Limit("above golden", "upper", "golden", (100, 1), (100_000, 1)),
            Limit("below golden", "lower", "golden", (100, -1), (100_000, -1)),
        },
        requirements = new object[]
        {
            new
            {
                name = "corner",
                measure = "bandwidth",
                parameters = new { dropDb = 10 * Math.Log10(2), reference = new { kind = "peak" } },
                output = "upperHz",
                min = 8_500,
                max = 11_000,
                scale = 100,
            },
            new { name = "ripple", measure = "ripple", parameters = new { fromHz = 100, toHz = 1_000 }, output = "rippleDb", max = 0.1 },
        },
    };

    private static object Limit(string name, string side, string basis, (double FrequencyHz, double Value) from, (double FrequencyHz, double Value) to) => new
    {
        name,
        quantity = "gainDb",
        side,
        basis,
        corners = new[] { new { frequencyHz = from.FrequencyHz, value = from.Value }, new { frequencyHz = to.FrequencyHz, value = to.Value } },
    };
}

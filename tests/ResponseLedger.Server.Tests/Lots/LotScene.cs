using System.Globalization;
using System.Net;
using System.Net.Http.Json;
using System.Text;
using System.Text.Json;
using ResponseLedger.Server.Tests.Runs;

namespace ResponseLedger.Server.Tests.Lots;

/// <summary>A device and a lot of a test's own. Its mask, where there is one, lets gains within 1 dB of 0 pass from 10 Hz to 10 kHz.</summary>
internal sealed class LotScene
{
    private int files;

    private LotScene(Lab lab, HttpClient engineer, JsonElement device)
    {
        Lab = lab;
        Engineer = engineer;
        DeviceId = device.GetProperty("id").GetGuid();
        PartNumber = device.GetProperty("partNumber").GetString()!;
        Bench = Lab.Unique("bench");
    }

    public Lab Lab { get; }
    public HttpClient Engineer { get; }
    public Guid DeviceId { get; }
    public string PartNumber { get; }
    public string Bench { get; }
    public Guid LotId { get; private set; }
    public string LotNumber { get; private set; } = "";

    public static async Task<LotScene> NewAsync(Lab lab, int size, string[]? serials = null, bool mask = true, string[]? furtherConditions = null)
    {
        var engineer = await lab.SignInAsync("engineer");
        var device = await (await engineer.PostAsJsonAsync("/api/devices", new { partNumber = Lab.Unique("LOT-PN"), revision = "A", title = "Board", kind = "transfer" }))
            .ShouldBeAsync(HttpStatusCode.Created);
        var scene = new LotScene(lab, engineer, device);
        foreach (var name in furtherConditions ?? [])
            await (await engineer.PostAsJsonAsync($"/api/devices/{scene.DeviceId}/conditions", new { name })).ShouldBeAsync(HttpStatusCode.Created);
        if (mask)
        {
            foreach (var condition in (string[])["standard", .. furtherConditions ?? []])
                await scene.ReleaseAsync(1, condition);
        }

        await scene.NextLotAsync(size, serials);
        return scene;
    }

    /// <summary>Opens a further lot of the device; from then on it is the scene's.</summary>
    public async Task<JsonElement> NextLotAsync(int size, string[]? serials = null)
    {
        var number = Lab.Unique("L");
        var lot = await (await Engineer.PostAsJsonAsync("/api/lots", new { deviceId = DeviceId, number, size, serials })).ShouldBeAsync(HttpStatusCode.Created);
        (LotId, LotNumber) = (lot.GetProperty("id").GetGuid(), number);
        return lot;
    }

    public async Task ReleaseAsync(double edgeDb, string condition = "standard")
    {
        object[] Corners(double value) => [new { frequencyHz = 10, value }, new { frequencyHz = 10_000, value }];
        var draft = await (await Engineer.PostAsJsonAsync($"/api/devices/{DeviceId}/masks", new
        {
            title = "Flat",
            condition,
            limits = new[]
            {
                new { name = "top", quantity = "gainDb", side = "upper", basis = "absolute", corners = Corners(edgeDb) },
                new { name = "bottom", quantity = "gainDb", side = "lower", basis = "absolute", corners = Corners(-edgeDb) },
            },
            requirements = Array.Empty<object>(),
        })).ShouldBeAsync(HttpStatusCode.Created);
        await (await Engineer.PostAsJsonAsync($"/api/masks/{draft.GetProperty("id").GetString()}/release", new { reason = "for the test" })).ShouldBeAsync(HttpStatusCode.OK);
    }

    /// <summary>Sends a flat sweep; 0 dB passes, 3 dB fails.</summary>
    public Task<string> SendAsync(string serial, double gainDb, string condition = "standard", HttpClient? client = null)
        => SendAsync(serial, RunScene.Csv(gainDb, $"file {Interlocked.Increment(ref files)}"), condition, client);

    /// <summary>Sends a file that must be taken, and gives the run's id.</summary>
    public async Task<string> SendAsync(string serial, byte[] content, string condition = "standard", HttpClient? client = null, string purpose = "production")
    {
        using var response = await RunScene.SendAsync(
            client ?? Engineer,
            [("device", DeviceId.ToString()), ("lot", LotId.ToString()), ("bench", Bench), ("serial", serial), ("condition", condition), ("purpose", purpose)],
            [($"{serial}.csv", content)]);
        var body = await response.ShouldBeAsync(HttpStatusCode.Created);
        return Assert.Single(body.GetProperty("results").EnumerateArray()).GetProperty("runId").GetString()!;
    }

    public async Task InvalidateAsync(string runId)
        => await (await Engineer.PostAsJsonAsync($"/api/runs/{runId}/invalidation", new { cause = "contact", reason = "The probe had no contact." })).ShouldBeAsync(HttpStatusCode.Created);

    public async Task SetGoldenAsync(string runId)
        => await (await Engineer.PutAsJsonAsync($"/api/devices/{DeviceId}/golden", new { runId, reason = "Typical" })).ShouldBeAsync(HttpStatusCode.OK);

    public async Task<JsonElement> GetAsync(string path) => await (await Engineer.GetAsync(path)).ShouldBeAsync(HttpStatusCode.OK);

    public Task<JsonElement> LotAsync() => GetAsync($"/api/lots/{LotId}");

    public Task<JsonElement> UnitsAsync(string query = "") => GetAsync($"/api/lots/{LotId}/units{query}");

    public async Task<JsonElement> UnitAsync(string serial) => (await UnitsAsync()).Item("serial", serial);

    public async Task<HttpResponseMessage> DispositionAsync(string serial, string disposition, HttpClient? client = null)
        => await (client ?? Engineer).PostAsJsonAsync(
            $"/api/lots/{LotId}/units/{(await UnitAsync(serial)).GetProperty("unitId").GetString()}/disposition", new { disposition, reason = "As agreed." });

    public Task<HttpResponseMessage> DecideAsync(string decision, string? reason = "Reviewed.", HttpClient? client = null, string password = Lab.Password)
        => (client ?? Engineer).PostAsJsonAsync($"/api/lots/{LotId}/decisions", new { decision, reason, password });

    public async Task<HttpResponseMessage> ReopenAsync(HttpClient? client = null, string password = Lab.Password)
        => await (client ?? await Lab.SignInAsync("quality")).PostAsJsonAsync($"/api/lots/{LotId}/reopenings", new { reason = "A drifted bench.", password });

    /// <summary>The counts in the order units, tested, passed, failed, inconclusive, withdrawn, retests.</summary>
    public async Task<string> CountsAsync()
    {
        var counts = (await LotAsync()).GetProperty("counts");
        return string.Join(' ', new[] { "units", "tested", "passed", "failed", "inconclusive", "withdrawn", "retests" }.Select(n => counts.GetProperty(n).GetInt32()));
    }

    public async Task<string[]> BlockersAsync()
        => [.. (await LotAsync()).GetProperty("blockers").EnumerateArray().Select(b => b.GetProperty("code").GetString()!)];

    /// <summary>A file of level and phase at given frequencies.</summary>
    public static byte[] Csv(IEnumerable<(double FrequencyHz, double GainDb, double PhaseDeg)> points)
    {
        var text = new StringBuilder("frequency_hz,gain_db,phase_deg\n");
        foreach (var (frequencyHz, gainDb, phaseDeg) in points)
            text.Append(CultureInfo.InvariantCulture, $"{frequencyHz:R},{gainDb:R},{phaseDeg:R}\n");
        return Encoding.UTF8.GetBytes(text.ToString());
    }
}

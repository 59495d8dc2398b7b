using System.Globalization;
using System.Net;
using System.Net.Http.Json;
using System.Text;
using System.Text.Json;

namespace ResponseLedger.Server.Tests.Runs;

/// <summary>A device of a test's own with one open lot and a bench name, and the ways in which a test sends files to it.</summary>
internal sealed class RunScene
{
    public const double EdgeDb = 1;

    private RunScene(Lab lab, HttpClient engineer, JsonElement device, JsonElement lot)
    {
        Lab = lab;
        Engineer = engineer;
        DeviceId = device.GetProperty("id").GetString()!;
        PartNumber = device.GetProperty("partNumber").GetString()!;
        LotId = lot.GetProperty("id").GetString()!;
        LotNumber = lot.GetProperty("number").GetString()!;
        Bench = Lab.Unique("bench");
    }

    public Lab Lab { get; }
    public HttpClient Engineer { get; }
    public string DeviceId { get; }
    public string PartNumber { get; }
    public string LotId { get; }
    public string LotNumber { get; }
    public string Bench { get; }

    /// <summary>Makes the device and the lot; with a mask, gains within 1 dB of 0 pass from 10 Hz to 10 kHz.</summary>
    public static async Task<RunScene> NewAsync(Lab lab, bool mask = true, string kind = "transfer", int? criticalPhaseDeg = null)
    {
        var engineer = await lab.SignInAsync("engineer");
        var device = await (await engineer.PostAsJsonAsync("/api/devices", new { partNumber = Lab.Unique("PN"), revision = "A", title = "Test", kind, criticalPhaseDeg }))
            .ShouldBeAsync(HttpStatusCode.Created);
        var lot = await NewLotAsync(engineer, device.GetProperty("id").GetString()!, Lab.Unique("LOT"));
        var scene = new RunScene(lab, engineer, device, lot);
        if (mask)
            await scene.ReleaseMaskAsync(EdgeDb);
        return scene;
    }

    public static async Task<JsonElement> NewLotAsync(HttpClient client, string deviceId, string number)
        => await (await client.PostAsJsonAsync("/api/lots", new { deviceId, number, size = 10 })).ShouldBeAsync(HttpStatusCode.Created);

    public async Task ReleaseMaskAsync(double edgeDb, string? condition = null)
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

    /// <summary>A sweep from 10 Hz to 10 kHz whose level is the same everywhere; the comment makes its bytes its own.</summary>
    public static byte[] Csv(double gainDb, string comment = "", int points = 31)
    {
        var text = new StringBuilder($"# {comment}\nfrequency_hz,gain_db,phase_deg\n");
        for (var i = 0; i < points; i++)
            text.Append(CultureInfo.InvariantCulture, $"{10 * Math.Pow(1000, i / (points - 1.0)):R},{gainDb:R},{-i:R}\n");
        return Encoding.UTF8.GetBytes(text.ToString());
    }

    /// <summary>Sends files for the scene's lot by its engineer, with further fields.</summary>
    public Task<HttpResponseMessage> SendAsync((string Name, byte[] Content)[] files, params (string Name, string Value)[] more)
        => SendAsync(Engineer, [("device", PartNumber), ("lot", LotNumber), ("bench", Bench), .. more], files);

    /// <summary>Sends exactly these parts.</summary>
    public static async Task<HttpResponseMessage> SendAsync(
        HttpClient client, IEnumerable<(string Name, string Value)> fields, IEnumerable<(string Name, byte[] Content)> files, bool fieldsLast = false, string path = "/api/runs")
    {
        using var form = new MultipartFormDataContent();
        void AddFields()
        {
            foreach (var (name, value) in fields)
                form.Add(new StringContent(value), name);
        }

        if (!fieldsLast)
            AddFields();
        foreach (var (name, content) in files)
            form.Add(new ByteArrayContent(content), "file", name);
        if (fieldsLast)
            AddFields();
        return await client.PostAsync(path, form);
    }

    /// <summary>Sends one file and gives its result, whatever became of it.</summary>
    public async Task<JsonElement> SendOneAsync(string fileName, byte[] content, params (string Name, string Value)[] more)
    {
        using var response = await SendAsync([(fileName, content)], more);
        var body = JsonDocument.Parse(await response.Content.ReadAsStringAsync()).RootElement;
        Assert.True(body.TryGetProperty("results", out var results), body.ToString());
        return Assert.Single(results.EnumerateArray());
    }

    /// <summary>Sends one file that must be taken, and gives the run's id.</summary>
    public async Task<string> AcceptedAsync(string fileName, byte[] content, params (string Name, string Value)[] more)
    {
        var result = await SendOneAsync(fileName, content, more);
        Assert.True(result.GetProperty("outcome").GetString() == "accepted", result.ToString());
        return result.GetProperty("runId").GetString()!;
    }

    public async Task<JsonElement> GetAsync(string path) => await (await Engineer.GetAsync(path)).ShouldBeAsync(HttpStatusCode.OK);

    public async Task<JsonElement> RunAsync(string id) => await GetAsync($"/api/runs/{id}");

    public static string[] Codes(JsonElement result, string member)
        => [.. result.GetProperty(member).EnumerateArray().Select(e => e.GetProperty("code").GetString()!)];
}

using System.Net;
using System.Net.Http.Json;
using System.Text.Json;
using ResponseLedger.Server.Tests.Runs;

namespace ResponseLedger.Server.Tests.MainJob;

/// <summary>A lab whose server is killed. Its people sign in once: sessions and tokens outlive the kills too.</summary>
internal sealed class KilledLab : IDisposable
{
    private readonly ServerProcess server;
    private readonly HttpClient bench;

    private KilledLab(ServerProcess server)
    {
        this.server = server;
        (Manager, Quality, bench) = (server.Client(), server.Client(), server.Client());
    }

    public HttpClient Manager { get; }
    public HttpClient Quality { get; }
    public string DeviceId { get; private set; } = "";

    /// <summary>Makes a device with a mask that 0 dB passes and 3 dB fails, a bench token and a signer.</summary>
    public static async Task<KilledLab> PrepareAsync(ServerProcess server)
    {
        var lab = new KilledLab(server);
        var manager = lab.Manager;
        await SignInAsync(manager, Lab.ManagerEmail);
        await manager.MadeAsync("/api/people", new { email = "quality@example.test", name = "Quality", password = Lab.Password, roles = new[] { "quality" } });
        await SignInAsync(lab.Quality, "quality@example.test");
        await manager.MadeAsync("/api/benches", new { name = "Bay" });
        var token = await manager.MadeAsync("/api/tokens", new { name = "Bay", scopes = new[] { "runs" }, bench = "Bay" });
        lab.bench.DefaultRequestHeaders.Authorization = new("Bearer", token.Text("token"));
        lab.DeviceId = (await manager.MadeAsync("/api/devices", new { partNumber = "PN", revision = "A", title = "Board", kind = "transfer" })).Text("id");
        var mask = await manager.MadeAsync($"/api/devices/{lab.DeviceId}/masks", new
        {
            title = "Flat",
            limits = new[]
            {
                new
                {
                    name = "top",
                    quantity = "gainDb",
                    side = "upper",
                    basis = "absolute",
                    corners = new[] { new { frequencyHz = 10, value = 1 }, new { frequencyHz = 10_000, value = 1 } },
                },
            },
            requirements = Array.Empty<object>(),
        });
        await (await manager.PostAsJsonAsync($"/api/masks/{mask.Text("id")}/release", new { reason = "For the test." })).ShouldBeAsync(HttpStatusCode.OK);
        return lab;
    }

    /// <summary>Opens a lot and gives its id.</summary>
    public async Task<string> OpenLotAsync(string number, int size) => (await Manager.MadeAsync("/api/lots", new { deviceId = DeviceId, number, size })).Text("id");

    /// <summary>Sends files from the bench.</summary>
    public Task<HttpResponseMessage> SendAsync(string lot, params (string Name, byte[] Content)[] files)
        => RunScene.SendAsync(bench, [("device", "PN/A"), ("lot", lot)], files);

    /// <summary>Approves a lot.</summary>
    public Task<HttpResponseMessage> ApproveAsync(string lotId)
        => Quality.PostAsJsonAsync($"/api/lots/{lotId}/decisions", new { decision = "approve", reason = "All pass.", password = Lab.Password });

    /// <summary>While the store is away a request is told so and to come again; anything else is a fault.</summary>
    public async Task ToldToComeAgainAsync(HttpResponseMessage response)
    {
        var body = await response.Content.ReadAsStringAsync();
        Assert.True(response.StatusCode == HttpStatusCode.ServiceUnavailable && response.Headers.RetryAfter is not null, $"{(int)response.StatusCode} {body}\n{server.Said}");
        Assert.Contains(JsonElement.Parse(body).Text("code"), (string[])["starting", "storeAway"]);
    }

    public void Dispose()
    {
        Manager.Dispose();
        Quality.Dispose();
        bench.Dispose();
    }

    private static async Task SignInAsync(HttpClient client, string email)
        => await (await client.PostAsJsonAsync("/api/session", new { email, password = Lab.Password })).ShouldBeAsync(HttpStatusCode.NoContent);
}

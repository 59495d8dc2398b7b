using System.Collections.Concurrent;
using System.Net;
using System.Net.Http.Json;
using System.Text.Json;
using ResponseLedger.Server.Tests.Runs;

namespace ResponseLedger.Server.Tests.MainJob;

/// <summary>A lab at work while its server is killed: benches send files, and somebody signs lots, all at the same time. It remembers what was acknowledged.</summary>
internal sealed class KilledLab(ServerProcess server) : IDisposable
{
    private const int FilesPerBench = 400;
    private const int Points = 201;

    private readonly HttpClient quality = server.Client();
    private readonly HttpClient bench = server.Client();
    private readonly ConcurrentDictionary<string, byte[]> begun = new();
    private readonly ConcurrentDictionary<string, string> acknowledged = new();
    private readonly ConcurrentBag<string> signed = [];
    private readonly ConcurrentBag<string> answers = [];
    private readonly List<string> lots = [];
    private string deviceId = "";

    /// <summary>How many files were acknowledged.</summary>
    public int AcknowledgedFiles => acknowledged.Count;

    /// <summary>How many decisions were acknowledged.</summary>
    public int AcknowledgedDecisions => signed.Count;

    /// <summary>What was answered to files that were not taken.</summary>
    public IReadOnlyCollection<string> OtherAnswers => answers;

    /// <summary>Makes a device with a mask, a bench token and a signer.</summary>
    public async Task PrepareAsync()
    {
        using var manager = server.Client();
        await SignInAsync(manager, Lab.ManagerEmail);
        await manager.MadeAsync("/api/people", new { email = "quality@example.test", name = "Quality", password = Lab.Password, roles = new[] { "quality" } });
        await SignInAsync(quality, "quality@example.test");
        await manager.MadeAsync("/api/benches", new { name = "Bay" });
        var token = await manager.MadeAsync("/api/tokens", new { name = "Bay", scopes = new[] { "runs" }, bench = "Bay" });
        bench.DefaultRequestHeaders.Authorization = new("Bearer", token.Text("token"));
        deviceId = (await manager.MadeAsync("/api/devices", new { partNumber = "PN", revision = "A", title = "Board", kind = "transfer" })).Text("id");
        object[] corners = [new { frequencyHz = 10, value = 1 }, new { frequencyHz = 10_000, value = 1 }];
        var mask = await manager.MadeAsync($"/api/devices/{deviceId}/masks", new
        {
            title = "Flat",
            limits = new[] { new { name = "top", quantity = "gainDb", side = "upper", basis = "absolute", corners } },
            requirements = Array.Empty<object>(),
        });
        await (await manager.PostAsJsonAsync($"/api/masks/{mask.Text("id")}/release", new { reason = "For the test." })).ShouldBeAsync(HttpStatusCode.OK);
        await manager.MadeAsync("/api/lots", new { deviceId, number = "open", size = 100_000 });
    }

    /// <summary>Opens lots of two units that pass, ready to be signed.</summary>
    public async Task OpenLotsAsync(int count)
    {
        using var manager = server.Client();
        await SignInAsync(manager, Lab.ManagerEmail);
        for (var i = 0; i < count; i++)
        {
            var number = Lab.Unique("signed");
            var lot = await manager.MadeAsync("/api/lots", new { deviceId, number, size = 2 });
            using var sent = await SendAsync(number, ("a.csv", RunScene.Csv(0, $"{number} a")), ("b.csv", RunScene.Csv(0, $"{number} b")));
            await sent.ShouldBeAsync(HttpStatusCode.Created);
            lots.Add(lot.Text("id"));
        }
    }

    /// <summary>One bench sends file after file until it is stopped, however the server answers.</summary>
    public async Task SendUntilAsync(CancellationToken stop)
    {
        var name = Lab.Unique("unit");
        for (var i = 0; i < FilesPerBench && !stop.IsCancellationRequested; i++)
        {
            var file = $"{name}-{i}.csv";
            begun[file] = RunScene.Csv(i % 2 == 0 ? 0 : 3, file, Points);
            try
            {
                await SendOneAsync(file);
            }
            catch (HttpRequestException)
            {
                // The server was killed under it: nobody knows whether this one was taken.
                await Task.Delay(10, CancellationToken.None);
            }
        }
    }

    /// <summary>Signs the open lots one after the other until stopped.</summary>
    public async Task SignUntilAsync(IEnumerable<string> lotIds, CancellationToken stop)
    {
        foreach (var lot in lotIds)
        {
            if (stop.IsCancellationRequested)
                return;
            try
            {
                using var response = await DecideAsync(lot);
                if (response.StatusCode == HttpStatusCode.Created)
                    signed.Add(lot);
            }
            catch (HttpRequestException)
            {
                // Nobody knows whether this one was signed.
            }
        }
    }

    /// <summary>Lots that nobody has signed yet, as far as is known, in halves for two signers.</summary>
    public IEnumerable<string> LotsToSign(int half) => lots.Where((lot, i) => i % 2 == half && !signed.Contains(lot)).ToList();

    /// <summary>Everything that was acknowledged is there: run, verdict, file.</summary>
    public async Task EverythingAcknowledgedIsThereAsync()
    {
        foreach (var (file, runId) in acknowledged)
        {
            var run = await quality.SeeAsync($"/api/runs/{runId}");
            Assert.Equal(Path.GetFileNameWithoutExtension(file), run.Text("serial"));
            Assert.True(run.Text("outcome") is "pass" or "fail", run.ToString());
            var kept = await quality.GetByteArrayAsync($"/api/runs/{runId}/file");
            Assert.True(kept.AsSpan().SequenceEqual(begun[file]), $"{file} has other bytes.");
        }

        foreach (var lot in signed)
            Assert.Equal("approved", (await quality.SeeAsync($"/api/lots/{lot}")).Text("state"));
    }

    /// <summary>Sends everything again, twice: nothing is lost, nothing is doubled.</summary>
    public async Task EverythingCanBeSentAgainAsync()
    {
        foreach (var file in begun.Keys)
        {
            var known = acknowledged.GetValueOrDefault(file);
            var outcome = await SendOneAsync(file);
            Assert.True(outcome == "duplicate" || (outcome == "accepted" && known is null), $"{file}: {outcome}");
            if (known is not null)
                Assert.Equal(known, acknowledged[file]);
        }

        foreach (var (file, runId) in acknowledged.ToList())
        {
            Assert.Equal("duplicate", await SendOneAsync(file));
            Assert.Equal(runId, acknowledged[file]);
        }
    }

    /// <summary>Every lot is either open or decided; the open ones can be decided, the others cannot be decided again.</summary>
    public async Task EveryLotIsDecidedOrOpenAsync()
    {
        foreach (var lot in lots)
        {
            var view = await quality.SeeAsync($"/api/lots/{lot}");
            using var response = await DecideAsync(lot);
            if (view.Text("state") == "open")
            {
                Assert.DoesNotContain(lot, signed);
                await response.ShouldBeAsync(HttpStatusCode.Created);
                signed.Add(lot);
            }
            else
            {
                await response.ShouldRefuseAsync(HttpStatusCode.Conflict, "lotDecided");
            }
        }

        lots.Clear();
    }

    public void Dispose()
    {
        quality.Dispose();
        bench.Dispose();
    }

    private static async Task SignInAsync(HttpClient client, string email)
        => await (await client.PostAsJsonAsync("/api/session", new { email, password = Lab.Password })).ShouldBeAsync(HttpStatusCode.NoContent);

    private Task<HttpResponseMessage> DecideAsync(string lot)
        => quality.PostAsJsonAsync($"/api/lots/{lot}/decisions", new { decision = "approve", reason = "All pass.", password = Lab.Password });

    // What became of the file; null when the server could not say.
    private async Task<string?> SendOneAsync(string file)
    {
        using var response = await SendAsync("open", (file, begun[file]));
        var body = await response.Content.ReadAsStringAsync();
        if (response.StatusCode is not (HttpStatusCode.OK or HttpStatusCode.Created))
        {
            answers.Add($"{(int)response.StatusCode} {body}");
            return null;
        }

        var result = Assert.Single(JsonElement.Parse(body).GetProperty("results").EnumerateArray());
        acknowledged[file] = result.Text("runId");
        return result.Text("outcome");
    }

    private Task<HttpResponseMessage> SendAsync(string lot, params (string Name, byte[] Content)[] files)
        => RunScene.SendAsync(bench, [("device", "PN/A"), ("lot", lot)], files);
}

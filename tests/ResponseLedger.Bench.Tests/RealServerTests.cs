using System.Net;
using System.Net.Http.Json;
using System.Text.Json;
using ResponseLedger.Server.Tests;

namespace ResponseLedger.Bench.Tests;

/// <summary><c>send</c> against the real server: files, verdicts, refusals, duplicates, and a call that was broken off.</summary>
public sealed class RealServerTests(Lab lab) : IDisposable
{
    private readonly Call call = new() { Connect = Surroundings.Client };

    public void Dispose() => call.Dispose();

    [Fact]
    public async Task Files_are_judged_and_kept_and_a_bad_one_is_named_with_its_place()
    {
        var scene = await SceneAsync();
        string[] files =
        [
            call.File("SN1_a.csv"), call.File("SN2_a.csv", Call.Csv(3)), call.File("SN3_a.csv", "frequency_hz,gain_db\n10,0\n20,9.91E37\n30,0\n"),
            call.File("SN4_a.csv", "Frequenz [Hz];Betrag [dB];Phase [Grad]\n10;0,25;0\n100;0,25;-1\n10000;0,25;-2\n"),
        ];

        Assert.Equal(ExitCodes.NotInOrder, await call.RunAsync([.. scene.Args, .. files]));

        var lines = call.Output.Where(line => line[0] == '[').ToList();
        Assert.Equal("[1/4] SN1_a.csv: PASS, unit SN1; nearest to a limit: top, margin 1 dB at 10 Hz", lines[0]);
        Assert.Equal("[2/4] SN2_a.csv: FAIL, unit SN2; nearest to a limit: top, margin -2 dB at 10 Hz", lines[1]);
        Assert.Equal("[3/4] SN3_a.csv: REFUSED", lines[2]);
        Assert.Equal("[4/4] SN4_a.csv: PASS, unit SN4; nearest to a limit: top, margin 0.75 dB at 10 Hz", lines[3]);
        Assert.Contains(call.Output, line => line.StartsWith("  line 3, column 2: ", StringComparison.Ordinal));
        Assert.Equal("4 files: 2 pass, 1 fail, 1 refused.", call.Output[^1]);
        Assert.Equal(["SN1 pass", "SN2 fail", "SN4 pass"], await scene.KeptAsync());
    }

    [Fact]
    public async Task A_call_that_was_broken_off_is_made_again_and_nothing_is_doubled()
    {
        var scene = await SceneAsync();
        var files = Enumerable.Range(1, 6).Select(i => call.File($"SN{i}.csv")).ToArray();
        using var stop = new CancellationTokenSource();
        var sent = 0;
        call.Connect = () => new HttpClient(new Cutting(() => sent++ == 3, stop));
        Assert.Equal(ExitCodes.NotDone, await call.RunAsync([.. scene.Args, .. files], stop.Token));
        Assert.Equal("6 files: 3 pass, 3 not sent.", call.Output[^1]);

        call.Connect = Surroundings.Client;
        Assert.Equal(ExitCodes.InOrder, await call.RunAsync([.. scene.Args, .. files]));

        // The fourth was taken though its answer was never read.
        Assert.Equal(4, call.Output.Count(line => line.EndsWith("(sent before)", StringComparison.Ordinal)));
        Assert.Equal("6 files: 6 pass.", call.Output[^1]);
        Assert.Equal(Enumerable.Range(1, 6).Select(i => $"SN{i} pass"), await scene.KeptAsync());
    }

    [Fact]
    public async Task An_unknown_lot_and_a_revoked_token_are_told_in_the_servers_words()
    {
        var scene = await SceneAsync();
        var file = call.File("SN1.csv");
        Assert.Equal(ExitCodes.NotDone, await call.RunAsync(["send", "--server", lab.Server.Address.ToString(), "--device", scene.Part, "--lot", "none such", file]));
        Assert.StartsWith("SN1.csv: not taken (422). ", call.Output[0], StringComparison.Ordinal);
        Assert.StartsWith("  lot: ", call.Output[1], StringComparison.Ordinal);

        await (await (await lab.SignInAsync("manager")).DeleteAsync($"/api/tokens/{scene.TokenId}")).ShouldBeAsync(HttpStatusCode.NoContent);
        Assert.Equal(ExitCodes.NotDone, await call.RunAsync([.. scene.Args, file]));
        Assert.StartsWith("SN1.csv: not taken (401). ", Assert.Single(call.Output), StringComparison.Ordinal);
        Assert.Empty(await scene.KeptAsync());
    }

    // A device whose mask lets up to 1 dB pass, a lot of it, and a token in the environment.
    private async Task<Scene> SceneAsync()
    {
        var engineer = await lab.SignInAsync("engineer");
        var manager = await lab.SignInAsync("manager");
        var (part, bench, number) = (Lab.Unique("PN"), Lab.Unique("bay"), Lab.Unique("L"));
        var device = await MadeAsync(engineer, "/api/devices", new { partNumber = part, revision = "A", title = "Board", kind = "transfer" });
        var corners = new[] { new { frequencyHz = 10, value = 1 }, new { frequencyHz = 10_000, value = 1 } };
        var mask = await MadeAsync(engineer, $"/api/devices/{device.GetProperty("id").GetString()}/masks", new
        {
            title = "Flat",
            limits = new[] { new { name = "top", quantity = "gainDb", side = "upper", basis = "absolute", corners } },
            requirements = Array.Empty<object>(),
        });
        await (await engineer.PostAsJsonAsync($"/api/masks/{mask.GetProperty("id").GetString()}/release", new { reason = "For the test." })).ShouldBeAsync(HttpStatusCode.OK);
        var lot = await MadeAsync(engineer, "/api/lots", new { deviceId = device.GetProperty("id").GetString(), number, size = 10 });
        await MadeAsync(manager, "/api/benches", new { name = bench });
        var token = await MadeAsync(manager, "/api/tokens", new { name = bench, scopes = new[] { "runs" }, bench });
        call.Variables["RESPONSELEDGER_TOKEN"] = token.GetProperty("token").GetString()!;
        return new Scene(engineer, part, lot.GetProperty("id").GetString()!, token.GetProperty("id").GetString()!, ["send", "--server", lab.Server.Address.ToString(), "--device", $"{part}/A", "--lot", number]);
    }

    private static async Task<JsonElement> MadeAsync(HttpClient client, string path, object body)
        => await (await client.PostAsJsonAsync(path, body)).ShouldBeAsync(HttpStatusCode.Created);

    private sealed record Scene(HttpClient Engineer, string Part, string LotId, string TokenId, string[] Args)
    {
        /// <summary>Serial number and outcome of every run of the lot.</summary>
        public async Task<string[]> KeptAsync()
        {
            var page = await (await Engineer.GetAsync($"/api/runs?lot={LotId}")).ShouldBeAsync(HttpStatusCode.OK);
            return [.. page.GetProperty("items").EnumerateArray().Select(r => $"{r.GetProperty("serial").GetString()} {r.GetProperty("outcome").GetString()}").Order(StringComparer.Ordinal)];
        }
    }

    // Lets a request through to the server, and then breaks the call off before its answer is read.
    private sealed class Cutting(Func<bool> cut, CancellationTokenSource stop) : DelegatingHandler(new SocketsHttpHandler())
    {
        protected override async Task<HttpResponseMessage> SendAsync(HttpRequestMessage request, CancellationToken cancellationToken)
        {
            var response = await base.SendAsync(request, cancellationToken);
            if (!cut())
                return response;
            await stop.CancelAsync();
            response.Dispose();
            throw new OperationCanceledException(stop.Token);
        }
    }
}

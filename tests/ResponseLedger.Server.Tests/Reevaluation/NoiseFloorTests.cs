using System.Net;
using System.Net.Http.Json;
using System.Text.Json;
using ResponseLedger.Server.Tests.Lots;

namespace ResponseLedger.Server.Tests.Reevaluation;

public sealed class NoiseFloorTests(Lab lab)
{
    [Fact]
    public async Task A_phase_under_the_benchs_noise_floor_stays_absent_when_its_run_is_evaluated_again()
    {
        var (scene, run) = await SentUnderTheFloorAsync();
        var before = await scene.GetAsync($"/api/runs/{run}/verdict");
        Assert.Equal((1, "inconclusive"), Told(before));

        await ReleasePhaseMaskAsync(scene);

        var after = await scene.GetAsync($"/api/runs/{run}/verdict");
        Assert.Equal((2, "inconclusive"), Told(after));
        Assert.Equal(before.GetProperty("criteria").ToString(), after.GetProperty("criteria").ToString());
    }

    [Fact]
    public async Task An_overlay_draws_no_phase_under_the_noise_floor()
    {
        var (scene, run) = await SentUnderTheFloorAsync();

        var trace = await scene.GetAsync($"/api/runs/{run}/trace");
        var overlay = await scene.GetAsync($"/api/lots/{scene.LotId}/overlay?quantity=phase");

        Assert.Equal("[-10,-10,null,null]", trace.GetProperty("phaseDeg").GetRawText());
        Assert.Equal(trace.GetProperty("phaseDeg").GetRawText(), overlay.GetProperty("runs")[0].GetProperty("values").GetRawText());
    }

    private static (int Revision, string Outcome) Told(JsonElement verdict)
        => (verdict.GetProperty("maskRevision").GetInt32(), verdict.GetProperty("outcome").GetString()!);

    // The upper half of the sweep lies 20 dB under the floor; a phase of -10 degrees there would pass.
    private async Task<(LotScene Scene, string RunId)> SentUnderTheFloorAsync()
    {
        var scene = await LotScene.NewAsync(lab, 1, mask: false);
        var manager = await lab.SignInAsync("manager");
        var bench = await (await manager.PostAsJsonAsync("/api/benches", new { name = scene.Bench })).ShouldBeAsync(HttpStatusCode.Created);
        await (await manager.PatchAsJsonAsync($"/api/benches/{bench.GetProperty("id").GetString()}", new { noiseFloorDb = -60 })).ShouldBeAsync(HttpStatusCode.OK);
        await ReleasePhaseMaskAsync(scene);
        return (scene, await scene.SendAsync("a", LotScene.Csv([(10, 0, -10), (100, 0, -10), (1_000, -80, -10), (10_000, -80, -10)])));
    }

    private static async Task ReleasePhaseMaskAsync(LotScene scene)
    {
        var draft = await (await scene.Engineer.PostAsJsonAsync($"/api/devices/{scene.DeviceId}/masks", new
        {
            title = "Phase",
            limits = new[]
            {
                new { name = "lead", quantity = "phaseDeg", side = "upper", basis = "absolute", corners = new[] { new { frequencyHz = 10, value = 0 }, new { frequencyHz = 10_000, value = 0 } } },
            },
            requirements = Array.Empty<object>(),
        })).ShouldBeAsync(HttpStatusCode.Created);
        await (await scene.Engineer.PostAsJsonAsync($"/api/masks/{draft.GetProperty("id").GetString()}/release", new { reason = "for the test" })).ShouldBeAsync(HttpStatusCode.OK);
    }
}

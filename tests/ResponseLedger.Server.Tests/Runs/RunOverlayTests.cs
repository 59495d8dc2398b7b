using System.Net;
using System.Net.Http.Json;
using System.Text.Json;
using ResponseLedger.Server.Tests.Lots;

namespace ResponseLedger.Server.Tests.Runs;

/// <summary>One run drawn with its golden run and its limits.</summary>
public sealed class RunOverlayTests(Lab lab)
{
    [Fact]
    public async Task A_run_is_drawn_as_its_trace_says_with_the_limits_of_its_mask()
    {
        var scene = await LotScene.NewAsync(lab, 1);
        var run = await scene.SendAsync("a", 0.5);

        var overlay = await scene.GetAsync($"/api/runs/{run}/overlay");

        var trace = await scene.GetAsync($"/api/runs/{run}/trace");
        Assert.Equal(Numbers(trace, "frequencyHz"), Numbers(overlay, "frequencyHz"));
        var shown = Assert.Single(overlay.GetProperty("runs").EnumerateArray());
        Assert.Equal((run, "a", "pass"), (shown.GetProperty("runId").GetString(), shown.GetProperty("serial").GetString(), shown.GetProperty("outcome").GetString()));
        Assert.Equal(Numbers(trace, "gainDb"), Numbers(shown, "values"));
        Assert.Equal(["top", "bottom"], overlay.GetProperty("limits").EnumerateArray().Select(l => l.GetProperty("name").GetString()!));
        Assert.Equal(1, overlay.GetProperty("condition").GetProperty("maskRevision").GetInt32());
        Assert.Equal(JsonValueKind.Null, overlay.GetProperty("golden").ValueKind);
    }

    [Fact]
    public async Task A_limit_relative_to_a_reference_level_stands_by_the_level_of_the_run_itself()
    {
        var scene = await LotScene.NewAsync(lab, 1, mask: false);
        await ReleaseRelativeAsync(scene);
        await scene.SetGoldenAsync(await scene.SendAsync("golden", RunScene.Csv(7), purpose: "golden"));
        var run = await scene.SendAsync("a", 3);

        var overlay = await scene.GetAsync($"/api/runs/{run}/overlay");

        // The peak of the run is 3 dB, that of the golden run 7 dB: the limit of 2 dB over the peak lies at 5 dB.
        Assert.All(Numbers(Assert.Single(overlay.GetProperty("limits").EnumerateArray()), "values"), v => Assert.Equal(5, v!.Value, 1e-9));
        Assert.Empty(overlay.GetProperty("notes").EnumerateArray());
        Assert.Equal("golden", overlay.GetProperty("golden").GetProperty("serial").GetString());

        var ofLot = await scene.GetAsync($"/api/lots/{scene.LotId}/overlay");
        Assert.All(Numbers(Assert.Single(ofLot.GetProperty("limits").EnumerateArray()), "values"), v => Assert.Equal(9, v!.Value, 1e-9));
    }

    [Fact]
    public async Task A_run_without_a_lot_and_without_a_mask_is_drawn_beside_the_golden_run()
    {
        var scene = await LotScene.NewAsync(lab, 1, mask: false);
        var golden = await scene.SendAsync("golden", 1, "standard");
        await scene.SetGoldenAsync(golden);
        var study = await scene.SendAsync("a", RunScene.Csv(0, "study"), purpose: "study");

        var overlay = await scene.GetAsync($"/api/runs/{study}/overlay?quantity=phase");

        Assert.Equal("deg", overlay.GetProperty("unit").GetString());
        Assert.Equal(golden, overlay.GetProperty("golden").GetProperty("runId").GetString());
        Assert.Equal("noReleasedMask", Assert.Single(overlay.GetProperty("notes").EnumerateArray()).GetProperty("code").GetString());
        await (await scene.Engineer.GetAsync($"/api/runs/{study}/overlay?quantity=colour")).ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity);
    }

    [Fact]
    public async Task The_run_of_a_decided_lot_is_drawn_by_the_mask_that_was_signed()
    {
        var scene = await LotScene.NewAsync(lab, 1);
        var run = await scene.SendAsync("a", 0.5);
        await (await scene.DecideAsync("approve")).ShouldBeAsync(HttpStatusCode.Created);
        await scene.ReleaseAsync(4);

        var overlay = await scene.GetAsync($"/api/runs/{run}/overlay");

        Assert.Equal(1, overlay.GetProperty("condition").GetProperty("maskRevision").GetInt32());
        Assert.All(Numbers(overlay.GetProperty("limits")[0], "values"), v => Assert.Equal(1, v!.Value));
        var verdict = await scene.GetAsync($"/api/runs/{run}/verdict");
        var mask = await scene.GetAsync($"/api/masks/{verdict.GetProperty("maskId").GetString()}");
        Assert.Equal(verdict.GetProperty("maskRevision").GetInt32(), mask.GetProperty("revision").GetInt32());
    }

    private static async Task ReleaseRelativeAsync(LotScene scene)
    {
        var limit = new
        {
            name = "over the peak",
            quantity = "gainDb",
            side = "upper",
            basis = "reference",
            reference = new { kind = "peak" },
            corners = new[] { new { frequencyHz = 10, value = 2 }, new { frequencyHz = 10_000, value = 2 } },
        };
        var draft = await (await scene.Engineer.PostAsJsonAsync($"/api/devices/{scene.DeviceId}/masks", new { title = "Relative", limits = new[] { limit }, requirements = Array.Empty<object>() }))
            .ShouldBeAsync(HttpStatusCode.Created);
        await (await scene.Engineer.PostAsJsonAsync($"/api/masks/{draft.GetProperty("id").GetString()}/release", new { reason = "for the test" })).ShouldBeAsync(HttpStatusCode.OK);
    }

    private static List<double?> Numbers(JsonElement element, string member)
        => [.. element.GetProperty(member).EnumerateArray().Select(v => v.ValueKind == JsonValueKind.Null ? (double?)null : v.GetDouble())];
}

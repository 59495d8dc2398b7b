using System.Net;
using System.Net.Http.Json;
using System.Text.Json;
using ResponseLedger.Server.Tests.Lots;

namespace ResponseLedger.Server.Tests.SignOff;

public sealed class DecidedLotTests(Lab lab)
{
    [Fact]
    public async Task A_decided_lot_shows_what_was_pinned_whatever_comes_after()
    {
        var scene = await LotScene.NewAsync(lab, 2);
        var run = await scene.SendAsync("a", 0.5);
        await scene.SendAsync("b", 0.25);
        await (await scene.DecideAsync("approve")).ShouldBeAsync(HttpStatusCode.Created);
        var before = await EverythingAsync(scene);

        await scene.ReleaseAsync(0.1);
        await (await scene.Engineer.PostAsJsonAsync($"/api/devices/{scene.DeviceId}/conditions", new { name = "cold" })).ShouldBeAsync(HttpStatusCode.Created);
        await scene.SetGoldenAsync(run);

        Assert.Equal(before, await EverythingAsync(scene));
        Assert.Equal(["lotDecided"], await scene.BlockersAsync());
        await (await scene.DecideAsync("reject")).ShouldRefuseAsync(HttpStatusCode.Conflict, "lotDecided");
        await (await scene.DispositionAsync("a", "scrap")).ShouldRefuseAsync(HttpStatusCode.Conflict, "lotDecided");
    }

    [Fact]
    public async Task A_reopened_lot_follows_the_masks_in_force_and_is_decided_anew()
    {
        var scene = await LotScene.NewAsync(lab, 1);
        await scene.SendAsync("a", 0.5);
        var first = await (await scene.DecideAsync("approve")).ShouldBeAsync(HttpStatusCode.Created);
        await scene.ReleaseAsync(0.1);

        var reopened = await (await scene.ReopenAsync()).ShouldBeAsync(HttpStatusCode.Created);

        Assert.Equal(first.GetProperty("id").GetString(), reopened.GetProperty("decisionId").GetString());
        var lot = await scene.LotAsync();
        Assert.Equal(("open", 2, 0), (lot.GetProperty("state").GetString(), lot.GetProperty("maskRevision").GetInt32(), lot.GetProperty("stale").GetInt32()));
        Assert.Equal("1 1 0 1 0 0 0", await scene.CountsAsync());
        await (await scene.DecideAsync("approve")).ShouldRefuseAsync(HttpStatusCode.Conflict, "unitsNotPassed");
        var second = await (await scene.DecideAsync("reject")).ShouldBeAsync(HttpStatusCode.Created);
        Assert.Equal(2, second.GetProperty("ordinal").GetInt32());

        var listed = (await scene.GetAsync($"/api/lots/{scene.LotId}/decisions")).GetProperty("items").EnumerateArray().ToList();
        Assert.Equal([2, 1], listed.Select(d => d.GetProperty("ordinal").GetInt32()));
        Assert.Equal(JsonValueKind.Null, listed[0].GetProperty("reopening").ValueKind);
        Assert.Equal("A drifted bench.", listed[1].GetProperty("reopening").GetProperty("reason").GetString());
        Assert.Equal(first.GetProperty("sha256").GetString(), listed[1].GetProperty("sha256").GetString());
    }

    [Fact]
    public async Task Only_quality_reopens_and_only_what_is_decided()
    {
        var scene = await LotScene.NewAsync(lab, 1);
        await (await scene.ReopenAsync()).ShouldRefuseAsync(HttpStatusCode.Conflict, "lotOpen");
        await (await scene.DecideAsync("reject")).ShouldBeAsync(HttpStatusCode.Created);

        await (await scene.ReopenAsync(scene.Engineer)).ShouldBeAsync(HttpStatusCode.Forbidden);
        var (_, quality) = await lab.NewPersonAsync("quality");
        await (await scene.ReopenAsync(quality, "not this one")).ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity);
        await (await quality.PostAsJsonAsync($"/api/lots/{scene.LotId}/reopenings", new { reason = "", password = Lab.Password })).ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity);
        await (await quality.PostAsJsonAsync("/api/lots/0198c0de-0000-7000-8000-000000000000/reopenings", new { reason = "x", password = Lab.Password })).ShouldRefuseAsync(HttpStatusCode.NotFound);

        await (await scene.ReopenAsync()).ShouldBeAsync(HttpStatusCode.Created);
        await (await scene.ReopenAsync()).ShouldRefuseAsync(HttpStatusCode.Conflict, "lotOpen");
    }

    [Fact]
    public async Task A_decision_that_is_not_there_is_not_found()
    {
        var auditor = await lab.SignInAsync("auditor");

        await (await auditor.GetAsync("/api/decisions/0198c0de-0000-7000-8000-000000000000")).ShouldRefuseAsync(HttpStatusCode.NotFound);
        await (await auditor.GetAsync("/api/decisions/0198c0de-0000-7000-8000-000000000000/record")).ShouldRefuseAsync(HttpStatusCode.NotFound);
    }

    // All that is shown of the lot, but for its decision and the blockers, which are about the lot's state.
    private static async Task<string> EverythingAsync(LotScene scene)
        => string.Join('\n', await scene.LotAsync(), await scene.UnitsAsync(), await scene.GetAsync($"/api/lots/{scene.LotId}/statistics"), await scene.GetAsync($"/api/lots/{scene.LotId}/overlay"));
}

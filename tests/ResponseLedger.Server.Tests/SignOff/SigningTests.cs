using System.Net;
using System.Net.Http.Json;
using System.Text.Json;
using ResponseLedger.Server.Tests.Lots;

namespace ResponseLedger.Server.Tests.SignOff;

public sealed class SigningTests(Lab lab)
{
    [Fact]
    public async Task What_is_shown_before_signing_is_what_the_record_says_after()
    {
        var scene = await LotScene.NewAsync(lab, 3);
        var golden = await scene.SendAsync("golden", Runs.RunScene.Csv(0, Lab.Unique("golden")), purpose: "golden");
        await scene.SetGoldenAsync(golden);
        await scene.SendAsync("a", 0);
        await scene.SendAsync("b", 3);
        var spoilt = await scene.SendAsync("c", 3);
        await scene.SendAsync("c", 0);
        await scene.InvalidateAsync(spoilt);
        await (await scene.DispositionAsync("b", "concession")).ShouldBeAsync(HttpStatusCode.Created);

        var shown = await ShownAsync(scene);
        var decision = await (await SignAsync(scene, "approveWithConcession", shown.GetProperty("seen").GetString()!)).ShouldBeAsync(HttpStatusCode.Created);

        var record = decision.GetProperty("record");
        Assert.Equal(1, shown.GetProperty("ordinal").GetInt32());
        Assert.Equal(1, shown.GetProperty("invalidated").GetInt32());
        Assert.Equal(scene.LotNumber, shown.GetProperty("number").GetString());
        Assert.Equal(record.GetProperty("engineVersion").GetInt32(), shown.GetProperty("engine").GetInt32());
        foreach (var count in record.GetProperty("counts").EnumerateObject())
            Assert.Equal(count.Value.GetInt32(), shown.GetProperty("counts").GetProperty(count.Name).GetInt32());
        var condition = Assert.Single(shown.GetProperty("conditions").EnumerateArray());
        var pinned = record.GetProperty("conditions")[0];
        Assert.Equal(pinned.GetProperty("maskRevision").GetInt32(), condition.GetProperty("maskRevision").GetInt32());
        Assert.Equal(pinned.GetProperty("maskSha256").GetString(), condition.GetProperty("maskSha256").GetString());
        Assert.Equal((golden, "golden"), (condition.GetProperty("goldenRunId").GetString(), condition.GetProperty("goldenSerial").GetString()));
        var unit = Assert.Single(shown.GetProperty("dispositions").EnumerateArray());
        Assert.Equal(("b", "concession", "As agreed."), (unit.GetProperty("serial").GetString(), unit.GetProperty("disposition").GetString(), unit.GetProperty("reason").GetString()));
        var choice = Choice(shown, "approveWithConcession");
        Assert.Empty(choice.GetProperty("blockers").EnumerateArray());
        Assert.Equal(decision.GetProperty("meaning").GetString(), choice.GetProperty("meaning").GetString());
        Assert.Equal("approveWithConcession", shown.GetProperty("recommendation").GetProperty("decision").GetString());
        Assert.Equal(record.GetProperty("recommendation").GetProperty("sentence").GetString(), shown.GetProperty("recommendation").GetProperty("sentence").GetString());
        Assert.Equal(["concessionNeeded"], Choice(shown, "approve").GetProperty("blockers").EnumerateArray().Select(b => b.GetProperty("code").GetString()));
    }

    [Theory]
    [InlineData("retest")]
    [InlineData("disposition")]
    [InlineData("golden")]
    [InlineData("mask")]
    [InlineData("invalidation")]
    public async Task A_lot_that_changed_since_it_was_shown_is_not_signed(string change)
    {
        var scene = await LotScene.NewAsync(lab, 2);
        var run = await scene.SendAsync("a", 0.25);
        await scene.SendAsync("b", 3);
        await (await scene.DispositionAsync("b", "scrap")).ShouldBeAsync(HttpStatusCode.Created);
        var before = await ShownAsync(scene);
        Assert.Equal(before.GetProperty("seen").GetString(), (await ShownAsync(scene)).GetProperty("seen").GetString());

        switch (change)
        {
            case "retest": await scene.SendAsync("a", 0.5); break;
            case "disposition": await (await scene.DispositionAsync("b", "return")).ShouldBeAsync(HttpStatusCode.Created); break;
            case "golden": await scene.SetGoldenAsync(run); break;
            case "mask": await scene.ReleaseAsync(0.5); break;
            default:
                await scene.SendAsync("a", 0.5);
                before = await ShownAsync(scene);
                await scene.InvalidateAsync(run);
                break;
        }

        await (await SignAsync(scene, "approve", before.GetProperty("seen").GetString()!)).ShouldRefuseAsync(HttpStatusCode.Conflict, "evidenceChanged");
        Assert.Equal("open", (await scene.LotAsync()).GetProperty("state").GetString());
        await (await SignAsync(scene, "approve", (await ShownAsync(scene)).GetProperty("seen").GetString()!)).ShouldBeAsync(HttpStatusCode.Created);
    }

    [Fact]
    public async Task Who_may_not_sign_is_told_before()
    {
        var scene = await LotScene.NewAsync(lab, 1);
        await scene.SendAsync("a", 0);
        Assert.Equal(JsonValueKind.Null, (await ShownAsync(scene)).GetProperty("againstSigner").ValueKind);

        var quality = await lab.SignInAsync("quality");
        await (await quality.PatchAsJsonAsync($"/api/devices/{scene.DeviceId}", new { signingExcludesOwnRuns = true })).ShouldBeAsync(HttpStatusCode.OK);
        Assert.Contains("1 of the lot's runs", (await ShownAsync(scene)).GetProperty("againstSigner").GetString(), StringComparison.Ordinal);

        await (await quality.PatchAsJsonAsync($"/api/devices/{scene.DeviceId}", new { signingNeedsQuality = true })).ShouldBeAsync(HttpStatusCode.OK);
        Assert.Contains("quality", (await ShownAsync(scene)).GetProperty("againstSigner").GetString(), StringComparison.Ordinal);
    }

    [Fact]
    public async Task A_decided_lot_has_nothing_to_sign_and_a_reopened_one_its_next_decision()
    {
        var scene = await LotScene.NewAsync(lab, 1);
        await scene.SendAsync("a", 0);
        var seen = (await ShownAsync(scene)).GetProperty("seen").GetString()!;
        await (await SignAsync(scene, "approve", seen)).ShouldBeAsync(HttpStatusCode.Created);

        await (await scene.Engineer.GetAsync($"/api/lots/{scene.LotId}/signing")).ShouldRefuseAsync(HttpStatusCode.Conflict, "lotDecided");
        var reopened = await (await scene.ReopenAsync()).ShouldBeAsync(HttpStatusCode.Created);

        Assert.Equal(2, (await ShownAsync(scene)).GetProperty("ordinal").GetInt32());
        await (await SignAsync(scene, "approve", seen)).ShouldRefuseAsync(HttpStatusCode.Conflict, "evidenceChanged");
        var listed = (await scene.GetAsync($"/api/lots/{scene.LotId}/decisions")).GetProperty("items")[0].GetProperty("reopening");
        Assert.Equal(reopened.GetProperty("by").GetString(), listed.GetProperty("by").GetString());
        Assert.NotEqual("", listed.GetProperty("by").GetString());
    }

    private static Task<JsonElement> ShownAsync(LotScene scene) => scene.GetAsync($"/api/lots/{scene.LotId}/signing");

    private static JsonElement Choice(JsonElement shown, string decision)
        => shown.GetProperty("choices").EnumerateArray().Single(c => c.GetProperty("decision").GetString() == decision);

    private static Task<HttpResponseMessage> SignAsync(LotScene scene, string decision, string seen)
        => scene.Engineer.PostAsJsonAsync($"/api/lots/{scene.LotId}/decisions", new { decision, reason = "Reviewed.", password = Lab.Password, seen });
}

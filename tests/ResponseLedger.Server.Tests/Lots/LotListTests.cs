using System.Net;
using System.Text.Json;

namespace ResponseLedger.Server.Tests.Lots;

/// <summary>What a list says of a lot beside its counts: the first pass, the worst margin, the last run.</summary>
public sealed class LotListTests(Lab lab)
{
    [Fact]
    public async Task A_lot_says_what_it_came_to_at_the_first_try_and_now()
    {
        var scene = await LotScene.NewAsync(lab, 4);
        var bad = await scene.SendAsync("a", 3);
        await scene.SendAsync("a", 0.25);
        await scene.SendAsync("b", 0.5);
        await scene.SendAsync("c", 2);
        await scene.InvalidateAsync(bad);

        var lot = await ListedAsync(scene);

        Assert.Equal((3, 1), FirstPass(lot));
        Assert.Equal(2, lot.GetProperty("counts").GetProperty("passed").GetInt32());
        var statistics = await scene.GetAsync($"/api/lots/{scene.LotId}/statistics");
        Assert.Equal(FirstPass(lot), FirstPass(statistics));
    }

    [Fact]
    public async Task Each_lot_of_a_page_has_its_own_figures_and_a_lot_without_runs_has_none()
    {
        var scene = await LotScene.NewAsync(lab, 2, furtherConditions: ["hot"]);
        var first = scene.LotId;
        await scene.SendAsync("a", 0);
        await scene.SendAsync("a", 0.5, "hot");
        await scene.SendAsync("b", 0);
        await scene.NextLotAsync(1);
        var second = scene.LotId;
        await scene.SendAsync("c", 0.75);
        await scene.SendAsync("c", 2, "hot");
        await scene.NextLotAsync(1);
        var third = scene.LotId;

        var lots = (await scene.GetAsync($"/api/lots?device={scene.DeviceId}")).GetProperty("items").EnumerateArray().ToDictionary(l => l.GetProperty("id").GetGuid());

        Assert.Equal([(1, 1), (1, 0), (0, 0)], new[] { first, second, third }.Select(id => FirstPass(lots[id])));
        Assert.Equal(["a", "c"], new[] { first, second }.Select(id => lots[id].GetProperty("worst").GetProperty("serial").GetString()));
        Assert.Equal(0.5, lots[first].GetProperty("worst").GetProperty("margin").GetDouble(), 1e-12);
        Assert.Equal(-1, lots[second].GetProperty("worst").GetProperty("margin").GetDouble(), 1e-12);
        Assert.Equal(JsonValueKind.Null, lots[third].GetProperty("worst").ValueKind);
        Assert.Equal(JsonValueKind.Null, lots[third].GetProperty("lastRunAt").ValueKind);
        Assert.True(lots[first].GetProperty("lastRunAt").GetDateTimeOffset() < lots[second].GetProperty("lastRunAt").GetDateTimeOffset());
    }

    [Fact]
    public async Task The_worst_of_a_lot_is_the_worst_of_its_first_unit()
    {
        var scene = await LotScene.NewAsync(lab, 4);
        await scene.SendAsync("passes", 0.9);
        await scene.SendAsync("short", LotScene.Csv([(10, 0, 0), (100, 0, 0)]));

        await SameAsync("short", "inconclusive");
        await scene.SendAsync("high", 2);
        await SameAsync("high", "fail");
        await scene.SendAsync("low", -3);
        await SameAsync("low", "fail");

        async Task SameAsync(string serial, string outcome)
        {
            var worst = (await ListedAsync(scene)).GetProperty("worst");
            var unit = (await scene.UnitsAsync()).GetProperty("items")[0];
            Assert.Equal((serial, outcome), (worst.GetProperty("serial").GetString(), worst.GetProperty("outcome").GetString()));
            Assert.Equal(unit.GetProperty("serial").GetString(), serial);
            Assert.Equal(unit.GetProperty("runId").GetString(), worst.GetProperty("runId").GetString());
            foreach (var name in new[] { "criterion", "frequencyHz", "margin", "unit" })
                Assert.True(JsonElement.DeepEquals(unit.GetProperty("worst").GetProperty(name), worst.GetProperty(name)), $"{name}: {worst} and {unit}");
        }
    }

    [Fact]
    public async Task A_decided_lot_keeps_its_figures_after_a_new_release()
    {
        var scene = await LotScene.NewAsync(lab, 1);
        await scene.SendAsync("a", 0.25);
        await (await scene.DecideAsync("approve")).ShouldBeAsync(HttpStatusCode.Created);
        await scene.ReleaseAsync(0.1);

        var decided = (await scene.GetAsync($"/api/lots?device={scene.DeviceId}&state=decided")).GetProperty("items")[0];

        Assert.Equal((1, 1), FirstPass(decided));
        Assert.Equal(0.75, decided.GetProperty("worst").GetProperty("margin").GetDouble(), 1e-12);
        Assert.Empty((await scene.GetAsync($"/api/lots?device={scene.DeviceId}&state=open")).GetProperty("items").EnumerateArray());
    }

    private static async Task<JsonElement> ListedAsync(LotScene scene)
    {
        var listed = (await scene.GetAsync($"/api/lots?device={scene.DeviceId}")).Item("id", scene.LotId.ToString());
        Assert.True(JsonElement.DeepEquals(listed, await scene.LotAsync()), "The list and the page say different things.");
        return listed;
    }

    private static (int Tested, int Passed) FirstPass(JsonElement of)
        => (of.GetProperty("firstPass").GetProperty("tested").GetInt32(), of.GetProperty("firstPass").GetProperty("passed").GetInt32());
}

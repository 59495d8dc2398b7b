using System.Net;
using System.Net.Http.Json;
using System.Text.Json;
using ResponseLedger.Server.Tests.Runs;

namespace ResponseLedger.Server.Tests.Lots;

/// <summary>Counts in the order units, tested, passed, failed, inconclusive, withdrawn, retests.</summary>
public sealed class LotCountsTests(Lab lab)
{
    [Fact]
    public async Task Units_are_counted_by_their_outcome()
    {
        var scene = await LotScene.NewAsync(lab, 5, ["declared"]);
        await scene.SendAsync("passes", 0);
        await scene.SendAsync("fails", 3);
        await scene.SendAsync("short", LotScene.Csv([(10, 0, 0), (100, 0, 0)]));

        Assert.Equal("4 3 1 1 1 0 0", await scene.CountsAsync());
        Assert.Equal(
            ["fails:fail", "short:inconclusive", "declared:", "passes:pass"],
            (await scene.UnitsAsync()).GetProperty("items").EnumerateArray().Select(u => $"{u.GetProperty("serial").GetString()}:{u.GetProperty("outcome").GetString()}"));
    }

    [Fact]
    public async Task The_run_received_first_counts_and_a_retest_does_not_until_the_first_is_invalidated()
    {
        var scene = await LotScene.NewAsync(lab, 1);
        var first = await scene.SendAsync("u", 3);
        var retest = await scene.SendAsync("u", 0);

        Assert.Equal("1 1 0 1 0 0 1", await scene.CountsAsync());
        var unit = await scene.UnitAsync("u");
        Assert.Equal(first, unit.GetProperty("runId").GetString());
        Assert.Equal(2, unit.GetProperty("runs").GetInt32());
        Assert.Equal(1, unit.GetProperty("retests").GetInt32());
        Assert.Equal("top", unit.GetProperty("worst").GetProperty("criterion").GetString());
        Assert.Equal(-2, unit.GetProperty("worst").GetProperty("margin").GetDouble(), 1e-12);

        await scene.InvalidateAsync(first);

        Assert.Equal("1 1 1 0 0 0 0", await scene.CountsAsync());
        unit = await scene.UnitAsync("u");
        Assert.Equal(retest, unit.GetProperty("runId").GetString());
        Assert.Equal(1, unit.GetProperty("invalidated").GetInt32());

        await scene.InvalidateAsync(retest);

        Assert.Equal("1 0 0 0 0 0 0", await scene.CountsAsync());
        Assert.Equal(JsonValueKind.Null, (await scene.UnitAsync("u")).GetProperty("outcome").ValueKind);
    }

    [Fact]
    public async Task A_reassigned_run_counts_where_it_belongs_now()
    {
        var scene = await LotScene.NewAsync(lab, 2);
        var run = await scene.SendAsync("wrong", 0);

        await (await scene.Engineer.PostAsJsonAsync($"/api/runs/{run}/reassignment", new { serial = "right", reason = "Mislabelled" })).ShouldBeAsync(HttpStatusCode.Created);

        Assert.Equal("1 1 1 0 0 0 0", await scene.CountsAsync());
        Assert.Equal(run, (await scene.UnitAsync("right")).GetProperty("runId").GetString());

        var before = (scene.LotId, scene.LotNumber);
        var other = await scene.NextLotAsync(2);
        await (await scene.Engineer.PostAsJsonAsync($"/api/runs/{run}/reassignment", new { lot = scene.LotNumber, reason = "The other lot" })).ShouldBeAsync(HttpStatusCode.Created);

        Assert.Equal("1 1 1 0 0 0 0", await scene.CountsAsync());
        Assert.Equal(0, (await scene.GetAsync($"/api/lots/{before.LotId}")).GetProperty("counts").GetProperty("units").GetInt32());
        Assert.Equal(other.GetProperty("id").GetGuid(), scene.LotId);
    }

    [Fact]
    public async Task A_run_that_comes_to_an_earlier_unit_counts_by_its_order_of_receipt()
    {
        var scene = await LotScene.NewAsync(lab, 2);
        var early = await scene.SendAsync("a", 3);
        await scene.SendAsync("b", 0);

        await (await scene.Engineer.PostAsJsonAsync($"/api/runs/{early}/reassignment", new { serial = "b", reason = "Mislabelled" })).ShouldBeAsync(HttpStatusCode.Created);

        Assert.Equal("1 1 0 1 0 0 1", await scene.CountsAsync());
        Assert.Equal(early, (await scene.UnitAsync("b")).GetProperty("runId").GetString());
    }

    [Fact]
    public async Task A_unit_passes_when_every_condition_passes()
    {
        var scene = await LotScene.NewAsync(lab, 3, furtherConditions: ["hot"]);
        await scene.SendAsync("both", 0);
        await scene.SendAsync("both", 0.5, "hot");
        await scene.SendAsync("half", 0);
        await scene.SendAsync("mixed", 0);
        var failing = await scene.SendAsync("mixed", 2, "hot");

        Assert.Equal("3 2 1 1 0 0 0", await scene.CountsAsync());
        var mixed = await scene.UnitAsync("mixed");
        Assert.Equal("fail", mixed.GetProperty("outcome").GetString());
        Assert.Equal(failing, mixed.GetProperty("runId").GetString());
        Assert.Equal(["standard:pass", "hot:fail"], mixed.GetProperty("conditions").EnumerateArray().Select(c => $"{c.GetProperty("name").GetString()}:{c.GetProperty("outcome").GetString()}"));
        var half = await scene.UnitAsync("half");
        Assert.Equal(JsonValueKind.Null, half.GetProperty("outcome").ValueKind);
        Assert.Equal(JsonValueKind.Null, half.GetProperty("conditions")[1].GetProperty("runId").ValueKind);
    }

    [Fact]
    public async Task A_failing_condition_fails_the_unit_though_another_is_not_tested()
    {
        var scene = await LotScene.NewAsync(lab, 1, furtherConditions: ["hot"]);
        await scene.SendAsync("u", 3);

        Assert.Equal("1 0 0 1 0 0 0", await scene.CountsAsync());
    }

    [Fact]
    public async Task A_lot_follows_the_newest_release()
    {
        var scene = await LotScene.NewAsync(lab, 1);
        await scene.SendAsync("u", 1.5);
        Assert.Equal("1 1 0 1 0 0 0", await scene.CountsAsync());

        await scene.ReleaseAsync(2);

        Assert.Equal("1 1 1 0 0 0 0", await scene.CountsAsync());
        var lot = await scene.LotAsync();
        Assert.Equal(2, lot.GetProperty("maskRevision").GetInt32());
        Assert.Equal(0, lot.GetProperty("stale").GetInt32());
    }

    [Fact]
    public async Task Golden_runs_and_studies_do_not_count()
    {
        var scene = await LotScene.NewAsync(lab, 1);
        await scene.SendAsync("u", RunScene.Csv(0, "golden"), purpose: "golden");
        await scene.SendAsync("u", RunScene.Csv(0, "study"), purpose: "study");

        Assert.Equal("0 0 0 0 0 0 0", await scene.CountsAsync());
    }

    [Fact]
    public async Task Statistics_show_the_first_pass_and_the_final_yield_and_the_margins()
    {
        var scene = await LotScene.NewAsync(lab, 4);
        var bad = await scene.SendAsync("a", 3);
        await scene.SendAsync("a", 0.25);
        await scene.SendAsync("b", 0.5);
        await scene.SendAsync("c", 0.75);
        await scene.SendAsync("d", 2);
        await scene.InvalidateAsync(bad);

        var statistics = await scene.GetAsync($"/api/lots/{scene.LotId}/statistics");

        Assert.True(statistics.GetProperty("fullyTested").GetBoolean());
        Assert.Equal((4, 2), (statistics.GetProperty("firstPass").GetProperty("tested").GetInt32(), statistics.GetProperty("firstPass").GetProperty("passed").GetInt32()));
        Assert.Equal((4, 3), (statistics.GetProperty("final").GetProperty("tested").GetInt32(), statistics.GetProperty("final").GetProperty("passed").GetInt32()));
        Assert.Equal(0.75, statistics.GetProperty("final").GetProperty("yield").GetDouble());

        // Clopper and Pearson: 3 of 4 at 95 % two-sided is 0.194120 to 0.993691.
        Assert.Equal(0.194120, statistics.GetProperty("final").GetProperty("processLower").GetDouble(), 1e-6);
        Assert.Equal(0.993691, statistics.GetProperty("final").GetProperty("processUpper").GetDouble(), 1e-6);

        var top = statistics.GetProperty("conditions")[0].GetProperty("criteria")[0];
        Assert.Equal("top", top.GetProperty("name").GetString());
        Assert.Equal("dB", top.GetProperty("unit").GetString());
        Assert.Equal(4, top.GetProperty("count").GetInt32());
        Assert.Equal(-1, top.GetProperty("least").GetDouble(), 1e-12);
        Assert.Equal(0.375, top.GetProperty("median").GetDouble(), 1e-12);
        Assert.Equal(0.125, top.GetProperty("mean").GetDouble(), 1e-12);
        Assert.Equal(Math.Sqrt(1.8125 / 3), top.GetProperty("standardDeviation").GetDouble(), 1e-12);
    }
}

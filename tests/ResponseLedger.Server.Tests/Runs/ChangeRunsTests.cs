using System.Net;
using System.Net.Http.Json;

namespace ResponseLedger.Server.Tests.Runs;

/// <summary>Invalidation and reassignment: who may, what counts after, and what is kept.</summary>
public sealed class ChangeRunsTests(Lab lab)
{
    private static readonly object Cause = new { cause = "loose fixture", reason = "The clip had come off; seen at the bench." };

    [Fact]
    public async Task After_an_invalidation_the_retest_counts_and_everything_is_kept()
    {
        var scene = await RunScene.NewAsync(lab);
        var first = await scene.AcceptedAsync("S1_1.csv", RunScene.Csv(2));
        var second = await scene.AcceptedAsync("S1_2.csv", RunScene.Csv(0));
        var view = await (await scene.Engineer.PostAsJsonAsync($"/api/runs/{first}/invalidation", Cause)).ShouldBeAsync(HttpStatusCode.Created);
        Assert.Equal(("invalidated", "loose fixture", "engineer"), (
            view.GetProperty("standing").GetString(), view.GetProperty("invalidation").GetProperty("cause").GetString(), view.GetProperty("invalidation").GetProperty("by").GetString()));
        Assert.Equal("counting", (await scene.RunAsync(second)).GetProperty("standing").GetString());
        Assert.Equal(HttpStatusCode.OK, (await scene.Engineer.GetAsync($"/api/runs/{first}/file")).StatusCode);
        Assert.Single(await lab.LedgerKindsAsync(first), "run.invalidated");
        await (await scene.Engineer.PostAsJsonAsync($"/api/runs/{first}/invalidation", Cause)).ShouldRefuseAsync(HttpStatusCode.Conflict, "alreadyInvalidated");
    }

    [Fact]
    public async Task Of_several_invalidations_at_once_one_stands()
    {
        var scene = await RunScene.NewAsync(lab);
        var id = await scene.AcceptedAsync("S1.csv", RunScene.Csv(2));
        var answers = await Task.WhenAll(Enumerable.Range(0, 6).Select(async _ => (await scene.Engineer.PostAsJsonAsync($"/api/runs/{id}/invalidation", Cause)).StatusCode));
        Assert.Single(answers, HttpStatusCode.Created);
        Assert.Equal(5, answers.Count(a => a == HttpStatusCode.Conflict));
    }

    [Fact]
    public async Task An_invalidation_needs_an_engineer_a_cause_and_a_reason()
    {
        var scene = await RunScene.NewAsync(lab);
        var id = await scene.AcceptedAsync("S1.csv", RunScene.Csv(2));
        Assert.Equal(HttpStatusCode.Forbidden, (await (await lab.SignInAsync("operator")).PostAsJsonAsync($"/api/runs/{id}/invalidation", Cause)).StatusCode);
        var problem = await (await scene.Engineer.PostAsJsonAsync($"/api/runs/{id}/invalidation", new { cause = " ", reason = "" })).ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity);
        Assert.True(problem.GetProperty("errors").TryGetProperty("cause", out _) && problem.GetProperty("errors").TryGetProperty("reason", out _), problem.ToString());
    }

    [Fact]
    public async Task Retests_come_to_count_only_as_often_as_the_device_allows()
    {
        var scene = await RunScene.NewAsync(lab);
        await (await scene.Engineer.PatchAsJsonAsync($"/api/devices/{scene.DeviceId}", new { retestsAllowed = 1 })).ShouldBeAsync(HttpStatusCode.OK);
        var first = await scene.AcceptedAsync("S1_1.csv", RunScene.Csv(2, "1"));
        var second = await scene.AcceptedAsync("S1_2.csv", RunScene.Csv(2, "2"));
        await (await scene.Engineer.PostAsJsonAsync($"/api/runs/{first}/invalidation", Cause)).ShouldBeAsync(HttpStatusCode.Created);
        Assert.Equal("counting", await StandingAsync(scene, second));

        // A retest that turns out bad is taken out all the same; the next one is stored and does not count.
        await (await scene.Engineer.PostAsJsonAsync($"/api/runs/{second}/invalidation", Cause)).ShouldBeAsync(HttpStatusCode.Created);
        var third = await scene.AcceptedAsync("S1_3.csv", RunScene.Csv(0, "3"));
        Assert.Equal("retestsUsedUp", await StandingAsync(scene, third));
        var lot = await (await scene.Engineer.GetAsync($"/api/lots/{scene.LotId}")).ShouldBeAsync(HttpStatusCode.OK);
        Assert.Equal((1, 0, 0), (lot.GetProperty("counts").GetProperty("units").GetInt32(), lot.GetProperty("counts").GetProperty("tested").GetInt32(), lot.GetProperty("counts").GetProperty("passed").GetInt32()));

        await (await scene.Engineer.PatchAsJsonAsync($"/api/devices/{scene.DeviceId}", new { retestsAllowed = 2 })).ShouldBeAsync(HttpStatusCode.OK);
        Assert.Equal("counting", await StandingAsync(scene, third));
    }

    [Fact]
    public async Task A_golden_run_in_force_is_neither_invalidated_nor_moved_until_another_takes_its_place()
    {
        var scene = await RunScene.NewAsync(lab);
        var golden = await scene.AcceptedAsync("G1.csv", RunScene.Csv(0));
        var next = await scene.AcceptedAsync("G2.csv", RunScene.Csv(0.25, "2"));
        await (await scene.Engineer.PutAsJsonAsync($"/api/devices/{scene.DeviceId}/golden", new { runId = golden, reason = "first" })).ShouldBeAsync(HttpStatusCode.OK);
        await (await scene.Engineer.PostAsJsonAsync($"/api/runs/{golden}/invalidation", Cause)).ShouldRefuseAsync(HttpStatusCode.Conflict, "goldenInForce");
        await (await scene.Engineer.PostAsJsonAsync($"/api/runs/{golden}/reassignment", new { serial = "G9", reason = "label" })).ShouldRefuseAsync(HttpStatusCode.Conflict, "goldenInForce");
        await (await scene.Engineer.PutAsJsonAsync($"/api/devices/{scene.DeviceId}/golden", new { runId = next, reason = "better" })).ShouldBeAsync(HttpStatusCode.OK);
        await (await scene.Engineer.PostAsJsonAsync($"/api/runs/{golden}/invalidation", Cause)).ShouldBeAsync(HttpStatusCode.Created);
    }

    [Fact]
    public async Task Under_a_decision_nothing_is_invalidated_and_nothing_moves()
    {
        var scene = await RunScene.NewAsync(lab);
        var id = await scene.AcceptedAsync("S1.csv", RunScene.Csv(0));
        await scene.DecideAsync();
        await (await scene.Engineer.PostAsJsonAsync($"/api/runs/{id}/invalidation", Cause)).ShouldRefuseAsync(HttpStatusCode.Conflict, "lotDecided");
        await (await scene.Engineer.PostAsJsonAsync($"/api/runs/{id}/reassignment", new { serial = "S2", reason = "label" })).ShouldRefuseAsync(HttpStatusCode.Conflict, "lotDecided");
        var open = await RunScene.NewLotAsync(scene.Engineer, scene.DeviceId, Lab.Unique("LOT"));
        using var sent = await RunScene.SendAsync(scene.Engineer, [("lot", open.GetProperty("id").GetString()!), ("bench", scene.Bench)], [("S3.csv", RunScene.Csv(0, "3"))]);
        var other = (await sent.ShouldBeAsync(HttpStatusCode.Created)).GetProperty("results")[0].GetProperty("runId").GetString();
        await (await scene.Engineer.PostAsJsonAsync($"/api/runs/{other}/reassignment", new { lot = scene.LotId, reason = "label" })).ShouldRefuseAsync(HttpStatusCode.Conflict, "lotDecided");
    }

    [Fact]
    public async Task A_run_sent_for_the_wrong_unit_moves_and_its_resend_is_a_duplicate_at_both_places()
    {
        var scene = await RunScene.NewAsync(lab);
        var content = RunScene.Csv(0, scene.LotId);
        var id = await scene.AcceptedAsync("S1.csv", content);
        var moved = await (await scene.Engineer.PostAsJsonAsync($"/api/runs/{id}/reassignment", new { serial = "S2", reason = "wrong label" })).ShouldBeAsync(HttpStatusCode.Created);
        Assert.Equal("S2", moved.GetProperty("serial").GetString());
        Assert.Equal("S1", moved.GetProperty("firstPlace").GetProperty("serial").GetString());
        var reassignment = Assert.Single(moved.GetProperty("reassignments").EnumerateArray());
        Assert.Equal(("S2", "wrong label", "engineer"), (reassignment.GetProperty("serial").GetString(), reassignment.GetProperty("reason").GetString(), reassignment.GetProperty("by").GetString()));
        foreach (var name in new[] { "S1.csv", "S2.csv" })
        {
            var again = await scene.SendOneAsync(name, content);
            Assert.Equal(("duplicate", id), (again.GetProperty("outcome").GetString(), again.GetProperty("runId").GetString()));
        }

        Assert.Equal(["sameFileOtherUnit"], RunScene.Codes(await scene.SendOneAsync("S3.csv", content), "issues"));
        Assert.Equal("accepted", (await scene.SendOneAsync("S1.csv", RunScene.Csv(0, "the right one"))).GetProperty("outcome").GetString());
        await (await scene.Engineer.PostAsJsonAsync($"/api/runs/{id}/reassignment", new { serial = "S2", reason = "again" })).ShouldRefuseAsync(HttpStatusCode.Conflict, "nothingChanges");
    }

    [Fact]
    public async Task A_run_moved_to_another_condition_is_judged_by_that_conditions_mask()
    {
        var scene = await RunScene.NewAsync(lab);
        await (await scene.Engineer.PostAsJsonAsync($"/api/devices/{scene.DeviceId}/conditions", new { name = "hot" })).ShouldBeAsync(HttpStatusCode.Created);
        await scene.ReleaseMaskAsync(0.25, "hot");
        var id = await scene.AcceptedAsync("S1.csv", RunScene.Csv(0.5));
        Assert.Equal("pass", (await scene.RunAsync(id)).GetProperty("outcome").GetString());
        var moved = await (await scene.Engineer.PostAsJsonAsync($"/api/runs/{id}/reassignment", new { condition = "hot", reason = "was hot" })).ShouldBeAsync(HttpStatusCode.Created);
        Assert.Equal(("hot", "fail"), (moved.GetProperty("condition").GetString(), moved.GetProperty("outcome").GetString()));
        Assert.True((await scene.GetAsync($"/api/runs/{id}/verdict")).GetProperty("stored").GetBoolean());
    }

    [Fact]
    public async Task A_reassignment_to_nowhere_is_refused_by_field()
    {
        var scene = await RunScene.NewAsync(lab, mask: false);
        var other = await RunScene.NewAsync(lab, mask: false);
        var id = await scene.AcceptedAsync("S1.csv", RunScene.Csv(0));
        foreach (var (body, field) in new (object, string)[]
        {
            (new { reason = "x" }, "serial"), (new { lot = other.LotId, reason = "x" }, "lot"), (new { lot = "nowhere", reason = "x" }, "lot"),
            (new { condition = "nowhere", reason = "x" }, "condition"), (new { serial = "S2" }, "reason"),
        })
        {
            var problem = await (await scene.Engineer.PostAsJsonAsync($"/api/runs/{id}/reassignment", body)).ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity);
            Assert.True(problem.GetProperty("errors").TryGetProperty(field, out _), problem.ToString());
        }
    }

    private static async Task<string> StandingAsync(RunScene scene, string runId)
        => (await (await scene.Engineer.GetAsync($"/api/runs/{runId}")).ShouldBeAsync(HttpStatusCode.OK)).GetProperty("standing").GetString()!;
}

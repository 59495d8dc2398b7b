using System.Collections.Concurrent;
using System.Net;
using System.Text.Json;

namespace ResponseLedger.Server.Tests.Runs;

/// <summary>The same bytes again: for the same unit, for another one, in parallel, after a decision; and retests.</summary>
public sealed class DuplicateTests(Lab lab)
{
    [Fact]
    public async Task The_same_bytes_for_the_same_unit_answer_200_with_the_first_run_and_change_nothing()
    {
        var scene = await RunScene.NewAsync(lab);
        var first = await scene.AcceptedAsync("S1_a.csv", RunScene.Csv(0, scene.LotId));
        using var again = await scene.SendAsync([("S1_other-name.csv", RunScene.Csv(0, scene.LotId))]);
        var result = Assert.Single((await again.ShouldBeAsync(HttpStatusCode.OK)).GetProperty("results").EnumerateArray());
        Assert.Equal(("duplicate", first), (result.GetProperty("outcome").GetString(), result.GetProperty("runId").GetString()));
        Assert.Equal("pass", result.GetProperty("verdict").GetProperty("outcome").GetString());
        Assert.Single((await scene.GetAsync($"/api/runs?lot={scene.LotId}")).GetProperty("items").EnumerateArray());
        Assert.Single(await lab.LedgerKindsAsync(first), "run.received");
    }

    [Fact]
    public async Task Sixteen_uploaders_of_the_same_files_lose_nothing_and_double_nothing()
    {
        var scene = await RunScene.NewAsync(lab);
        var files = Enumerable.Range(0, 8).Select(i => ($"U{i}_x.csv", RunScene.Csv(0, $"{scene.LotId} {i}"))).ToArray();
        var seen = new ConcurrentBag<(string File, string Outcome, string RunId)>();
        await Parallel.ForAsync(0, 16, new ParallelOptions { MaxDegreeOfParallelism = 16 }, async (i, token) =>
        {
            using var response = await scene.SendAsync([.. files.Skip(i % 8), .. files.Take(i % 8)]);
            Assert.True(response.StatusCode is HttpStatusCode.OK or HttpStatusCode.Created, await response.Content.ReadAsStringAsync(token));
            foreach (var result in JsonDocument.Parse(await response.Content.ReadAsStringAsync(token)).RootElement.GetProperty("results").EnumerateArray())
                seen.Add((result.GetProperty("fileName").GetString()!, result.GetProperty("outcome").GetString()!, result.GetProperty("runId").GetString()!));
        });
        Assert.Equal(128, seen.Count);
        foreach (var file in seen.GroupBy(s => s.File))
        {
            Assert.Single(file, s => s.Outcome == "accepted");
            Assert.Equal(15, file.Count(s => s.Outcome == "duplicate"));
            Assert.Single(file.Select(s => s.RunId).Distinct());
        }

        Assert.Equal(8, (await scene.GetAsync($"/api/runs?lot={scene.LotId}")).GetProperty("items").GetArrayLength());
    }

    [Fact]
    public async Task Sixteen_uploaders_of_different_files_lose_nothing()
    {
        var scene = await RunScene.NewAsync(lab);
        await Parallel.ForAsync(0, 16, new ParallelOptions { MaxDegreeOfParallelism = 16 }, async (i, _) =>
        {
            var files = Enumerable.Range(0, 4).Select(k => ($"U{k}_{i}.csv", RunScene.Csv(0, $"{scene.LotId} {i} {k}"))).ToArray();
            await (await scene.SendAsync(files)).ShouldBeAsync(HttpStatusCode.Created);
        });
        var items = (await scene.GetAsync($"/api/runs?lot={scene.LotId}&limit=500")).GetProperty("items").EnumerateArray().ToList();
        Assert.Equal(64, items.Count);
        Assert.Equal(4, items.Count(i => i.GetProperty("counts").GetBoolean()));
        Assert.Equal(60, items.Count(i => i.GetProperty("standing").GetString() == "retest"));
    }

    [Fact]
    public async Task The_same_bytes_for_another_unit_of_the_lot_are_taken_only_when_acknowledged()
    {
        var scene = await RunScene.NewAsync(lab);
        var content = RunScene.Csv(0, scene.LotId);
        await scene.AcceptedAsync("S1.csv", content);
        var refused = await scene.SendOneAsync("S2.csv", content);
        Assert.Equal(["sameFileOtherUnit"], RunScene.Codes(refused, "issues"));
        var taken = await scene.SendOneAsync("S2.csv", content, ("acknowledge", "sameFileOtherUnit"));
        Assert.Equal("accepted", taken.GetProperty("outcome").GetString());
        Assert.Contains("sameFileOtherUnit", RunScene.Codes(taken, "notes"));
    }

    [Fact]
    public async Task Of_the_same_bytes_sent_for_several_units_at_once_one_is_taken()
    {
        var scene = await RunScene.NewAsync(lab);
        var content = RunScene.Csv(0, scene.LotId);
        var outcomes = await Task.WhenAll(Enumerable.Range(0, 8).Select(async i => (await scene.SendOneAsync($"S{i}.csv", content)).GetProperty("outcome").GetString()));
        Assert.Single(outcomes, "accepted");
        Assert.Equal(7, outcomes.Count(o => o == "refused"));
    }

    [Fact]
    public async Task A_retest_is_kept_does_not_count_and_says_so()
    {
        var scene = await RunScene.NewAsync(lab);
        var first = await scene.AcceptedAsync("S1_1.csv", RunScene.Csv(2));
        var second = await scene.SendOneAsync("S1_2.csv", RunScene.Csv(0));
        var note = Assert.Single(second.GetProperty("notes").EnumerateArray(), n => n.GetProperty("code").GetString() == "retestDoesNotCount");
        Assert.Contains(first, note.GetProperty("message").GetString());
        var run = await scene.RunAsync(second.GetProperty("runId").GetString()!);
        Assert.Equal(("retest", false), (run.GetProperty("standing").GetString(), run.GetProperty("counts").GetBoolean()));
        Assert.True((await scene.RunAsync(first)).GetProperty("counts").GetBoolean());
    }

    [Fact]
    public async Task A_decided_lot_takes_no_new_run_and_still_knows_its_old_ones()
    {
        var scene = await RunScene.NewAsync(lab);
        var content = RunScene.Csv(0, scene.LotId);
        var first = await scene.AcceptedAsync("S1.csv", content);
        await scene.DecideAsync();
        var again = await scene.SendOneAsync("S1.csv", content);
        Assert.Equal(("duplicate", first), (again.GetProperty("outcome").GetString(), again.GetProperty("runId").GetString()));
        var refused = await scene.SendOneAsync("S2.csv", RunScene.Csv(0, "new"));
        Assert.Equal(["lotDecided"], RunScene.Codes(refused, "issues"));
    }

    [Fact]
    public async Task A_decided_lots_verdicts_stay_on_what_was_signed()
    {
        var scene = await RunScene.NewAsync(lab);
        var id = await scene.AcceptedAsync("S1.csv", RunScene.Csv(0.5));
        await scene.DecideAsync();
        await scene.ReleaseMaskAsync(0.25);
        var verdict = await scene.GetAsync($"/api/runs/{id}/verdict");
        Assert.Equal(("pass", 1, true), (verdict.GetProperty("outcome").GetString(), verdict.GetProperty("maskRevision").GetInt32(), verdict.GetProperty("pinned").GetBoolean()));
        Assert.Equal("pass", (await scene.RunAsync(id)).GetProperty("outcome").GetString());
    }

    [Fact]
    public async Task Bytes_that_were_taken_with_columns_chosen_are_a_duplicate_without_them()
    {
        var scene = await RunScene.NewAsync(lab, mask: false);
        var content = ColumnTests.Open(scene.LotId);
        var first = await scene.AcceptedAsync("S1.csv", content, ("columns", ColumnTests.Choice));
        var elsewhere = Lab.Unique("bench");
        using var again = await RunScene.SendAsync(scene.Engineer, [("lot", scene.LotId), ("bench", elsewhere)], [("S1.csv", content)]);
        var result = Assert.Single((await again.ShouldBeAsync(HttpStatusCode.OK)).GetProperty("results").EnumerateArray());
        Assert.Equal(first, result.GetProperty("runId").GetString());
    }
}

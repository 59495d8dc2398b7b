using System.Net;
using System.Text;

namespace ResponseLedger.Server.Tests.Runs;

/// <summary>Columns that a file leaves open: asked for, chosen, remembered by the bench; and a preview that stores nothing.</summary>
public sealed class ColumnTests(Lab lab)
{
    public const string Choice = """[{"column":1,"quantity":"frequency","unit":"Hz"},{"column":2,"quantity":"gainDb","unit":"dB"}]""";

    /// <summary>A file whose heads say nothing.</summary>
    public static byte[] Open(string comment) => Encoding.UTF8.GetBytes($"# {comment}\nfirst,second\n10,0.5\n100,0.25\n10000,0.125\n");

    [Fact]
    public async Task Open_columns_are_asked_for_then_chosen_then_remembered_by_the_bench()
    {
        var scene = await RunScene.NewAsync(lab);
        var refused = await scene.SendOneAsync("S1.csv", Open("1"));
        Assert.Contains("columnsOpen", RunScene.Codes(refused, "issues"));
        Assert.NotEmpty(refused.GetProperty("candidates").EnumerateArray());

        var chosen = await scene.SendOneAsync("S1.csv", Open("1"), ("columns", Choice));
        Assert.Equal("accepted", chosen.GetProperty("outcome").GetString());
        Assert.Equal("pass", chosen.GetProperty("verdict").GetProperty("outcome").GetString());
        var recalled = await scene.SendOneAsync("S2.csv", Open("2"));
        Assert.Equal("accepted", recalled.GetProperty("outcome").GetString());
        Assert.Contains("columnsRemembered", RunScene.Codes(recalled, "notes"));

        using var other = await RunScene.SendAsync(scene.Engineer, [("lot", scene.LotId), ("bench", Lab.Unique("bench"))], [("S3.csv", Open("3"))]);
        await other.ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity);
        Assert.Single(await lab.LedgerKindsAsync(scene.Bench), "bench.columnsRemembered");
    }

    [Fact]
    public async Task Every_candidate_can_be_sent_back()
    {
        var scene = await RunScene.NewAsync(lab);
        var refused = await scene.SendOneAsync("S1.csv", Open("c"));
        var i = 0;
        foreach (var candidate in refused.GetProperty("candidates").EnumerateArray())
        {
            var bench = Lab.Unique("bench");
            using var response = await RunScene.SendAsync(
                scene.Engineer, [("lot", scene.LotId), ("bench", bench), ("columns", candidate.GetRawText())], [($"C{i}.csv", Open($"c{i++}"))]);
            await response.ShouldBeAsync(HttpStatusCode.Created);
        }
    }

    [Fact]
    public async Task A_preview_reads_and_stores_nothing()
    {
        await using var own = await Lab.StartAsync();
        var engineer = await own.SignInAsync("engineer");
        var before = await own.CountAsync();
        using var response = await RunScene.SendAsync(engineer, [], [("S1_a.csv", RunScene.Csv(0.5, "p", 2_000))], path: "/api/runs/preview");
        var preview = await response.ShouldBeAsync(HttpStatusCode.OK);
        Assert.Equal("S1", preview.GetProperty("serial").GetString());
        Assert.Equal(3, preview.GetProperty("columns").GetArrayLength());
        Assert.Empty(preview.GetProperty("issues").EnumerateArray());
        Assert.Equal(2_000, preview.GetProperty("points").GetInt32());
        Assert.InRange(preview.GetProperty("trace").GetProperty("frequencyHz").GetArrayLength(), 2, 400);

        using var open = await RunScene.SendAsync(engineer, [], [("x.csv", Open("p"))], path: "/api/runs/preview");
        var asked = await open.ShouldBeAsync(HttpStatusCode.OK);
        Assert.Contains("columnsOpen", RunScene.Codes(asked, "issues"));
        Assert.Equal(System.Text.Json.JsonValueKind.Null, asked.GetProperty("trace").ValueKind);
        using var chosen = await RunScene.SendAsync(engineer, [("columns", Choice)], [("x.csv", Open("p"))], path: "/api/runs/preview");
        Assert.Equal(3, (await chosen.ShouldBeAsync(HttpStatusCode.OK)).GetProperty("trace").GetProperty("gainDb").GetArrayLength());

        // Files with the same heads are known by one digest, whatever stands in them.
        using var alike = await RunScene.SendAsync(engineer, [], [("y.csv", Open("q"))], path: "/api/runs/preview");
        Assert.Equal(asked.GetProperty("headsDigest").GetString(), (await alike.ShouldBeAsync(HttpStatusCode.OK)).GetProperty("headsDigest").GetString());
        Assert.NotEqual(asked.GetProperty("headsDigest").GetString(), preview.GetProperty("headsDigest").GetString());

        using var two = await RunScene.SendAsync(engineer, [], [("a.csv", Open("a")), ("b.csv", Open("b"))], path: "/api/runs/preview");
        await two.ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity);
        Assert.Equal(before, await own.CountAsync());
    }
}

using System.Net;
using System.Net.Http.Json;
using System.Text;
using System.Text.Json;

namespace ResponseLedger.Server.Tests.Runs;

/// <summary>What a run shows: lists, its own page, trace, file, export, verdict, measures.</summary>
public sealed class ReadRunsTests(Lab lab)
{
    [Fact]
    public async Task Lists_go_by_every_filter_newest_first_page_by_page()
    {
        var scene = await RunScene.NewAsync(lab);
        var ids = new List<string>();
        for (var i = 0; i < 5; i++)
            ids.Add(await scene.AcceptedAsync($"S{i}.csv", RunScene.Csv(i == 3 ? 2 : 0, $"{scene.LotId}{i}"), ("measuredAt", $"2026-01-0{i + 1}T00:00:00Z")));
        ids.Reverse();
        Assert.Equal(ids, await IdsAsync($"lot={scene.LotId}"));
        Assert.Equal(ids, await IdsAsync($"lot={scene.LotNumber}&device={scene.PartNumber}&bench={scene.Bench}&purpose=production&condition=standard"));
        Assert.Equal(ids, await IdsAsync($"device={scene.DeviceId}"));
        Assert.Equal(ids, await IdsAsync($"device={scene.PartNumber}%2FA"));
        Assert.Equal([ids[1]], await IdsAsync($"lot={scene.LotId}&outcome=fail"));
        Assert.Equal([ids[4]], await IdsAsync($"lot={scene.LotId}&serial=S0"));
        Assert.Equal([ids[2], ids[3]], await IdsAsync($"lot={scene.LotId}&from=2026-01-02T00:00:00Z&to=2026-01-04T00:00:00Z"));
        Assert.Empty(await IdsAsync($"lot={scene.LotId}&purpose=golden"));
        Assert.Empty(await IdsAsync("lot=no-such-lot"));

        var paged = new List<string>();
        for (string? cursor = ""; cursor is not null;)
        {
            var page = await scene.GetAsync($"/api/runs?lot={scene.LotId}&limit=2&cursor={cursor}");
            paged.AddRange(page.GetProperty("items").EnumerateArray().Select(i => i.GetProperty("id").GetString()!));
            cursor = page.GetProperty("next").GetString();
        }

        Assert.Equal(ids, paged);

        async Task<List<string>> IdsAsync(string query)
            => [.. (await scene.GetAsync($"/api/runs?{query}")).GetProperty("items").EnumerateArray().Select(i => i.GetProperty("id").GetString()!)];
    }

    [Theory, InlineData("outcome=good"), InlineData("purpose=none"), InlineData("from=soon"), InlineData("limit=0"), InlineData("limit=501"), InlineData("cursor=x"), InlineData("serial=%00")]
    public async Task A_filter_that_cannot_stand_is_refused(string query)
        => await (await (await lab.SignInAsync("auditor")).GetAsync($"/api/runs?{query}")).ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity);

    [Fact]
    public async Task A_run_tells_where_it_belongs_how_it_was_read_and_what_it_came_to()
    {
        var scene = await RunScene.NewAsync(lab);
        var content = RunScene.Csv(0.25, scene.LotId);
        var run = await scene.RunAsync(await scene.AcceptedAsync("S1_a.csv", content));
        Assert.Equal((scene.DeviceId, scene.LotId, "standard", "production"), (
            run.GetProperty("deviceId").GetString(), run.GetProperty("lotId").GetString(), run.GetProperty("condition").GetString(), run.GetProperty("purpose").GetString()));
        var file = Assert.Single(run.GetProperty("files").EnumerateArray());
        Assert.Equal(("S1_a.csv", content.Length), (file.GetProperty("name").GetString(), file.GetProperty("size").GetInt32()));
        Assert.Equal(Convert.ToHexStringLower(System.Security.Cryptography.SHA256.HashData(content)), file.GetProperty("sha256").GetString());
        var reading = run.GetProperty("reading");
        Assert.Equal((1, 31, "levelPhase"), (reading.GetProperty("number").GetInt32(), reading.GetProperty("points").GetInt32(), reading.GetProperty("form").GetString()));
        Assert.Equal(10, reading.GetProperty("fromHz").GetDouble());
        Assert.Equal(10_000, reading.GetProperty("toHz").GetDouble(), 6);
        Assert.Equal(("pass", 0.75), (run.GetProperty("outcome").GetString(), Math.Round(run.GetProperty("worst").GetProperty("margin").GetDouble(), 12)));
        Assert.Empty(run.GetProperty("reassignments").EnumerateArray());
    }

    [Fact]
    public async Task The_file_comes_back_byte_for_byte_under_its_own_name()
    {
        var scene = await RunScene.NewAsync(lab, mask: false);
        byte[] content = [.. Encoding.UTF8.GetPreamble(), .. RunScene.Csv(0, "é\r")];
        var id = await scene.AcceptedAsync("../../Größe_a.csv", content);
        using var response = await scene.Engineer.GetAsync($"/api/runs/{id}/file");
        Assert.Equal(HttpStatusCode.OK, response.StatusCode);
        Assert.Equal(content, await response.Content.ReadAsByteArrayAsync());
        Assert.Equal("application/octet-stream", response.Content.Headers.ContentType!.MediaType);
        Assert.Equal("attachment", response.Content.Headers.ContentDisposition!.DispositionType);
        Assert.Equal("Größe_a.csv", response.Content.Headers.ContentDisposition.FileNameStar);
        Assert.Equal(["nosniff"], response.Headers.GetValues("X-Content-Type-Options").Distinct());
        await (await scene.Engineer.GetAsync($"/api/runs/{id}/file?index=1")).ShouldRefuseAsync(HttpStatusCode.NotFound);
    }

    [Fact]
    public async Task A_trace_unwraps_its_phase_and_carries_an_exact_zero_as_null()
    {
        var scene = await RunScene.NewAsync(lab, mask: false);
        var text = "frequency_hz,real,imag\n10,-1,-0.001\n20,-1,0.5\n30,0,0\n40,0.5,0.5\n";
        var trace = await scene.GetAsync($"/api/runs/{await scene.AcceptedAsync("S1.csv", Encoding.UTF8.GetBytes(text))}/trace");
        var phase = trace.GetProperty("phaseDeg").EnumerateArray().Select(p => p.ValueKind == JsonValueKind.Null ? (double?)null : p.GetDouble()).ToList();
        Assert.InRange(phase[0]!.Value, -180, -179);
        Assert.InRange(phase[1]!.Value, -210, -200);
        Assert.Null(phase[2]);
        Assert.Equal(JsonValueKind.Null, trace.GetProperty("gainDb")[2].ValueKind);
        Assert.Equal(0, trace.GetProperty("re")[2].GetDouble());
        Assert.Equal(-0.001, trace.GetProperty("im")[0].GetDouble());

        var magnitude = await scene.GetAsync($"/api/runs/{await scene.AcceptedAsync("S2.csv", "frequency_hz,gain_db\n10,0\n20,-3\n"u8.ToArray())}/trace");
        foreach (var absent in new[] { "phaseDeg", "re", "im" })
            Assert.Equal(JsonValueKind.Null, magnitude.GetProperty(absent).ValueKind);
    }

    [Fact]
    public async Task A_reduced_trace_keeps_ends_peaks_and_notches()
    {
        var scene = await RunScene.NewAsync(lab, mask: false);
        var lines = Encoding.UTF8.GetString(RunScene.Csv(0, "r", 5_001)).Split('\n');
        lines[2 + 1_234] = lines[2 + 1_234].Split(',')[0] + ",7,0";
        lines[2 + 4_321] = lines[2 + 4_321].Split(',')[0] + ",-9,0";
        var id = await scene.AcceptedAsync("S1.csv", Encoding.UTF8.GetBytes(string.Join('\n', lines)));
        var all = await scene.GetAsync($"/api/runs/{id}/trace");
        var few = await scene.GetAsync($"/api/runs/{id}/trace?points=100");
        Assert.Equal(5_001, all.GetProperty("frequencyHz").GetArrayLength());
        Assert.InRange(few.GetProperty("frequencyHz").GetArrayLength(), 50, 100);
        var gains = few.GetProperty("gainDb").EnumerateArray().Select(g => g.GetDouble()).ToList();
        Assert.Contains(7, gains);
        Assert.Contains(-9, gains);
        Assert.Equal(all.GetProperty("frequencyHz")[0].GetDouble(), few.GetProperty("frequencyHz")[0].GetDouble());
        Assert.Equal(all.GetProperty("frequencyHz").EnumerateArray().Last().GetDouble(), few.GetProperty("frequencyHz").EnumerateArray().Last().GetDouble());
        await (await scene.Engineer.GetAsync($"/api/runs/{id}/trace?points=1")).ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity);
        Assert.Equal(2, (await scene.GetAsync($"/api/runs/{id}/trace?points=2")).GetProperty("frequencyHz").GetArrayLength());
    }

    [Theory, InlineData("csv"), InlineData("touchstone")]
    public async Task An_exported_run_reads_back_as_the_same_curve(string format)
    {
        var scene = await RunScene.NewAsync(lab, mask: false);
        var id = await scene.AcceptedAsync("S1.csv", "frequency_hz,real,imag\n10,0.1,0.2\n20,0.30000000000000004,-1e-9\n"u8.ToArray());
        using var exported = await scene.Engineer.GetAsync($"/api/runs/{id}/export?format={format}");
        Assert.Equal(HttpStatusCode.OK, exported.StatusCode);
        var name = exported.Content.Headers.ContentDisposition!.FileName!.Trim('"');
        var again = await scene.AcceptedAsync(name, await exported.Content.ReadAsByteArrayAsync(), ("serial", "S2"));
        var (one, other) = (await scene.GetAsync($"/api/runs/{id}/trace"), await scene.GetAsync($"/api/runs/{again}/trace"));
        foreach (var plane in new[] { "frequencyHz", "re", "im" })
            Assert.Equal(one.GetProperty(plane).GetRawText(), other.GetProperty(plane).GetRawText());
        await (await scene.Engineer.GetAsync($"/api/runs/{id}/export?format=xml")).ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity);
    }

    [Fact]
    public async Task A_magnitude_only_run_refuses_to_become_touchstone()
    {
        var scene = await RunScene.NewAsync(lab, mask: false);
        var id = await scene.AcceptedAsync("S1.csv", "frequency_hz,gain_db\n10,0\n20,-3\n"u8.ToArray());
        await (await scene.Engineer.GetAsync($"/api/runs/{id}/export?format=touchstone")).ShouldRefuseAsync(HttpStatusCode.Conflict);
    }

    [Fact]
    public async Task Measures_are_named_in_the_catalogue_and_refused_by_place_when_wrong()
    {
        var scene = await RunScene.NewAsync(lab);
        var id = await scene.AcceptedAsync("S1.csv", RunScene.Csv(0.5));
        Assert.Contains((await scene.GetAsync("/api/measures")).GetProperty("items").EnumerateArray(), m => m.GetProperty("name").GetString() == "bandwidth");
        var good = await (await scene.Engineer.PostAsJsonAsync($"/api/runs/{id}/measures", new { measures = new object[] { new { measure = "level", parameters = new { frequencyHz = 50 } } } })).ShouldBeAsync(HttpStatusCode.OK);
        Assert.Equal(0.5, good.GetProperty("results")[0].GetProperty("outputs").GetProperty("gainDb").GetDouble(), 12);
        var outside = await (await scene.Engineer.PostAsJsonAsync($"/api/runs/{id}/measures", new { measures = new object[] { new { measure = "level", parameters = new { frequencyHz = 5 } } } })).ShouldBeAsync(HttpStatusCode.OK);
        Assert.Equal(JsonValueKind.Null, outside.GetProperty("results")[0].GetProperty("outputs").GetProperty("gainDb").ValueKind);
        Assert.NotEmpty(outside.GetProperty("results")[0].GetProperty("reason").GetString()!);
        var bad = await (await scene.Engineer.PostAsJsonAsync($"/api/runs/{id}/measures", new { measures = new object[] { new { measure = "level", parameters = new { frequencyHz = 50 } }, new { measure = "loudness" } } }))
            .ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity);
        Assert.True(bad.GetProperty("errors").TryGetProperty("measures[1]", out _), bad.ToString());
        await (await scene.Engineer.PostAsJsonAsync($"/api/runs/{id}/measures", new { })).ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity);
    }

    [Fact]
    public async Task The_verdict_of_a_run_is_the_one_that_its_upload_answered()
    {
        var scene = await RunScene.NewAsync(lab);
        var sent = await scene.SendOneAsync("S1.csv", RunScene.Csv(1.5));
        var verdict = await scene.GetAsync($"/api/runs/{sent.GetProperty("runId").GetString()}/verdict");
        foreach (var member in sent.GetProperty("verdict").EnumerateObject())
            Assert.Equal(member.Value.GetRawText(), verdict.GetProperty(member.Name).GetRawText());
        Assert.Equal((true, false), (verdict.GetProperty("stored").GetBoolean(), verdict.GetProperty("pinned").GetBoolean()));
    }

    [Theory, InlineData(""), InlineData("/trace"), InlineData("/file"), InlineData("/verdict"), InlineData("/export?format=csv")]
    public async Task A_run_that_is_not_there_is_404(string route)
        => await (await (await lab.SignInAsync("auditor")).GetAsync($"/api/runs/{Guid.CreateVersion7(TimeProvider.System.GetUtcNow())}{route}")).ShouldRefuseAsync(HttpStatusCode.NotFound, "notFound");
}

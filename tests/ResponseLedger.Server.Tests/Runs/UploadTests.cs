using System.Net;
using System.Text;
using System.Text.Json;

namespace ResponseLedger.Server.Tests.Runs;

/// <summary>The upload's fields and answers, sentence by sentence of the contract.</summary>
public sealed class UploadTests(Lab lab)
{
    [Theory, InlineData(false), InlineData(true)]
    public async Task Fields_may_stand_before_or_after_the_files(bool fieldsLast)
    {
        var scene = await RunScene.NewAsync(lab);
        using var response = await RunScene.SendAsync(
            scene.Engineer, [("lot", scene.LotNumber), ("bench", scene.Bench), ("device", scene.PartNumber)], [("S1_a.csv", RunScene.Csv(0))], fieldsLast);
        var result = Assert.Single((await response.ShouldBeAsync(HttpStatusCode.Created)).GetProperty("results").EnumerateArray());
        Assert.Equal("accepted", result.GetProperty("outcome").GetString());
        Assert.Equal("S1_a.csv", result.GetProperty("fileName").GetString());
        Assert.Equal("pass", result.GetProperty("verdict").GetProperty("outcome").GetString());
        Assert.Equal(1, result.GetProperty("verdict").GetProperty("worst").GetProperty("margin").GetDouble(), 12);
        Assert.Equal("S1", (await scene.RunAsync(result.GetProperty("runId").GetString()!)).GetProperty("serial").GetString());
    }

    [Fact]
    public async Task A_run_outside_the_mask_fails_with_its_margin()
    {
        var scene = await RunScene.NewAsync(lab);
        var result = await scene.SendOneAsync("S1.csv", RunScene.Csv(1.25));
        var worst = result.GetProperty("verdict").GetProperty("worst");
        Assert.Equal("fail", result.GetProperty("verdict").GetProperty("outcome").GetString());
        Assert.Equal("top", worst.GetProperty("criterion").GetString());
        Assert.Equal(-0.25, worst.GetProperty("margin").GetDouble(), 12);
    }

    [Fact]
    public async Task Without_a_released_mask_the_verdict_is_null_and_says_why()
    {
        var scene = await RunScene.NewAsync(lab, mask: false);
        var result = await scene.SendOneAsync("S1.csv", RunScene.Csv(0));
        Assert.Equal(JsonValueKind.Null, result.GetProperty("verdict").ValueKind);
        Assert.Equal("noReleasedMask", result.GetProperty("verdictReason").GetString());
        var verdict = await scene.GetAsync($"/api/runs/{result.GetProperty("runId").GetString()}/verdict");
        Assert.Equal(JsonValueKind.Null, verdict.GetProperty("verdict").ValueKind);
        Assert.Equal("noReleasedMask", verdict.GetProperty("reason").GetString());
    }

    [Fact]
    public async Task A_batch_keeps_the_good_files_and_names_the_bad_ones()
    {
        var scene = await RunScene.NewAsync(lab);
        var bad = Encoding.UTF8.GetBytes("frequency_hz,gain_db\n10,0\n20,9.91E37\n30,0\n");
        using var response = await scene.SendAsync([("A_1.csv", RunScene.Csv(0, "a")), ("B_1.csv", bad), ("C_1.csv", []), ("D_1.csv", RunScene.Csv(0, "d"))]);
        var results = (await response.ShouldBeAsync(HttpStatusCode.Created)).GetProperty("results").EnumerateArray().ToList();
        Assert.Equal(["accepted", "refused", "refused", "accepted"], results.Select(r => r.GetProperty("outcome").GetString()!));
        var issue = Assert.Single(results[1].GetProperty("issues").EnumerateArray());
        Assert.Equal((3, 2, "overload"), (issue.GetProperty("line").GetInt32(), issue.GetProperty("column").GetInt32(), issue.GetProperty("code").GetString()));
        Assert.Equal(["emptyFile"], RunScene.Codes(results[2], "issues"));
        Assert.Equal(JsonValueKind.Null, results[2].GetProperty("runId").ValueKind);
    }

    [Fact]
    public async Task When_no_file_is_taken_the_problem_document_carries_the_results()
    {
        var scene = await RunScene.NewAsync(lab);
        using var response = await scene.SendAsync([("A.csv", [0, 1, 2, 3, 0, 0]), ("B.csv", [])]);
        var problem = await response.ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity, "nothingTaken");
        Assert.Equal(["binaryFile", "emptyFile"], problem.GetProperty("results").EnumerateArray().SelectMany(r => RunScene.Codes(r, "issues")));
    }

    [Theory]
    [InlineData("devise", "x", "devise")]
    [InlineData("purpose", "guess", "purpose")]
    [InlineData("measuredAt", "yesterday", "measuredAt")]
    [InlineData("columns", "{", "columns")]
    [InlineData("circumstances", "{", "circumstances")]
    [InlineData("circumstances", "{\"temperature\":20}", "circumstances")]
    [InlineData("circumstances", "{\"temperatureC\":-300}", "circumstances")]
    [InlineData("serial", "a\tb", "serial")]
    [InlineData("acknowledge", "everything", "acknowledge")]
    [InlineData("condition", "nowhere", "condition")]
    [InlineData("device", "again", "device")]
    public async Task A_field_that_cannot_stand_is_named(string name, string value, string field)
    {
        var scene = await RunScene.NewAsync(lab, mask: false);
        using var response = await scene.SendAsync([("A.csv", RunScene.Csv(0))], (name, value));
        var problem = await response.ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity);
        Assert.True(problem.GetProperty("errors").TryGetProperty(field, out _), problem.ToString());
        Assert.False(problem.TryGetProperty("results", out _));
    }

    [Fact]
    public async Task A_request_without_a_file_or_without_a_form_is_refused()
    {
        var scene = await RunScene.NewAsync(lab, mask: false);
        using var empty = await scene.SendAsync([]);
        Assert.True((await empty.ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity)).GetProperty("errors").TryGetProperty("file", out _));
        using var json = await scene.Engineer.PostAsync("/api/runs", new StringContent("{}", Encoding.UTF8, "application/json"));
        await json.ShouldRefuseAsync(HttpStatusCode.UnsupportedMediaType);
        using var cut = new StringContent("--x\r\nContent-Disposition: form-data; name=\"file\"; filename=\"a\"\r\n\r\n1,2");
        cut.Headers.ContentType = System.Net.Http.Headers.MediaTypeHeaderValue.Parse("multipart/form-data; boundary=x");
        await (await scene.Engineer.PostAsync("/api/runs", cut)).ShouldRefuseAsync(HttpStatusCode.BadRequest);
    }

    [Fact]
    public async Task What_was_measured_and_how_is_kept()
    {
        var scene = await RunScene.NewAsync(lab);
        var id = await scene.AcceptedAsync(
            "whatever.csv", RunScene.Csv(0), ("serial", "SN 7"), ("measuredAt", "2026-03-01T09:30:00+01:00"),
            ("circumstances", """{"temperatureC":23.5,"instruments":["FRA 1"]}"""));
        var run = await scene.RunAsync(id);
        Assert.Equal("2026-03-01T08:30:00.000000Z", run.GetProperty("measuredAt").GetString());
        Assert.Equal("SN 7", run.GetProperty("serial").GetString());
        Assert.Equal(23.5, run.GetProperty("circumstances").GetProperty("temperatureC").GetDouble());
        Assert.Equal("engineer", run.GetProperty("receivedBy").GetString());
        var other = await scene.RunAsync(await scene.AcceptedAsync("T.csv", RunScene.Csv(0, "t")));
        Assert.Equal(other.GetProperty("receivedAt").GetString(), other.GetProperty("measuredAt").GetString());
    }

    [Fact]
    public async Task A_file_over_the_limit_and_an_archive_are_refused_by_name_and_a_large_one_is_taken()
    {
        var scene = await RunScene.NewAsync(lab);
        var large = RunScene.Csv(0, "large", 60_000);
        Assert.True(large.Length > 1 << 20);
        using var response = await scene.SendAsync([("A.csv", new byte[(64 << 20) + 1]), ("B.zip", [.. "PK\u0003\u0004"u8, 0, 0]), ("C.csv", large)]);
        var results = (await response.ShouldBeAsync(HttpStatusCode.Created)).GetProperty("results").EnumerateArray().ToList();
        Assert.Equal(["fileTooLarge"], RunScene.Codes(results[0], "issues"));
        Assert.Equal(["zipNotTaken"], RunScene.Codes(results[1], "issues"));
        Assert.Equal("accepted", results[2].GetProperty("outcome").GetString());
        var file = await scene.Engineer.GetByteArrayAsync($"/api/runs/{results[2].GetProperty("runId").GetString()}/file");
        Assert.True(large.AsSpan().SequenceEqual(file));
    }

    [Fact]
    public async Task An_auditor_and_a_stranger_may_not_send()
    {
        var scene = await RunScene.NewAsync(lab, mask: false);
        using var auditor = await RunScene.SendAsync(await lab.SignInAsync("auditor"), [("lot", scene.LotId)], [("A.csv", RunScene.Csv(0))]);
        Assert.Equal(HttpStatusCode.Forbidden, auditor.StatusCode);
        using var stranger = await RunScene.SendAsync(lab.Anonymous(), [("lot", scene.LotId)], [("A.csv", RunScene.Csv(0))]);
        Assert.Equal(HttpStatusCode.Unauthorized, stranger.StatusCode);
    }
}

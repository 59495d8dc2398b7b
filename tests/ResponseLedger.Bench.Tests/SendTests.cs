using System.Net;
using static ResponseLedger.Bench.Tests.ScriptedServer;

namespace ResponseLedger.Bench.Tests;

/// <summary>What <c>send</c> asks, and what it makes of each answer.</summary>
public sealed class SendTests : IDisposable
{
    private readonly Call call = new() { Variables = { ["RESPONSELEDGER_TOKEN"] = "secret.word" } };

    public void Dispose() => call.Dispose();

    [Fact]
    public async Task A_file_goes_out_with_its_fields_and_the_token_of_the_environment()
    {
        var server = Server(Result("accepted"));
        var file = call.File("SN1_a.csv");
        Assert.Equal(ExitCodes.InOrder, await call.RunAsync([
            "send", "--device", "PN/A", "--lot", "17", "--bench", "Bay", "--serial", "SN1", "--purpose", "production", "--condition", "hot",
            "--measured-at", "2026-03-01", "--columns", "[]", "--circumstances", "{}", "--acknowledge", "sameFileOtherUnit", file]));
        var request = Assert.Single(server.Requests);
        Assert.Equal(("http://127.0.0.1:5080/api/runs", "Bearer secret.word", "SN1_a.csv"), (request.Address, request.Authorization, request.FileName));
        Assert.Equal(
            "acknowledge=sameFileOtherUnit bench=Bay circumstances={} columns=[] condition=hot device=PN/A lot=17 measuredAt=2026-03-01 purpose=production serial=SN1",
            string.Join(' ', request.Parts.Where(p => p.Key != "file").OrderBy(p => p.Key, StringComparer.Ordinal).Select(p => $"{p.Key}={p.Value}")));
        Assert.Equal(await File.ReadAllTextAsync(file), request.Parts["file"]);
        Assert.Equal(["SN1_a.csv: PASS, unit SN1; nearest to a limit: top, margin 0.25 dB at 1.25 kHz"], call.Output);
    }

    [Fact]
    public async Task What_is_left_out_is_not_sent()
    {
        var server = Server(Result("accepted"));
        await call.RunAsync(["send", "--lot", "17", call.File("A.csv")]);
        Assert.Equal(["file", "lot"], Assert.Single(server.Requests).Parts.Keys.Order());
    }

    [Fact]
    public async Task The_token_of_a_file_goes_before_the_one_of_the_environment_and_is_never_printed()
    {
        var server = Server(Says(HttpStatusCode.Unauthorized, """{"status":401,"code":"signInNeeded","detail":"Sign in, or send a valid bench token."}"""));
        var token = call.File("token.txt", "other.word\n");
        Assert.Equal(ExitCodes.NotDone, await call.RunAsync(["send", "--token-file", token, call.File("A.csv")]));
        Assert.Equal("Bearer other.word", Assert.Single(server.Requests).Authorization);
        Assert.DoesNotContain(call.Output.Concat(call.Errors), line => line.Contains(".word", StringComparison.Ordinal));
    }

    [Theory]
    [InlineData("pass", "production", ExitCodes.InOrder, "PASS, unit SN1; nearest to a limit: top, margin 0.25 dB at 1.25 kHz")]
    [InlineData("conditionalPass", "production", ExitCodes.InOrder, "CONDITIONAL PASS, unit SN1; nearest to a limit: top, margin 0.25 dB at 1.25 kHz")]
    [InlineData("fail", "production", ExitCodes.NotInOrder, "FAIL, unit SN1; nearest to a limit: top, margin 0.25 dB at 1.25 kHz")]
    [InlineData("inconclusive", "production", ExitCodes.NotInOrder, "INCONCLUSIVE, unit SN1; nearest to a limit: top, margin 0.25 dB at 1.25 kHz")]
    [InlineData(null, "production", ExitCodes.NotInOrder, "taken, unit SN1, without a verdict: no mask is released for this condition")]
    [InlineData(null, "golden", ExitCodes.InOrder, "taken, unit SN1, without a verdict: no mask is released for this condition")]
    [InlineData("inconclusive", "golden", ExitCodes.InOrder, "INCONCLUSIVE, unit SN1; nearest to a limit: top, margin 0.25 dB at 1.25 kHz")]
    public async Task The_verdict_is_the_first_word_and_the_exit_code(string? verdict, string purpose, int exitCode, string told)
    {
        Server(Result("accepted", verdict, verdict is null ? ",\"verdictReason\":\"noReleasedMask\"" : ""));
        Assert.Equal(exitCode, await call.RunAsync(["send", "--purpose", purpose, call.File("A.csv")]));
        Assert.Equal($"A.csv: {told}", Assert.Single(call.Output));
    }

    [Fact]
    public async Task A_verdict_without_a_margin_says_why()
    {
        Server(Says(HttpStatusCode.Created,
            """{"results":[{"outcome":"accepted","serial":"S","verdict":{"outcome":"inconclusive","worst":{"criterion":"corner","margin":null,"explanation":"The sweep ends before it."}},"notes":[],"issues":[]}]}"""));
        await call.RunAsync(["send", call.File("A.csv")]);
        Assert.Equal("A.csv: INCONCLUSIVE, unit S; corner: The sweep ends before it.", Assert.Single(call.Output));
    }

    [Fact]
    public async Task A_refused_file_is_told_with_its_places_and_the_others_are_sent()
    {
        var server = Server(
            Result("accepted"),
            Result("refused", null, ",\"issues\":[{\"line\":7,\"column\":2,\"code\":\"badNumber\",\"message\":\"O.5 is no number.\"},{\"line\":null,\"column\":null,\"code\":\"x\",\"message\":\"And more.\"}],\"candidates\":[[{\"column\":1}]]"),
            Result("accepted", "fail"));
        Assert.Equal(ExitCodes.NotInOrder, await call.RunAsync(["send", call.File("A.csv"), call.File("B.csv"), call.File("C.csv")]));
        Assert.Equal(3, server.Requests.Count);
        Assert.Equal(
            ["[2/3] B.csv: REFUSED", "  line 7, column 2: O.5 is no number.", "  And more.", "  perhaps --columns '[{\"column\":1}]'"],
            call.Output[1..5]);
        Assert.Equal("3 files: 1 pass, 1 refused, 1 fail.", call.Output[^1]);
    }

    [Fact]
    public async Task A_duplicate_is_told_as_sent_before_with_the_verdict_of_the_first_run()
    {
        Server(Result("duplicate", "fail"));
        Assert.Equal(ExitCodes.NotInOrder, await call.RunAsync(["send", call.File("A.csv")]));
        Assert.Equal("A.csv: FAIL, unit SN1; nearest to a limit: top, margin 0.25 dB at 1.25 kHz (sent before)", Assert.Single(call.Output));
    }

    [Fact]
    public async Task Notes_about_a_kind_of_files_are_told_once_and_those_about_a_run_each()
    {
        static Func<HttpResponseMessage> Noted(string own) => Result(
            "accepted", "pass", $$""","notes":[{"code":"delimiter","message":"The delimiter is a comma."},{"code":"retestDoesNotCount","message":"{{own}}"}]""");
        Server(Noted("Run 1 counts."), Noted("Run 2 counts."));
        await call.RunAsync(["send", call.File("A.csv"), call.File("B.csv")]);
        Assert.Equal(["  The delimiter is a comma.", "  Run 1 counts.", "  Run 2 counts."], call.Output.Where(line => line.StartsWith("  ", StringComparison.Ordinal)));
    }

    [Fact]
    public async Task A_file_that_is_too_large_does_not_keep_the_others()
    {
        var server = Server(Says(HttpStatusCode.RequestEntityTooLarge, """{"detail":"The request is larger than this server takes."}"""), Result("accepted"));
        Assert.Equal(ExitCodes.NotDone, await call.RunAsync(["send", call.File("A.csv"), call.File("B.csv")]));
        Assert.Equal(2, server.Requests.Count);
        Assert.Equal("[1/2] A.csv: not taken (413). The request is larger than this server takes.", call.Output[0]);
        Assert.Equal("2 files: 1 not taken, 1 pass.", call.Output[^1]);
    }

    private ScriptedServer Server(params Func<HttpResponseMessage>[] answers)
    {
        var server = new ScriptedServer(answers);
        call.Connect = () => new HttpClient(server, disposeHandler: false);
        return server;
    }
}

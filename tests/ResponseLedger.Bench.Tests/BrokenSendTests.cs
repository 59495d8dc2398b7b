using System.Net;
using System.Net.Sockets;
using static ResponseLedger.Bench.Tests.ScriptedServer;

namespace ResponseLedger.Bench.Tests;

/// <summary>What <c>send</c> does when the server is away, turns it down as a whole, or is not one.</summary>
public sealed class BrokenSendTests : IDisposable
{
    private static readonly HttpRequestException Refused = new("outer", new SocketException((int)SocketError.ConnectionRefused));

    private readonly Call call = new() { Variables = { ["RESPONSELEDGER_TOKEN"] = "secret" } };

    public void Dispose() => call.Dispose();

    [Fact]
    public async Task A_connection_that_fails_is_tried_again_and_the_wait_is_told()
    {
        var server = Server(Fails(Refused), Fails(new TaskCanceledException("timeout")), Says(HttpStatusCode.BadGateway, "<html>"), Result("accepted"));
        Assert.Equal(ExitCodes.InOrder, await call.RunAsync(["send", call.File("A.csv")]));
        Assert.Equal(4, server.Requests.Count);
        Assert.Equal([1, 2, 4], call.Time.WaitsSeconds);
        Assert.StartsWith("A.csv: PASS", Assert.Single(call.Output), StringComparison.Ordinal);
        Assert.Equal(["A.csv: Connection refused; trying again in 1 s.", "A.csv: no answer within 100 s; trying again in 2 s.", "A.csv: the server answered 502; trying again in 4 s."], call.Errors);
    }

    [Fact]
    public async Task A_server_that_says_when_to_come_again_is_heeded_within_reason()
    {
        Server(Says(HttpStatusCode.ServiceUnavailable, "{}", retryAfterSeconds: 3), Says(HttpStatusCode.TooManyRequests, "{}", retryAfterSeconds: 3_600), Result("accepted"));
        Assert.Equal(ExitCodes.InOrder, await call.RunAsync(["send", call.File("A.csv")]));
        Assert.Equal([3, 30], call.Time.WaitsSeconds);
    }

    [Fact]
    public async Task When_nobody_listens_it_gives_up_once_and_not_for_every_file()
    {
        using var unused = new TcpListener(IPAddress.Loopback, 0);
        unused.Start();
        var address = $"http://127.0.0.1:{((IPEndPoint)unused.LocalEndpoint).Port}";
        unused.Stop();
        call.Connect = Surroundings.Client;
        Assert.Equal(ExitCodes.NotDone, await call.RunAsync(["send", "--server", address, call.File("A.csv"), call.File("B.csv"), call.File("C.csv")]));
        Assert.Equal([1, 2, 4, 8, 15], call.Time.WaitsSeconds);
        Assert.Equal([$"[1/3] A.csv: not sent. {address}/ does not answer: Connection refused.", "3 files: 3 not sent."], call.Output);
        Assert.Equal("Not sent: B.csv and all after it. Make the same call again: what was taken is answered as sent before.", call.Errors[^1]);
    }

    [Theory]
    [InlineData(HttpStatusCode.Unauthorized, """{"detail":"Sign in, or send a valid bench token."}""", "not taken (401). Sign in, or send a valid bench token.")]
    [InlineData(HttpStatusCode.Forbidden, """{"detail":"This token is bound to bench 2."}""", "not taken (403). This token is bound to bench 2.")]
    [InlineData(HttpStatusCode.UnprocessableEntity, """{"detail":"Some fields cannot stand.","errors":{"lot":["There is no lot 18."]}}""", "not taken (422). Some fields cannot stand.")]
    [InlineData(HttpStatusCode.NotFound, "<html>Not here</html>", "not taken. http://127.0.0.1:5080/ answered 404 and nothing that a ResponseLedger server says.")]
    [InlineData(HttpStatusCode.OK, "[1]", "not taken. http://127.0.0.1:5080/ answered 200 and nothing that a ResponseLedger server says.")]
    public async Task What_stands_against_every_file_is_told_once(HttpStatusCode status, string body, string told)
    {
        var server = Server(Says(status, body));
        Assert.Equal(ExitCodes.NotDone, await call.RunAsync(["send", "--lot", "18", call.File("A.csv"), call.File("B.csv")]));
        Assert.Single(server.Requests);
        Assert.Equal($"[1/2] A.csv: {told}", call.Output[0]);
        Assert.Equal("2 files: 1 not taken, 1 not sent.", call.Output[^1]);
        Assert.StartsWith("Not sent: B.csv.", Assert.Single(call.Errors), StringComparison.Ordinal);
        if (body.Contains("errors", StringComparison.Ordinal))
            Assert.Equal("  lot: There is no lot 18.", call.Output[1]);
    }

    [Fact]
    public async Task A_redirect_is_not_followed_with_the_token()
    {
        var server = Server(Says(HttpStatusCode.Found, "", location: "https://elsewhere.example/api/runs"));
        Assert.Equal(ExitCodes.NotDone, await call.RunAsync(["send", call.File("A.csv")]));
        Assert.Single(server.Requests);
        Assert.Contains("https://elsewhere.example/api/runs", Assert.Single(call.Output), StringComparison.Ordinal);
        using var client = Surroundings.Client();
        Assert.Equal(HttpStatusCode.Found, await RedirectedAsync(client));
    }

    [Fact]
    public async Task A_call_that_is_broken_off_says_how_far_it_came()
    {
        using var stop = new CancellationTokenSource();
        var server = new ScriptedServer(Result("accepted")) { Before = count => { if (count == 2) stop.Cancel(); } };
        call.Connect = () => new HttpClient(server, disposeHandler: false);
        Assert.Equal(ExitCodes.NotDone, await call.RunAsync(["send", call.File("A.csv"), call.File("B.csv"), call.File("C.csv")], stop.Token));
        Assert.Equal("3 files: 1 pass, 2 not sent.", call.Output[^1]);
        Assert.Equal("Stopped.", call.Errors[0]);
        Assert.StartsWith("Not sent: B.csv and all after it.", call.Errors[1], StringComparison.Ordinal);
    }

    [Theory]
    [InlineData("http://lab.example", "unencrypted")]
    [InlineData("http://192.0.2.1:5080", "unencrypted")]
    [InlineData("lab.example:5080", "is no address of a server")]
    [InlineData("ftp://127.0.0.1", "is no address of a server")]
    public async Task An_address_that_the_token_must_not_go_to_is_refused(string address, string why)
    {
        Assert.Equal(ExitCodes.NotDone, await call.RunAsync(["send", "--server", address, call.File("A.csv")]));
        Assert.Contains(why, Assert.Single(call.Errors), StringComparison.Ordinal);
    }

    [Theory]
    [InlineData("http://localhost:5080", "http://localhost:5080/api/runs")]
    [InlineData("http://[::1]:5080/", "http://[::1]:5080/api/runs")]
    [InlineData("https://lab.example/ledger", "https://lab.example/ledger/api/runs")]
    [InlineData("http://lab.example", "http://lab.example/api/runs", "--allow-plain-http")]
    public async Task Other_addresses_serve_with_the_path_that_a_proxy_gave_them(string address, string asked, params string[] more)
    {
        var server = Server(Result("accepted"));
        call.Variables["RESPONSELEDGER_SERVER"] = address;
        Assert.Equal(ExitCodes.InOrder, await call.RunAsync(["send", .. more, call.File("A.csv")]));
        Assert.Equal(asked, Assert.Single(server.Requests).Address);
    }

    [Fact]
    public async Task Without_a_sound_token_nothing_is_sent()
    {
        var file = call.File("A.csv");
        foreach (var (token, why) in new[] { ("", "No token"), ("two words", "more than a token") })
        {
            call.Variables["RESPONSELEDGER_TOKEN"] = token;
            Assert.Equal(ExitCodes.NotDone, await call.RunAsync(["send", file]));
            Assert.Contains(why, Assert.Single(call.Errors), StringComparison.Ordinal);
        }

        Assert.Equal(ExitCodes.NotDone, await call.RunAsync(["send", "--token-file", Path.Combine(call.Folder, "none"), file]));
        Assert.StartsWith("The token cannot be read.", Assert.Single(call.Errors), StringComparison.Ordinal);
    }

    [Fact]
    public async Task One_serial_number_for_several_files_is_taken_for_a_mistake()
    {
        Assert.Equal(ExitCodes.NotDone, await call.RunAsync(["send", "--serial", "SN1", call.File("A.csv"), call.File("B.csv")]));
        Assert.Contains("--serial names one unit", Assert.Single(call.Errors), StringComparison.Ordinal);
    }

    private static async Task<HttpStatusCode> RedirectedAsync(HttpClient client)
    {
        using var listener = new TcpListener(IPAddress.Loopback, 0);
        listener.Start();
        var answering = Task.Run(async () =>
        {
            using var socket = await listener.AcceptTcpClientAsync();
            await using var stream = socket.GetStream();
            await stream.ReadAtLeastAsync(new byte[64], 16);
            await stream.WriteAsync("HTTP/1.1 302 Found\r\nLocation: http://127.0.0.1:1/\r\nContent-Length: 0\r\nConnection: close\r\n\r\n"u8.ToArray());
        });
        using var response = await client.GetAsync(new Uri($"http://127.0.0.1:{((IPEndPoint)listener.LocalEndpoint).Port}/"));
        await answering;
        return response.StatusCode;
    }

    private ScriptedServer Server(params Func<HttpResponseMessage>[] answers)
    {
        var server = new ScriptedServer(answers);
        call.Connect = () => new HttpClient(server, disposeHandler: false);
        return server;
    }
}

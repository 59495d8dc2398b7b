using System.Net;
using System.Net.Http.Json;
using System.Text.Json;
using ResponseLedger.Server.Tests.Runs;

namespace ResponseLedger.Server.Tests.MainJob;

/// <summary>The people and the bench of a lab, each as a client over HTTP; the manager comes from the settings and makes the others.</summary>
internal sealed class LabPeople : IDisposable
{
    public const string BenchName = "Bay 3";

    private LabPeople(HttpClient manager, HttpClient @operator, HttpClient engineer, HttpClient quality, HttpClient bench)
        => (Manager, Operator, Engineer, Quality, Bench) = (manager, @operator, engineer, quality, bench);

    public HttpClient Manager { get; }
    public HttpClient Operator { get; }
    public HttpClient Engineer { get; }
    public HttpClient Quality { get; }

    /// <summary>The bench, by its bearer token and nothing else.</summary>
    public HttpClient Bench { get; }

    public static async Task<LabPeople> ComeInAsync(RunningServer server)
    {
        var manager = await SignInAsync(server, Lab.ManagerEmail, Lab.Password);
        await manager.MadeAsync("/api/benches", new { name = BenchName });
        var token = await manager.MadeAsync("/api/tokens", new { name = "Bay 3's computer", scopes = new[] { "runs" }, bench = BenchName });
        var bench = server.Client(withHeader: false);
        bench.DefaultRequestHeaders.Authorization = new("Bearer", token.GetProperty("token").GetString());
        return new LabPeople(
            manager, await HireAsync(server, manager, "operator"), await HireAsync(server, manager, "engineer"), await HireAsync(server, manager, "quality"), bench);
    }

    /// <summary>The password of a person who was made with this role.</summary>
    public static string PasswordOf(string role) => $"{role}: nine herons wade upstream";

    /// <summary>Sends files from the bench for a lot, and gives one result a file.</summary>
    public async Task<List<JsonElement>> SendAsync(HttpStatusCode expected, string lot, string condition, params (string Name, byte[] Content)[] files)
    {
        using var response = await RunScene.SendAsync(Bench, [("device", "LPF-1/A"), ("lot", lot), ("condition", condition)], files);
        return [.. (await response.ShouldBeAsync(expected)).GetProperty("results").EnumerateArray()];
    }

    public void Dispose()
    {
        foreach (var client in (HttpClient[])[Manager, Operator, Engineer, Quality, Bench])
            client.Dispose();
    }

    private static async Task<HttpClient> HireAsync(RunningServer server, HttpClient manager, string role)
    {
        await manager.MadeAsync("/api/people", new { email = $"{role}@example.test", name = $"The {role}", password = PasswordOf(role), roles = new[] { role } });
        var client = await SignInAsync(server, $"{role}@example.test", PasswordOf(role));
        var session = await (await client.GetAsync("/api/session")).ShouldBeAsync(HttpStatusCode.OK);
        Assert.Equal([role], session.GetProperty("roles").EnumerateArray().Select(r => r.GetString()!));
        return client;
    }

    private static async Task<HttpClient> SignInAsync(RunningServer server, string email, string password)
    {
        var client = server.Client();
        await (await client.PostAsJsonAsync("/api/session", new { email, password })).ShouldBeAsync(HttpStatusCode.NoContent);
        return client;
    }
}

/// <summary>Requests of which the main job has many.</summary>
internal static class Requests
{
    public static async Task<JsonElement> MadeAsync(this HttpClient client, string path, object body)
        => await (await client.PostAsJsonAsync(path, body)).ShouldBeAsync(HttpStatusCode.Created);

    public static async Task<JsonElement> SeeAsync(this HttpClient client, string path)
        => await (await client.GetAsync(path)).ShouldBeAsync(HttpStatusCode.OK);

    public static string Text(this JsonElement element, string member) => element.GetProperty(member).GetString()!;

    public static List<double> Numbers(this JsonElement element, string member) => [.. element.GetProperty(member).EnumerateArray().Select(v => v.GetDouble())];
}

using System.Net;
using System.Net.Http.Json;

namespace ResponseLedger.Server.Tests.People;

public sealed class RateLimitTests
{
    [Fact]
    public async Task Sign_ins_from_one_address_are_limited_and_health_is_not()
    {
        await using var lab = await Lab.StartAsync(new Dictionary<string, string?> { ["RateLimits:SignInsPerMinuteByAddress"] = "3" });
        using var client = lab.Anonymous();
        for (var attempt = 0; attempt < 3; attempt++)
            await (await SignInAsync(client, $"nobody{attempt}@example.test")).ShouldRefuseAsync(HttpStatusCode.Unauthorized);

        using var refused = await SignInAsync(client, "nobody@example.test");

        await refused.ShouldRefuseAsync(HttpStatusCode.TooManyRequests, "tooMany");
        Assert.InRange(refused.Headers.RetryAfter!.Delta!.Value, TimeSpan.FromSeconds(1), TimeSpan.FromSeconds(60));
        for (var probe = 0; probe < 10; probe++)
            await (await client.GetAsync("/health/ready")).ShouldBeAsync(HttpStatusCode.OK);
    }

    [Fact]
    public async Task Sign_ins_to_one_account_are_limited_whether_or_not_it_exists()
    {
        await using var lab = await Lab.StartAsync(new Dictionary<string, string?> { ["RateLimits:SignInsPerMinuteByAccount"] = "2" });
        using var client = lab.Anonymous();
        await (await SignInAsync(client, "nobody@example.test")).ShouldRefuseAsync(HttpStatusCode.Unauthorized);
        await (await SignInAsync(client, "NOBODY@example.test")).ShouldRefuseAsync(HttpStatusCode.Unauthorized);

        using var refused = await SignInAsync(client, "nobody@example.test");

        await refused.ShouldRefuseAsync(HttpStatusCode.TooManyRequests, "tooMany");
        Assert.NotNull(refused.Headers.RetryAfter);
        await (await SignInAsync(client, "somebody@example.test")).ShouldRefuseAsync(HttpStatusCode.Unauthorized);
    }

    [Fact]
    public async Task Strangers_are_limited_and_people_at_work_are_not()
    {
        await using var lab = await Lab.StartAsync(new Dictionary<string, string?> { ["RateLimits:AnonymousPerMinuteByAddress"] = "4" });
        var manager = await lab.SignInAsync("manager");
        using var stranger = lab.Anonymous();
        var statuses = new List<HttpStatusCode>();
        for (var request = 0; request < 6; request++)
            statuses.Add((await stranger.GetAsync("/api/about")).StatusCode);

        Assert.Equal([200, 200, 200, 200, 429, 429], statuses.Select(s => (int)s));
        for (var request = 0; request < 10; request++)
            await (await manager.GetAsync("/api/session")).ShouldBeAsync(HttpStatusCode.OK);
    }

    private static Task<HttpResponseMessage> SignInAsync(HttpClient client, string email)
        => client.PostAsJsonAsync("/api/session", new { email, password = "whatever it may be" });
}

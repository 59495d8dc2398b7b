using System.Net;
using System.Net.Http.Json;
using System.Text.RegularExpressions;
using Microsoft.Extensions.Time.Testing;

namespace ResponseLedger.Server.Tests.People;

public sealed class TokenTests(Lab lab)
{
    [Fact]
    public async Task A_token_is_told_once_and_lists_only_its_prefix()
    {
        var manager = await lab.SignInAsync("manager");
        var name = Lab.Unique("bench-token");

        var made = await (await manager.PostAsJsonAsync("/api/tokens", new { name, scopes = new[] { "runs:write", "runs:read" } })).ShouldBeAsync(HttpStatusCode.Created);

        var token = made.GetProperty("token").GetString()!;
        Assert.Matches(new Regex("^rl1_[A-Za-z0-9_-]{22}_[A-Za-z0-9_-]{43}$"), token);
        Assert.Equal(["read", "runs"], made.GetProperty("scopes").EnumerateArray().Select(s => s.GetString()));
        Assert.InRange(made.GetProperty("expiresAt").GetDateTimeOffset() - TimeProvider.System.GetUtcNow(), TimeSpan.FromDays(364.9), TimeSpan.FromDays(365));
        using var list = await manager.GetAsync("/api/tokens?limit=500");
        var text = await list.Content.ReadAsStringAsync();
        Assert.DoesNotContain(token[^43..], text, StringComparison.Ordinal);
        Assert.Equal(token[..26], (await list.ShouldBeAsync(HttpStatusCode.OK)).Item("name", name).GetProperty("prefix").GetString());
    }

    [Fact]
    public async Task A_revoked_token_is_refused_at_once()
    {
        var manager = await lab.SignInAsync("manager");
        var made = await (await manager.PostAsJsonAsync("/api/tokens", new { name = Lab.Unique("short"), scopes = new[] { "read" } })).ShouldBeAsync(HttpStatusCode.Created);
        using var bench = Bench(lab, made.GetProperty("token").GetString()!);
        await (await bench.GetAsync("/api/ledger/entries")).ShouldBeAsync(HttpStatusCode.OK);

        await (await manager.DeleteAsync($"/api/tokens/{made.GetProperty("id").GetString()}")).ShouldBeAsync(HttpStatusCode.NoContent);

        await (await bench.GetAsync("/api/ledger/entries")).ShouldRefuseAsync(HttpStatusCode.Unauthorized);
        await (await manager.DeleteAsync($"/api/tokens/{made.GetProperty("id").GetString()}")).ShouldBeAsync(HttpStatusCode.NoContent);
    }

    [Fact]
    public async Task A_token_ends_when_its_days_are_over()
    {
        var clock = new FakeTimeProvider(TimeProvider.System.GetUtcNow());
        await using var own = await Lab.StartAsync(clock: clock);
        var manager = await own.SignInAsync("manager");
        var made = await (await manager.PostAsJsonAsync("/api/tokens", new { name = "a day", scopes = new[] { "read" }, expiresInDays = 1 })).ShouldBeAsync(HttpStatusCode.Created);
        using var bench = Bench(own, made.GetProperty("token").GetString()!);

        clock.Advance(TimeSpan.FromHours(23));
        await (await bench.GetAsync("/api/ledger/entries")).ShouldBeAsync(HttpStatusCode.OK);
        clock.Advance(TimeSpan.FromHours(1));
        await (await bench.GetAsync("/api/ledger/entries")).ShouldRefuseAsync(HttpStatusCode.Unauthorized);
    }

    [Fact]
    public async Task Any_letter_of_the_secret_changed_is_no_token()
    {
        var manager = await lab.SignInAsync("manager");
        var made = await (await manager.PostAsJsonAsync("/api/tokens", new { name = Lab.Unique("changed"), scopes = new[] { "read" } })).ShouldBeAsync(HttpStatusCode.Created);
        var token = made.GetProperty("token").GetString()!;

        // The last letter carries four bits, and its two spare ones are refused where they are set.
        for (var at = 0; at < token.Length; at += 3)
        {
            using var bench = Bench(lab, token[..at] + (token[at] == 'B' ? 'C' : 'B') + token[(at + 1)..]);
            await (await bench.GetAsync("/api/ledger/entries")).ShouldRefuseAsync(HttpStatusCode.Unauthorized);
        }
    }

    [Fact]
    public async Task What_a_token_cannot_be_is_named()
    {
        var manager = await lab.SignInAsync("manager");

        var scopes = await (await manager.PostAsJsonAsync("/api/tokens", new { name = "x", scopes = new[] { "everything" } })).ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity);
        Assert.Contains("runs", scopes.GetProperty("errors").GetProperty("scopes")[0].GetString(), StringComparison.Ordinal);
        await (await manager.PostAsJsonAsync("/api/tokens", new { name = "x", scopes = Array.Empty<string>() })).ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity);
        await (await manager.PostAsJsonAsync("/api/tokens", new { name = "x", scopes = new[] { "runs" }, expiresInDays = 731 })).ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity);
        var bench = await (await manager.PostAsJsonAsync("/api/tokens", new { name = "x", scopes = new[] { "runs" }, bench = "no such bench" })).ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity);
        Assert.True(bench.GetProperty("errors").TryGetProperty("bench", out _));
    }

    private static HttpClient Bench(Lab lab, string token)
    {
        var client = lab.Server.Client(withHeader: false);
        client.DefaultRequestHeaders.TryAddWithoutValidation("Authorization", $"Bearer {token}");
        return client;
    }
}

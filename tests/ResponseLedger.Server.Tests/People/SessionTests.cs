using System.Net;
using System.Net.Http.Json;
using Microsoft.Extensions.Time.Testing;

namespace ResponseLedger.Server.Tests.People;

public sealed class SessionTests(Lab lab)
{
    [Fact]
    public async Task The_manager_of_the_settings_signs_in_and_is_told_what_it_holds()
    {
        var manager = await lab.SignInAsync("manager");

        var session = await (await manager.GetAsync("/api/session")).ShouldBeAsync(HttpStatusCode.OK);

        Assert.Equal(Lab.ManagerEmail, session.GetProperty("email").GetString());
        Assert.Equal(["engineer", "manager", "operator", "quality"], session.GetProperty("roles").EnumerateArray().Select(r => r.GetString()));
        Assert.False(session.GetProperty("mustChangePassword").GetBoolean());
    }

    [Fact]
    public async Task The_e_mail_is_read_without_regard_to_case()
    {
        var (email, first) = await lab.NewPersonAsync("auditor");
        first.Dispose();
        using var client = lab.Anonymous();

        await (await client.PostAsJsonAsync("/api/session", new { email = email.ToUpperInvariant(), password = Lab.Password })).ShouldBeAsync(HttpStatusCode.NoContent);
    }

    [Fact]
    public async Task A_copy_of_the_cookie_is_worth_nothing_after_signing_out()
    {
        var (email, client) = await lab.NewPersonAsync("operator");
        using var signIn = await client.PostAsJsonAsync("/api/session", new { email, password = Lab.Password });
        var copy = signIn.Headers.GetValues("Set-Cookie").Single().Split(';')[0];

        await (await client.DeleteAsync("/api/session")).ShouldBeAsync(HttpStatusCode.NoContent);

        await (await client.GetAsync("/api/session")).ShouldRefuseAsync(HttpStatusCode.Unauthorized, "signInNeeded");
        using var thief = new HttpClient(new HttpClientHandler { UseCookies = false }) { BaseAddress = lab.Server.Address };
        thief.DefaultRequestHeaders.Add("Cookie", copy);
        await (await thief.GetAsync("/api/session")).ShouldRefuseAsync(HttpStatusCode.Unauthorized);
        client.Dispose();
    }

    [Fact]
    public async Task A_session_ends_after_eight_hours_however_busy_it_was()
    {
        var clock = new FakeTimeProvider(TimeProvider.System.GetUtcNow());
        await using var own = await Lab.StartAsync(clock: clock);
        var manager = await own.SignInAsync("manager");

        for (var hour = 0; hour < 7; hour++)
        {
            clock.Advance(TimeSpan.FromHours(1));
            await (await manager.GetAsync("/api/session")).ShouldBeAsync(HttpStatusCode.OK);
        }

        clock.Advance(TimeSpan.FromMinutes(61));
        await (await manager.GetAsync("/api/session")).ShouldRefuseAsync(HttpStatusCode.Unauthorized);
    }

    [Fact]
    public async Task Changing_ones_password_keeps_this_session_and_ends_the_others_within_a_minute()
    {
        var clock = new FakeTimeProvider(TimeProvider.System.GetUtcNow());
        await using var own = await Lab.StartAsync(clock: clock);
        var (email, here) = await own.NewPersonAsync("engineer");
        using var elsewhere = own.Anonymous();
        await (await elsewhere.PostAsJsonAsync("/api/session", new { email, password = Lab.Password })).ShouldBeAsync(HttpStatusCode.NoContent);
        const string Next = "nine herons mend the traces";

        await (await here.PostAsJsonAsync("/api/session/password", new { current = "not the password", @new = Next })).ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity);
        await (await here.PostAsJsonAsync("/api/session/password", new { current = Lab.Password, @new = "too short" })).ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity);
        await (await here.PostAsJsonAsync("/api/session/password", new { current = Lab.Password, @new = Next })).ShouldBeAsync(HttpStatusCode.NoContent);

        clock.Advance(TimeSpan.FromSeconds(61));
        await (await here.GetAsync("/api/session")).ShouldBeAsync(HttpStatusCode.OK);
        await (await elsewhere.GetAsync("/api/session")).ShouldRefuseAsync(HttpStatusCode.Unauthorized);
        await (await elsewhere.PostAsJsonAsync("/api/session", new { email, password = Lab.Password })).ShouldRefuseAsync(HttpStatusCode.Unauthorized);
        await (await elsewhere.PostAsJsonAsync("/api/session", new { email, password = Next })).ShouldBeAsync(HttpStatusCode.NoContent);
        here.Dispose();
    }

    [Fact]
    public async Task A_bearer_that_is_no_token_is_not_helped_by_a_cookie()
    {
        var (_, client) = await lab.NewPersonAsync("manager");
        client.DefaultRequestHeaders.Authorization = new("Bearer", "rl1_nothing");

        await (await client.GetAsync("/api/session")).ShouldRefuseAsync(HttpStatusCode.Unauthorized);
        client.Dispose();
    }
}

using System.Diagnostics;
using System.Net;
using System.Net.Http.Json;
using System.Security.Claims;
using Microsoft.Extensions.DependencyInjection;
using Microsoft.Extensions.Time.Testing;
using ResponseLedger.Server.Http;
using ResponseLedger.Server.People;

namespace ResponseLedger.Server.Tests.People;

public sealed class LockoutTests(Lab lab)
{
    private const string Wrong = "certainly not the password";

    [Fact]
    public async Task Five_wrong_passwords_lock_the_account_for_five_minutes()
    {
        var clock = new FakeTimeProvider(TimeProvider.System.GetUtcNow());
        await using var own = await Lab.StartAsync(clock: clock);
        var (email, signedIn) = await own.NewPersonAsync("operator");
        using var client = own.Anonymous();

        for (var attempt = 0; attempt < 5; attempt++)
            await (await SignInAsync(client, email, Wrong)).ShouldRefuseAsync(HttpStatusCode.Unauthorized, "signInRefused");

        await (await SignInAsync(client, email, Lab.Password)).ShouldRefuseAsync(HttpStatusCode.Unauthorized, "signInRefused");
        clock.Advance(TimeSpan.FromMinutes(5) + TimeSpan.FromSeconds(1));
        await (await SignInAsync(client, email, Lab.Password)).ShouldBeAsync(HttpStatusCode.NoContent);
        signedIn.Dispose();
    }

    [Fact]
    public async Task Guesses_sent_all_at_once_are_counted_like_guesses_in_turn()
    {
        var (email, signedIn) = await lab.NewPersonAsync("operator");
        using var client = lab.Anonymous();
        var guesses = Enumerable.Range(0, 12).Select(i => SignInAsync(client, email, i == 11 ? Lab.Password : $"{Wrong} {i}")).ToArray();
        await Task.WhenAll(guesses);

        await (await SignInAsync(client, email, Lab.Password)).ShouldRefuseAsync(HttpStatusCode.Unauthorized);
        signedIn.Dispose();
    }

    [Fact]
    public async Task Many_sign_ins_of_one_person_at_once_all_succeed()
    {
        var (email, signedIn) = await lab.NewPersonAsync("operator");

        await Task.WhenAll(Enumerable.Range(0, 8).Select(async _ =>
        {
            using var client = lab.Anonymous();
            await (await SignInAsync(client, email, Lab.Password)).ShouldBeAsync(HttpStatusCode.NoContent);
        }));
        signedIn.Dispose();
    }

    [Fact]
    public async Task An_unknown_e_mail_gets_the_same_answer_as_a_wrong_password_after_a_like_time()
    {
        var (email, signedIn) = await lab.NewPersonAsync("operator");
        using var client = lab.Anonymous();
        var known = await (await SignInAsync(client, email, Wrong)).ShouldRefuseAsync(HttpStatusCode.Unauthorized);
        var unknown = await (await SignInAsync(client, "nobody@example.test", Wrong)).ShouldRefuseAsync(HttpStatusCode.Unauthorized);
        Assert.Equal(known.GetProperty("detail").GetString(), unknown.GetProperty("detail").GetString());
        Assert.Equal(known.GetProperty("code").GetString(), unknown.GetProperty("code").GetString());

        // Without the hashing an answer takes a few milliseconds, with it some tenths of a second: a third tells them apart on a busy machine.
        var wrongTime = await MedianAsync(() => SignInAsync(client, email, Wrong));
        var unknownTime = await MedianAsync(() => SignInAsync(client, "nobody@example.test", Wrong));
        Assert.True(unknownTime > wrongTime / 3, $"unknown e-mail {unknownTime.TotalMilliseconds:0} ms, wrong password {wrongTime.TotalMilliseconds:0} ms");
        signedIn.Dispose();
    }

    [Fact]
    public async Task A_wrong_password_at_signing_is_refused_by_field_and_counted_against_the_account()
    {
        var (email, signedIn) = await lab.NewPersonAsync("quality");
        var asked = lab.Services.GetRequiredService<PasswordAsked>();
        var people = await (await (await lab.SignInAsync("manager")).GetAsync("/api/people?limit=500")).ShouldBeAsync(HttpStatusCode.OK);
        var id = people.Item("email", email).GetProperty("id").GetString()!;
        var principal = new ClaimsPrincipal(new ClaimsIdentity([new Claim(ClaimTypes.NameIdentifier, id), new Claim(ClaimTypes.Name, "signer")], "test"));
        await asked.CheckAsync(principal, Lab.Password);

        for (var attempt = 0; attempt < 5; attempt++)
        {
            var refused = await Assert.ThrowsAsync<RefusedException>(() => asked.CheckAsync(principal, Wrong));
            Assert.Equal(422, refused.Refusal.Status);
            Assert.Contains("password", refused.Refusal.Errors.Keys);
        }

        var locked = await Assert.ThrowsAsync<RefusedException>(() => asked.CheckAsync(principal, Lab.Password));
        Assert.Contains("locked", locked.Refusal.Sentence, StringComparison.Ordinal);
        using var client = lab.Anonymous();
        await (await SignInAsync(client, email, Lab.Password)).ShouldRefuseAsync(HttpStatusCode.Unauthorized);
        signedIn.Dispose();
    }

    private static Task<HttpResponseMessage> SignInAsync(HttpClient client, string email, string password)
        => client.PostAsJsonAsync("/api/session", new { email, password });

    private static async Task<TimeSpan> MedianAsync(Func<Task<HttpResponseMessage>> attempt)
    {
        var times = new List<TimeSpan>();
        for (var i = 0; i < 3; i++)
        {
            var since = Stopwatch.GetTimestamp();
            (await attempt()).Dispose();
            times.Add(Stopwatch.GetElapsedTime(since));
        }

        return times.Order().ElementAt(1);
    }
}

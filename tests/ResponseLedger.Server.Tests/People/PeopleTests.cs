using System.Net;
using System.Net.Http.Json;
using Microsoft.EntityFrameworkCore;
using ResponseLedger.Server.Tests.Reevaluation;

namespace ResponseLedger.Server.Tests.People;

public sealed class PeopleTests(Lab lab)
{
    [Fact]
    public async Task Without_a_password_a_one_time_password_is_told_once_and_must_be_changed()
    {
        var manager = await lab.SignInAsync("manager");
        var email = $"{Lab.Unique("once")}@example.test";
        using var created = await manager.PostAsJsonAsync("/api/people", new { email, name = "Once", roles = new[] { "engineer" } });
        var person = await created.ShouldBeAsync(HttpStatusCode.Created);
        var oneTime = person.GetProperty("oneTimePassword").GetString();
        Assert.Equal($"/api/people/{person.GetProperty("id").GetString()}", created.Headers.Location!.ToString());
        var listed = (await (await manager.GetAsync("/api/people?limit=500")).ShouldBeAsync(HttpStatusCode.OK)).Item("email", email);
        Assert.Null(listed.GetProperty("oneTimePassword").GetString());

        using var client = lab.Anonymous();
        await (await client.PostAsJsonAsync("/api/session", new { email, password = oneTime })).ShouldBeAsync(HttpStatusCode.NoContent);
        Assert.True((await (await client.GetAsync("/api/session")).ShouldBeAsync(HttpStatusCode.OK)).GetProperty("mustChangePassword").GetBoolean());
        await (await client.GetAsync("/api/ledger/entries")).ShouldRefuseAsync(HttpStatusCode.Forbidden, "passwordChangeDue");
        await (await client.PostAsJsonAsync("/api/session/password", new { current = oneTime, @new = Lab.Password })).ShouldBeAsync(HttpStatusCode.NoContent);
        await (await client.GetAsync("/api/ledger/entries")).ShouldBeAsync(HttpStatusCode.OK);
    }

    [Fact]
    public async Task An_e_mail_is_taken_once_in_whatever_case_and_however_many_ask_together()
    {
        var manager = await lab.SignInAsync("manager");
        var email = $"{Lab.Unique("twin")}@example.test";
        var all = await Task.WhenAll(Enumerable.Range(0, 6).Select(i => manager.PostAsJsonAsync(
            "/api/people", new { email = i % 2 == 0 ? email : email.ToUpperInvariant(), name = "Twin", password = Lab.Password })));

        Assert.Single(all, response => response.StatusCode == HttpStatusCode.Created);
        foreach (var other in all.Where(response => response.StatusCode != HttpStatusCode.Created))
            await other.ShouldRefuseAsync(HttpStatusCode.Conflict, "emailTaken");
    }

    [Fact]
    public async Task Every_problem_of_a_request_is_named_by_its_field()
    {
        var manager = await lab.SignInAsync("manager");

        var problem = await (await manager.PostAsJsonAsync("/api/people", new { email = "no address", roles = new[] { "king" } })).ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity);

        Assert.Equal(["email", "name", "roles"], problem.GetProperty("errors").EnumerateObject().Select(e => e.Name).Order());
        var weak = await (await manager.PostAsJsonAsync("/api/people", new { email = "weak@example.test", name = "Weak", password = "passwordpassword" })).ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity);
        Assert.True(weak.GetProperty("errors").TryGetProperty("password", out _));
    }

    [Fact]
    public async Task The_last_manager_cannot_be_removed_even_by_two_at_once()
    {
        await using var own = await Lab.StartAsync();
        var first = await own.SignInAsync("manager");
        var (email, second) = await own.NewPersonAsync("manager");
        var people = await (await first.GetAsync("/api/people")).ShouldBeAsync(HttpStatusCode.OK);
        var firstAddress = $"/api/people/{people.Item("email", Lab.ManagerEmail).GetProperty("id").GetString()}";
        var secondAddress = $"/api/people/{people.Item("email", email).GetProperty("id").GetString()}";

        var both = await Task.WhenAll(
            first.PatchAsJsonAsync(secondAddress, new { roles = new[] { "auditor" } }),
            second.PatchAsJsonAsync(firstAddress, new { disabled = true }));

        Assert.Single(both, response => response.StatusCode == HttpStatusCode.OK);

        // The other is refused by the law or, if the first change ended the session before it got in, by that.
        var other = both.Single(response => response.StatusCode != HttpStatusCode.OK);
        if (other.StatusCode != HttpStatusCode.Unauthorized)
            await other.ShouldRefuseAsync(HttpStatusCode.Conflict, "lastManager");
        second.Dispose();
    }

    [Fact]
    public async Task Somebody_disabled_cannot_sign_in_until_enabled_again()
    {
        var manager = await lab.SignInAsync("manager");
        var (email, signedIn) = await lab.NewPersonAsync("operator");
        var id = (await (await manager.GetAsync("/api/people?limit=500")).ShouldBeAsync(HttpStatusCode.OK)).Item("email", email).GetProperty("id").GetString();
        using var client = lab.Anonymous();

        var disabled = await (await manager.PatchAsJsonAsync($"/api/people/{id}", new { disabled = true })).ShouldBeAsync(HttpStatusCode.OK);
        Assert.True(disabled.GetProperty("disabled").GetBoolean());
        await (await client.PostAsJsonAsync("/api/session", new { email, password = Lab.Password })).ShouldRefuseAsync(HttpStatusCode.Unauthorized);
        for (var attempt = 0; attempt < 6; attempt++)
            await client.PostAsJsonAsync("/api/session", new { email, password = "a wrong password, again" });
        Assert.True((await (await manager.GetAsync("/api/people?limit=500")).ShouldBeAsync(HttpStatusCode.OK)).Item("email", email).GetProperty("disabled").GetBoolean());
        await (await manager.PatchAsJsonAsync($"/api/people/{id}", new { disabled = false })).ShouldBeAsync(HttpStatusCode.OK);
        await (await client.PostAsJsonAsync("/api/session", new { email, password = Lab.Password })).ShouldBeAsync(HttpStatusCode.NoContent);
        signedIn.Dispose();
    }

    [Fact]
    public async Task A_change_that_changes_nothing_leaves_no_entry_and_no_session_ends()
    {
        var manager = await lab.SignInAsync("manager");
        var (email, client) = await lab.NewPersonAsync("operator");
        var person = (await (await manager.GetAsync("/api/people?limit=500")).ShouldBeAsync(HttpStatusCode.OK)).Item("email", email);
        var id = person.GetProperty("id").GetString()!;

        foreach (var change in new[] { "{}", """{"name":null}""", """{"roles":["operator"],"disabled":false,"resetPassword":false}""", $$"""{"name":" {{person.GetProperty("name").GetString()}} "}""" })
        {
            var answer = await (await manager.PatchAsync($"/api/people/{id}", new StringContent(change, System.Text.Encoding.UTF8, "application/json"))).ShouldBeAsync(HttpStatusCode.OK);
            Assert.Equal(person.ToString(), answer.ToString());
        }

        Assert.Equal(0, await ChangesAsync(id));
        await (await manager.PatchAsJsonAsync($"/api/people/{id}", new { name = "Another" })).ShouldBeAsync(HttpStatusCode.OK);
        Assert.Equal(1, await ChangesAsync(id));
        await (await client.GetAsync("/api/session")).ShouldBeAsync(HttpStatusCode.OK);
        await (await manager.PatchAsJsonAsync("/api/people/0199aaaa-0000-7000-8000-000000000001", new { })).ShouldRefuseAsync(HttpStatusCode.NotFound);
        client.Dispose();
    }

    [Fact]
    public async Task An_auditor_sees_people_and_tokens_without_any_secret_and_changes_none()
    {
        var manager = await lab.SignInAsync("manager");
        var auditor = await lab.SignInAsync("auditor");
        var made = await (await manager.PostAsJsonAsync("/api/tokens", new { name = Lab.Unique("token"), scopes = new[] { "read" } })).ShouldBeAsync(HttpStatusCode.Created);
        var person = await (await manager.PostAsJsonAsync("/api/people", new { email = $"{Lab.Unique("seen")}@example.test", name = "Seen" })).ShouldBeAsync(HttpStatusCode.Created);

        var people = await (await auditor.GetAsync("/api/people?limit=500")).ShouldBeAsync(HttpStatusCode.OK);
        var tokens = await (await auditor.GetAsync("/api/tokens?limit=500")).ShouldBeAsync(HttpStatusCode.OK);

        Assert.Equal("Seen", people.Item("id", person.GetProperty("id").GetString()!).GetProperty("name").GetString());
        Assert.DoesNotContain(person.GetProperty("oneTimePassword").GetString()!, people.ToString(), StringComparison.Ordinal);
        Assert.Equal(made.GetProperty("name").GetString(), tokens.Item("id", made.GetProperty("id").GetString()!).GetProperty("name").GetString());
        Assert.DoesNotContain(made.GetProperty("token").GetString()!, tokens.ToString(), StringComparison.Ordinal);
        await (await auditor.DeleteAsync($"/api/tokens/{made.GetProperty("id").GetString()}")).ShouldRefuseAsync(HttpStatusCode.Forbidden, "notAllowed");
    }

    [Fact]
    public async Task Somebody_without_a_role_sees_the_own_session_and_nothing_else()
    {
        var (_, client) = await lab.NewPersonAsync();

        await (await client.GetAsync("/api/session")).ShouldBeAsync(HttpStatusCode.OK);
        foreach (var address in new[] { "/api/devices", "/api/lots", "/api/runs", "/api/benches", "/api/ledger/entries", "/api/measures", "/api/reevaluation" })
            await (await client.GetAsync(address)).ShouldRefuseAsync(HttpStatusCode.Forbidden, "notAllowed");
        await (await client.DeleteAsync("/api/session")).ShouldBeAsync(HttpStatusCode.NoContent);
        client.Dispose();
    }

    private async Task<int> ChangesAsync(string personId)
    {
        await using var db = lab.Look();
        return (await db.LedgerEntries.Where(e => e.Kind == "person.changed").Select(e => e.Bytes).ToListAsync())
            .Count(bytes => System.Text.Encoding.UTF8.GetString(bytes).Contains(personId, StringComparison.Ordinal));
    }

    [Fact]
    public async Task A_list_of_people_comes_in_pages()
    {
        var manager = await lab.SignInAsync("manager");
        await lab.SignInAsync("operator");
        await lab.SignInAsync("auditor");
        var first = await (await manager.GetAsync("/api/people?limit=2")).ShouldBeAsync(HttpStatusCode.OK);
        var second = await (await manager.GetAsync($"/api/people?limit=2&cursor={first.GetProperty("next").GetString()}")).ShouldBeAsync(HttpStatusCode.OK);

        Assert.Equal(2, first.GetProperty("items").GetArrayLength());
        Assert.Empty(first.GetProperty("items").EnumerateArray().Select(i => i.GetProperty("id").GetString())
            .Intersect(second.GetProperty("items").EnumerateArray().Select(i => i.GetProperty("id").GetString())));
        await (await manager.GetAsync("/api/people?cursor=nonsense")).ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity);
        await (await manager.GetAsync("/api/people?limit=501")).ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity);
    }
}

using System.Net;
using System.Net.Http.Json;
using Microsoft.EntityFrameworkCore;
using Microsoft.Extensions.DependencyInjection;
using ResponseLedger.Server.Tests.Lots;
using ResponseLedger.Store;

namespace ResponseLedger.Server.Tests.SignOff;

/// <summary>Who may sign is asked at the moment of signing, and set by others than those who sign.</summary>
public sealed class SignerTests(Lab lab)
{
    [Theory]
    [InlineData("""{"roles":["operator"]}""")]
    [InlineData("""{"roles":[]}""")]
    [InlineData("""{"disabled":true}""")]
    public async Task A_role_taken_away_and_a_disabled_account_sign_nothing_from_then_on(string change)
    {
        var scene = await LotScene.NewAsync(lab, 1);
        await scene.SendAsync("a", 3);
        var decided = await LotScene.NewAsync(lab, 1, ["b"]);
        await (await decided.DecideAsync("reject")).ShouldBeAsync(HttpStatusCode.Created);
        var (email, signer) = await lab.NewPersonAsync("quality");
        await (await signer.GetAsync($"/api/lots/{scene.LotId}")).ShouldBeAsync(HttpStatusCode.OK);

        await ChangeAsync(email, change);

        foreach (var response in new[]
        {
            await scene.DispositionAsync("a", "scrap", signer), await scene.DecideAsync("reject", client: signer), await decided.ReopenAsync(signer),
        })
        {
            Assert.True(response.StatusCode is HttpStatusCode.Unauthorized or HttpStatusCode.Forbidden, $"{response.RequestMessage?.RequestUri} answered {(int)response.StatusCode}");
        }

        Assert.Equal("open", (await scene.LotAsync()).GetProperty("state").GetString());
        Assert.Equal("rejected", (await decided.LotAsync()).GetProperty("state").GetString());
        signer.Dispose();
    }

    [Fact]
    public async Task A_role_that_goes_behind_the_sessions_back_signs_nothing_either()
    {
        var scene = await LotScene.NewAsync(lab, 1);
        await scene.SendAsync("a", 3);
        var decided = await LotScene.NewAsync(lab, 1, ["b"]);
        await (await decided.DecideAsync("reject")).ShouldBeAsync(HttpStatusCode.Created);
        var (email, signer) = await lab.NewPersonAsync("quality");
        await using var scope = lab.Services.CreateAsyncScope();
        var db = scope.ServiceProvider.GetRequiredService<ResponseLedgerContext>();

        // Without a new stamp, as a change that commits while the request is under way: the session still says quality.
        await db.UserRoles.Where(r => db.Users.Any(p => p.Id == r.UserId && p.Email == email)).ExecuteDeleteAsync();

        await (await scene.DispositionAsync("a", "scrap", signer)).ShouldRefuseAsync(HttpStatusCode.Forbidden, "notAllowed");
        await (await scene.DecideAsync("reject", client: signer)).ShouldRefuseAsync(HttpStatusCode.Forbidden, "notAllowed");
        await (await decided.ReopenAsync(signer)).ShouldRefuseAsync(HttpStatusCode.Forbidden, "notAllowed");
        signer.Dispose();
    }

    [Fact]
    public async Task A_manager_who_was_one_cannot_make_themselves_one_again()
    {
        var (email, former) = await lab.NewPersonAsync("manager");
        var id = await ChangeAsync(email, """{"roles":["auditor"]}""");

        await (await former.PatchAsJsonAsync($"/api/people/{id}", new { roles = new[] { "manager" } })).ShouldRefuseAsync(HttpStatusCode.Unauthorized);
        former.Dispose();
    }

    [Theory]
    [InlineData("signingNeedsQuality", false)]
    [InlineData("signingNeedsTwo", false)]
    [InlineData("signingExcludesOwnRuns", true)]
    public async Task The_rules_of_signing_are_set_by_quality_and_not_by_an_engineer(string rule, bool value)
    {
        var scene = await LotScene.NewAsync(lab, 1);
        var address = $"/api/devices/{scene.DeviceId}";
        var change = new Dictionary<string, bool> { [rule] = value };

        await (await scene.Engineer.PatchAsJsonAsync(address, change)).ShouldRefuseAsync(HttpStatusCode.Forbidden, "notAllowed");
        await (await (await lab.SignInAsync("quality")).PatchAsJsonAsync(address, change)).ShouldBeAsync(HttpStatusCode.OK);
        var device = await (await (await lab.SignInAsync("manager")).PatchAsJsonAsync(address, change)).ShouldBeAsync(HttpStatusCode.OK);

        Assert.Equal(value, device.GetProperty(rule).GetBoolean());
        await (await (await lab.SignInAsync("quality")).PatchAsJsonAsync(address, new { title = "Other" })).ShouldRefuseAsync(HttpStatusCode.Forbidden, "notAllowed");
        await (await scene.Engineer.PatchAsJsonAsync(address, new { title = "Other" })).ShouldBeAsync(HttpStatusCode.OK);
    }

    private async Task<string> ChangeAsync(string email, string change)
    {
        var manager = await lab.SignInAsync("manager");
        await using var scope = lab.Services.CreateAsyncScope();
        var id = await scope.ServiceProvider.GetRequiredService<ResponseLedgerContext>().Users.Where(p => p.Email == email).Select(p => p.Id.ToString()).SingleAsync();
        await (await manager.PatchAsync($"/api/people/{id}", new StringContent(change, System.Text.Encoding.UTF8, "application/json"))).ShouldBeAsync(HttpStatusCode.OK);
        return id;
    }
}

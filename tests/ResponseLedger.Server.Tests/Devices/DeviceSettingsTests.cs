using System.Net;
using System.Net.Http.Json;
using System.Text.Json;
using Microsoft.EntityFrameworkCore;
using Microsoft.Extensions.DependencyInjection;
using ResponseLedger.Store;

namespace ResponseLedger.Server.Tests.Devices;

public sealed class DeviceSettingsTests(Lab lab)
{
    [Fact]
    public async Task What_is_left_out_of_a_change_stays_and_an_explicit_null_clears()
    {
        var device = await lab.NewDeviceAsync();
        var manager = await lab.SignInAsync("manager");

        await (await manager.PatchAsJsonAsync($"/api/devices/{device.Id}", new { retestsAllowed = 2, signingNeedsQuality = true })).ShouldBeAsync(HttpStatusCode.OK);
        var second = await (await manager.PatchAsJsonAsync($"/api/devices/{device.Id}", new { title = "New title", inverting = true })).ShouldBeAsync(HttpStatusCode.OK);
        Assert.Equal(2, second.GetProperty("retestsAllowed").GetInt32());
        Assert.True(second.GetProperty("signingNeedsQuality").GetBoolean());
        Assert.True(second.GetProperty("inverting").GetBoolean());
        Assert.Equal("New title", second.GetProperty("title").GetString());

        var third = await (await manager.PatchAsJsonAsync($"/api/devices/{device.Id}", new { retestsAllowed = (int?)null, signingExcludesOwnRuns = true })).ShouldBeAsync(HttpStatusCode.OK);
        Assert.Equal(JsonValueKind.Null, third.GetProperty("retestsAllowed").ValueKind);
        Assert.True(third.GetProperty("signingExcludesOwnRuns").GetBoolean());
        Assert.Equal("New title", third.GetProperty("title").GetString());
    }

    [Fact]
    public async Task Every_change_is_a_row_of_its_own_and_one_that_changes_nothing_is_none()
    {
        var device = await lab.NewDeviceAsync();
        var engineer = await lab.SignInAsync("engineer");

        await (await engineer.PatchAsJsonAsync($"/api/devices/{device.Id}", new { title = "One" })).ShouldBeAsync(HttpStatusCode.OK);
        await (await engineer.PatchAsJsonAsync($"/api/devices/{device.Id}", new { title = "One" })).ShouldBeAsync(HttpStatusCode.OK);
        await (await engineer.PatchAsJsonAsync($"/api/devices/{device.Id}", new { })).ShouldBeAsync(HttpStatusCode.OK);

        Assert.Equal(["Anti-alias board", "One"], await TitlesAsync(device.Id));
    }

    [Theory]
    [InlineData("signingNeedsTwo", """{"signingNeedsTwo":true}""")]
    [InlineData("decisionRule", """{"decisionRule":"guarded"}""")]
    [InlineData("decisionRule", """{"decisionRule":"fourOutcomes"}""")]
    [InlineData("retestsAllowed", """{"retestsAllowed":-1}""")]
    [InlineData("retestsAllowed", """{"retestsAllowed":"many"}""")]
    [InlineData("title", """{"title":"   "}""")]
    public async Task What_this_version_does_not_keep_it_does_not_promise(string field, string body)
    {
        var device = await lab.NewDeviceAsync();
        var manager = await lab.SignInAsync("manager");

        var answer = await manager.PatchAsync($"/api/devices/{device.Id}", new StringContent(body, System.Text.Encoding.UTF8, "application/json"));

        var problem = await answer.ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity);
        Assert.True(problem.GetProperty("errors").TryGetProperty(field, out _), problem.GetRawText());
        Assert.Single(await TitlesAsync(device.Id));
    }

    [Fact]
    public async Task Changes_at_once_are_kept_one_after_the_other_or_told_to_come_again()
    {
        var device = await lab.NewDeviceAsync();
        var engineer = await lab.SignInAsync("engineer");

        var answers = await Task.WhenAll(Enumerable.Range(0, 8).Select(i => engineer.PatchAsJsonAsync($"/api/devices/{device.Id}", new { title = $"Title {i}" })));

        var kept = answers.Count(a => a.StatusCode == HttpStatusCode.OK);
        Assert.InRange(kept, 1, 8);
        foreach (var answer in answers.Where(a => a.StatusCode != HttpStatusCode.OK))
            await answer.ShouldRefuseAsync(HttpStatusCode.Conflict, "changedMeanwhile");
        Assert.Equal(kept + 1, (await TitlesAsync(device.Id)).Count);
    }

    [Fact]
    public async Task Conditions_stand_in_the_order_in_which_they_were_added_and_have_names_of_their_own()
    {
        var device = await lab.NewDeviceAsync();
        var engineer = await lab.SignInAsync("engineer");

        var answers = await Task.WhenAll(Enumerable.Range(0, 5).Select(i => engineer.PostAsJsonAsync($"/api/devices/{device.Id}/conditions", new { name = $" gain {i} " })));
        foreach (var answer in answers)
            await answer.ShouldBeAsync(HttpStatusCode.Created);
        await (await engineer.PostAsJsonAsync($"/api/devices/{device.Id}/conditions", new { name = "gain 3" })).ShouldRefuseAsync(HttpStatusCode.Conflict, "conditionExists");
        await (await engineer.PostAsJsonAsync($"/api/devices/{device.Id}/conditions", new { name = "" })).ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity);

        var page = await (await engineer.GetAsync($"/api/devices/{device.Id}/conditions")).ShouldBeAsync(HttpStatusCode.OK);
        var names = page.GetProperty("items").EnumerateArray().Select(c => c.GetProperty("name").GetString()).ToList();
        Assert.Equal("standard", names[0]);
        Assert.Equal(["gain 0", "gain 1", "gain 2", "gain 3", "gain 4"], names.Skip(1).Order());
    }

    private async Task<List<string>> TitlesAsync(Guid deviceId)
    {
        await using var scope = lab.Services.CreateAsyncScope();
        var db = scope.ServiceProvider.GetRequiredService<ResponseLedgerContext>();
        return await db.DeviceSettings.Where(s => s.DeviceId == deviceId).OrderBy(s => s.Number).Select(s => s.Title).ToListAsync();
    }
}

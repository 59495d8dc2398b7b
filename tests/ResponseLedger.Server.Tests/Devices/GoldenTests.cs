using System.Net;
using System.Net.Http.Json;
using System.Text.Json;
using ResponseLedger.Engine.Masks;
using ResponseLedger.Server.Tests.Masks;
using ResponseLedger.Server.Tests.Reevaluation;
using ResponseLedger.Store.Judging;
using ResponseLedger.Store.Model;

namespace ResponseLedger.Server.Tests.Devices;

public sealed class GoldenTests(Lab lab)
{
    [Fact]
    public async Task Open_lots_follow_the_golden_run()
    {
        var device = await lab.NewDeviceAsync();
        var engineer = await lab.SignInAsync("engineer");
        var lot = await lab.NewLotAsync(device.Id);
        var runs = await lab.AddRunsAsync(device.Id, device.ConditionId, lot, [20, 22]);
        var golden = await lab.AddRunsAsync(device.Id, device.ConditionId, null, [20, 22], "golden");

        await lab.ReleaseAsync(device.Id, MaskJson.Upper(1, basis: "golden"));
        Assert.Equal([Outcome.Inconclusive, Outcome.Inconclusive], await lab.OutcomesAsync(device.ConditionId, runs));

        var set = await (await PutAsync(engineer, device.Id, golden[0], "First article")).ShouldBeAsync(HttpStatusCode.OK);
        Assert.Equal(0, set.GetProperty("reevaluation").GetProperty("pending").GetInt32());
        Assert.Equal(golden[0], set.GetProperty("golden").GetProperty("runId").GetGuid());
        Assert.Equal([Outcome.Pass, Outcome.Fail], await lab.OutcomesAsync(device.ConditionId, runs));

        await (await PutAsync(engineer, device.Id, golden[1], "Mended")).ShouldBeAsync(HttpStatusCode.OK);
        Assert.Equal([Outcome.Pass, Outcome.Pass], await lab.OutcomesAsync(device.ConditionId, runs));

        var view = await (await engineer.GetAsync($"/api/devices/{device.Id}")).ShouldBeAsync(HttpStatusCode.OK);
        var shown = view.GetProperty("conditions")[0].GetProperty("golden");
        Assert.Equal((golden[1], "Mended", "engineer", false), (
            shown.GetProperty("runId").GetGuid(), shown.GetProperty("reason").GetString(), shown.GetProperty("setBy").GetString(), shown.GetProperty("invalidated").GetBoolean()));

        var history = (await (await engineer.GetAsync($"/api/devices/{device.Id}/golden")).ShouldBeAsync(HttpStatusCode.OK)).GetProperty("items")[0].GetProperty("history");
        Assert.Equal(["Mended", "First article"], history.EnumerateArray().Select(g => g.GetProperty("reason").GetString()));
    }

    [Fact]
    public async Task A_condition_without_a_golden_run_says_so()
    {
        var device = await lab.NewDeviceAsync();
        var engineer = await lab.SignInAsync("engineer");

        var item = (await (await engineer.GetAsync($"/api/devices/{device.Id}/golden")).ShouldBeAsync(HttpStatusCode.OK)).GetProperty("items")[0];

        Assert.Equal(JsonValueKind.Null, item.GetProperty("golden").ValueKind);
        Assert.Equal(0, item.GetProperty("history").GetArrayLength());
    }

    [Fact]
    public async Task A_golden_run_is_a_valid_run_of_the_device_and_has_a_reason()
    {
        var device = await lab.NewDeviceAsync();
        var other = await lab.NewDeviceAsync();
        var engineer = await lab.SignInAsync("engineer");
        var own = await lab.AddRunsAsync(device.Id, device.ConditionId, null, [0, 0], "study");
        var foreign = await lab.AddRunsAsync(other.Id, other.ConditionId, null, [0], "golden");
        await lab.ActAsync("run.invalidated", act =>
        {
            act.Db.Add(new RunInvalidation { RunId = own[1], Cause = "cable", Reason = "For a test", At = act.At, ById = act.ById });
            return true;
        });

        await (await PutAsync(engineer, device.Id, foreign[0], "x")).ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity, "invalid");
        await (await PutAsync(engineer, device.Id, device.Id, "x")).ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity, "invalid");
        await (await PutAsync(engineer, device.Id, null, "x")).ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity, "invalid");
        await (await PutAsync(engineer, device.Id, own[0], " ")).ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity, "invalid");
        await (await PutAsync(engineer, device.Id, own[1], "x")).ShouldRefuseAsync(HttpStatusCode.Conflict, "runInvalidated");
        await (await PutAsync(engineer, foreign[0], own[0], "x")).ShouldRefuseAsync(HttpStatusCode.NotFound, "notFound");
        await (await PutAsync(await lab.SignInAsync("quality"), device.Id, own[0], "x")).ShouldBeAsync(HttpStatusCode.Forbidden);
        await (await PutAsync(engineer, device.Id, own[0], "Any purpose will do")).ShouldBeAsync(HttpStatusCode.OK);
    }

    [Fact]
    public async Task A_release_and_a_change_of_the_golden_run_at_once_both_end_up_in_the_basis()
    {
        var engineer = await lab.SignInAsync("engineer");
        for (var round = 0; round < 5; round++)
        {
            var device = await lab.NewDeviceAsync();
            var golden = await lab.AddRunsAsync(device.Id, device.ConditionId, null, [0, 1], "golden");
            var draft = await lab.DraftAsync(device.Id, MaskJson.Upper(1, basis: "golden"));
            var maskId = draft.GetProperty("id").GetGuid();

            var answers = await Task.WhenAll(
                engineer.PostAsJsonAsync($"/api/masks/{maskId}/release", new { reason = "Agreed" }),
                PutAsync(engineer, device.Id, golden[0], "One"),
                PutAsync(engineer, device.Id, golden[1], "Two"));

            foreach (var answer in answers)
                await answer.ShouldBeAsync(HttpStatusCode.OK);
            await using var db = lab.Look();
            var basis = await CurrentBases.FindAsync(db, device.ConditionId, TestContext.Current.CancellationToken);
            Assert.Equal(maskId, basis?.MaskId);
            Assert.NotNull(basis?.GoldenReadingId);
            Assert.Equal([1, 2], db.GoldenChoices.Where(g => g.ConditionId == device.ConditionId).OrderBy(g => g.Number).Select(g => g.Number));
        }
    }

    private static Task<HttpResponseMessage> PutAsync(HttpClient client, Guid deviceId, Guid? runId, string reason)
        => client.PutAsJsonAsync($"/api/devices/{deviceId}/golden", new { runId, reason });
}

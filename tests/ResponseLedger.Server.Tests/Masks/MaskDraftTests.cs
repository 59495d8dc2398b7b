using System.Net;
using System.Net.Http.Json;
using System.Text.Json;
using ResponseLedger.Server.Tests.Devices;

namespace ResponseLedger.Server.Tests.Masks;

public sealed class MaskDraftTests(Lab lab)
{
    [Fact]
    public async Task A_draft_comes_back_as_it_was_sent()
    {
        var device = await lab.NewDeviceAsync();
        var engineer = await lab.SignInAsync("engineer");

        var answer = await engineer.PostAsJsonAsync($"/api/devices/{device.Id}/masks", MaskJson.Rich);
        var draft = await answer.ShouldBeAsync(HttpStatusCode.Created);
        var read = await (await engineer.GetAsync(answer.Headers.Location)).ShouldBeAsync(HttpStatusCode.OK);

        foreach (var view in new[] { draft, read })
        {
            MaskJson.AssertSame(MaskJson.Rich.GetProperty("limits"), view.GetProperty("limits"));
            MaskJson.AssertSame(MaskJson.Rich.GetProperty("requirements"), view.GetProperty("requirements"));
            Assert.Equal("Band pass, gain 10", view.GetProperty("title").GetString());
            Assert.Equal(("draft", "standard"), (view.GetProperty("state").GetString(), view.GetProperty("condition").GetString()));
            Assert.Equal(JsonValueKind.Null, view.GetProperty("revision").ValueKind);
            Assert.Equal(0, view.GetProperty("problems").GetArrayLength());
        }
    }

    [Fact]
    public async Task A_condition_has_one_draft_at_a_time_and_the_refusal_names_it()
    {
        var device = await lab.NewDeviceAsync();
        var engineer = await lab.SignInAsync("engineer");

        var answers = await Task.WhenAll(Enumerable.Range(0, 5).Select(_ => engineer.PostAsJsonAsync($"/api/devices/{device.Id}/masks", MaskJson.Upper(1))));

        var made = await Assert.Single(answers, a => a.StatusCode == HttpStatusCode.Created).ShouldBeAsync(HttpStatusCode.Created);
        foreach (var answer in answers.Where(a => a.StatusCode != HttpStatusCode.Created))
        {
            var problem = await answer.ShouldRefuseAsync(HttpStatusCode.Conflict, "draftExists");
            Assert.Equal(made.GetProperty("id").GetGuid(), problem.GetProperty("draftId").GetGuid());
        }

        var view = await (await engineer.GetAsync($"/api/devices/{device.Id}")).ShouldBeAsync(HttpStatusCode.OK);
        Assert.Equal(made.GetProperty("id").GetGuid(), view.GetProperty("conditions")[0].GetProperty("draftId").GetGuid());
    }

    [Fact]
    public async Task Each_condition_has_a_line_of_its_own()
    {
        var device = await lab.NewDeviceAsync();
        var engineer = await lab.SignInAsync("engineer");
        var hot = await (await engineer.PostAsJsonAsync($"/api/devices/{device.Id}/conditions", new { name = "hot" })).ShouldBeAsync(HttpStatusCode.Created);

        var first = await lab.DraftAsync(device.Id, MaskJson.Upper(1));
        var byName = await lab.DraftAsync(device.Id, MaskJson.Upper(1, condition: "hot"));
        Assert.Equal(device.ConditionId, first.GetProperty("conditionId").GetGuid());
        Assert.Equal(hot.GetProperty("id").GetGuid(), byName.GetProperty("conditionId").GetGuid());
        var problem = await (await engineer.PostAsJsonAsync($"/api/devices/{device.Id}/masks", MaskJson.Upper(1, condition: "cold"))).ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity);
        Assert.True(problem.GetProperty("errors").TryGetProperty("condition", out _));

        var filtered = await (await engineer.GetAsync($"/api/devices/{device.Id}/masks?condition=hot")).ShouldBeAsync(HttpStatusCode.OK);
        Assert.Equal(byName.GetProperty("id").GetGuid(), Assert.Single(filtered.GetProperty("items").EnumerateArray()).GetProperty("id").GetGuid());
    }

    [Fact]
    public async Task Saving_needs_the_etag_of_the_state_that_was_changed()
    {
        var device = await lab.NewDeviceAsync();
        var engineer = await lab.SignInAsync("engineer");
        var draft = await lab.DraftAsync(device.Id, MaskJson.Upper(1));
        var id = draft.GetProperty("id").GetGuid();
        var first = draft.GetProperty("etag").GetString()!;

        await (await engineer.PutAsync(id, MaskJson.Upper(2), null)).ShouldRefuseAsync(HttpStatusCode.PreconditionRequired, "ifMatchMissing");
        var saved = await engineer.PutAsync(id, MaskJson.Upper(2), first);
        await saved.ShouldBeAsync(HttpStatusCode.OK);
        await (await engineer.PutAsync(id, MaskJson.Upper(3), first)).ShouldRefuseAsync(HttpStatusCode.PreconditionFailed, "draftChanged");

        var read = await engineer.GetAsync($"/api/masks/{id}");
        var now = await read.ShouldBeAsync(HttpStatusCode.OK);
        Assert.Equal(saved.Headers.ETag, read.Headers.ETag);
        Assert.Equal(read.Headers.ETag!.ToString(), now.GetProperty("etag").GetString());
        Assert.Equal(2, now.GetProperty("limits")[0].GetProperty("corners")[0].GetProperty("value").GetDouble());
    }

    [Fact]
    public async Task Of_many_who_save_the_same_state_at_once_one_wins()
    {
        var device = await lab.NewDeviceAsync();
        var engineer = await lab.SignInAsync("engineer");
        var draft = await lab.DraftAsync(device.Id, MaskJson.Upper(1));
        var id = draft.GetProperty("id").GetGuid();

        var answers = await Task.WhenAll(Enumerable.Range(2, 6).Select(i => engineer.PutAsync(id, MaskJson.Upper(i), draft.GetProperty("etag").GetString())));

        var won = await Assert.Single(answers, a => a.StatusCode == HttpStatusCode.OK).ShouldBeAsync(HttpStatusCode.OK);
        foreach (var answer in answers.Where(a => a.StatusCode != HttpStatusCode.OK))
            await answer.ShouldRefuseAsync(HttpStatusCode.PreconditionFailed, "draftChanged");
        var read = await (await engineer.GetAsync($"/api/masks/{id}")).ShouldBeAsync(HttpStatusCode.OK);
        MaskJson.AssertSame(won.GetProperty("limits"), read.GetProperty("limits"));
    }

    [Fact]
    public async Task A_draft_is_discarded_once_and_makes_room_for_another()
    {
        var device = await lab.NewDeviceAsync();
        var engineer = await lab.SignInAsync("engineer");
        var id = (await lab.DraftAsync(device.Id, MaskJson.Upper(1))).GetProperty("id").GetGuid();

        await (await engineer.DeleteAsync($"/api/masks/{id}")).ShouldBeAsync(HttpStatusCode.NoContent);
        await (await engineer.DeleteAsync($"/api/masks/{id}")).ShouldRefuseAsync(HttpStatusCode.NotFound, "notFound");
        await (await engineer.GetAsync($"/api/masks/{id}")).ShouldRefuseAsync(HttpStatusCode.NotFound, "notFound");
        await lab.DraftAsync(device.Id, MaskJson.Upper(2));
    }

    [Theory]
    [InlineData("title", """{"title":"","limits":[],"requirements":[]}""")]
    [InlineData("title", """{"title":5,"limits":[],"requirements":[]}""")]
    [InlineData("limits", """{"title":"t","requirements":[]}""")]
    [InlineData("limits[0].corners[1].value", """{"title":"t","limits":[{"name":"a","quantity":"gainDb","side":"upper","basis":"absolute","corners":[{"frequencyHz":1,"value":1},{"frequencyHz":2,"value":"1"}]}],"requirements":[]}""")]
    [InlineData("limits[0].quantity", """{"title":"t","limits":[{"name":"a","quantity":"gain","side":"upper","basis":"absolute","corners":[]}],"requirements":[]}""")]
    [InlineData("remark", """{"title":"t","limits":[],"requirements":[],"remark":"x"}""")]
    public async Task A_body_of_another_shape_is_refused_by_its_path(string path, string body)
    {
        var device = await lab.NewDeviceAsync();
        var engineer = await lab.SignInAsync("engineer");

        var answer = await engineer.PostAsync($"/api/devices/{device.Id}/masks", new StringContent(body, System.Text.Encoding.UTF8, "application/json"));

        var problem = await answer.ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity);
        Assert.True(problem.GetProperty("errors").TryGetProperty(path, out _), problem.GetRawText());
    }

    [Fact]
    public async Task A_draft_may_be_saved_with_problems_in_it_and_tells_them()
    {
        var device = await lab.NewDeviceAsync();

        var empty = await lab.DraftAsync(device.Id, new { title = "Begun", limits = Array.Empty<object>(), requirements = Array.Empty<object>() });
        Assert.NotEqual(0, empty.GetProperty("problems").GetArrayLength());

        var other = await lab.NewDeviceAsync();
        var falling = await lab.DraftAsync(other.Id, new
        {
            title = "Falls back",
            limits = new[] { new { name = "a", quantity = "gainDb", side = "upper", basis = "absolute", corners = new[] { new { frequencyHz = 100, value = 0 }, new { frequencyHz = 10, value = 0 } } } },
            requirements = Array.Empty<object>(),
        });
        Assert.Contains(falling.GetProperty("problems").EnumerateArray(), p => p.GetProperty("path").GetString()!.StartsWith("limits[0]", StringComparison.Ordinal));
    }

    [Fact]
    public async Task A_copy_takes_limits_and_requirements_from_another_mask_of_the_device()
    {
        var device = await lab.NewDeviceAsync();
        var engineer = await lab.SignInAsync("engineer");
        var released = (await lab.ReleaseAsync(device.Id, MaskJson.Rich)).GetProperty("id").GetGuid();

        var copy = await lab.DraftAsync(device.Id, new { from = released });
        MaskJson.AssertSame(MaskJson.Rich.GetProperty("limits"), copy.GetProperty("limits"));
        MaskJson.AssertSame(MaskJson.Rich.GetProperty("requirements"), copy.GetProperty("requirements"));
        Assert.Equal("draft", copy.GetProperty("state").GetString());
        Assert.NotEqual(released, copy.GetProperty("id").GetGuid());

        var other = await lab.NewDeviceAsync();
        var refused = await (await engineer.PostAsJsonAsync($"/api/devices/{other.Id}/masks", new { from = released })).ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity);
        Assert.True(refused.GetProperty("errors").TryGetProperty("from", out _));
        var both = await (await engineer.PostAsJsonAsync($"/api/devices/{device.Id}/masks", new { from = released, limits = Array.Empty<object>() })).ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity);
        Assert.True(both.GetProperty("errors").TryGetProperty("limits", out _));
    }
}

using System.Net;
using System.Net.Http.Json;
using System.Security.Cryptography;
using Microsoft.EntityFrameworkCore;
using Microsoft.Extensions.DependencyInjection;
using ResponseLedger.Records.Masks;
using ResponseLedger.Server.Tests.Devices;
using ResponseLedger.Store;
using ResponseLedger.Store.Judging;

namespace ResponseLedger.Server.Tests.Masks;

public sealed class MaskReleaseTests(Lab lab)
{
    [Fact]
    public async Task A_released_mask_is_its_canonical_bytes_under_their_digest()
    {
        var device = await lab.NewDeviceAsync();
        var view = await lab.ReleaseAsync(device.Id, MaskJson.Rich);
        var id = view.GetProperty("id").GetGuid();

        await using var scope = lab.Services.CreateAsyncScope();
        var row = await scope.ServiceProvider.GetRequiredService<ResponseLedgerContext>().MaskRevisions.SingleAsync(r => r.MaskId == id);

        Assert.Equal(view.GetProperty("sha256").GetString(), Convert.ToHexStringLower(SHA256.HashData(row.Document)));
        Assert.True(MaskRevisionDocument.TryParse(row.Document, out var document, out _));
        Assert.Equal((device.Id, device.ConditionId, 1), (document.DeviceId, document.ConditionId, document.Revision));
        MaskJson.AssertSame(MaskJson.Rich.GetProperty("limits"), view.GetProperty("limits"));
        MaskJson.AssertSame(MaskJson.Rich.GetProperty("requirements"), view.GetProperty("requirements"));
        Assert.Equal(("released", 1, "Agreed", "engineer"), (
            view.GetProperty("state").GetString(), view.GetProperty("revision").GetInt32(), view.GetProperty("reason").GetString(), view.GetProperty("releasedBy").GetString()));
        Assert.Equal(0, view.GetProperty("reevaluation").GetProperty("pending").GetInt32());
    }

    [Fact]
    public async Task A_released_mask_never_changes()
    {
        var device = await lab.NewDeviceAsync();
        var engineer = await lab.SignInAsync("engineer");
        var id = (await lab.ReleaseAsync(device.Id, MaskJson.Upper(1))).GetProperty("id").GetGuid();

        await (await engineer.PutAsync(id, MaskJson.Upper(2), "*")).ShouldRefuseAsync(HttpStatusCode.Conflict, "maskReleased");
        await (await engineer.PutAsync(id, MaskJson.Upper(2), null)).ShouldRefuseAsync(HttpStatusCode.Conflict, "maskReleased");
        await (await engineer.DeleteAsync($"/api/masks/{id}")).ShouldRefuseAsync(HttpStatusCode.Conflict, "maskReleased");
        await (await engineer.PostAsJsonAsync($"/api/masks/{id}/release", new { reason = "Again" })).ShouldRefuseAsync(HttpStatusCode.Conflict, "maskReleased");
    }

    [Fact]
    public async Task Revisions_are_numbered_within_their_condition_and_listed_newest_first()
    {
        var device = await lab.NewDeviceAsync();
        var engineer = await lab.SignInAsync("engineer");
        await (await engineer.PostAsJsonAsync($"/api/devices/{device.Id}/conditions", new { name = "hot" })).ShouldBeAsync(HttpStatusCode.Created);
        for (var i = 1; i <= 3; i++)
            Assert.Equal(i, (await lab.ReleaseAsync(device.Id, MaskJson.Upper(i))).GetProperty("revision").GetInt32());
        Assert.Equal(1, (await lab.ReleaseAsync(device.Id, MaskJson.Upper(9, condition: "hot"))).GetProperty("revision").GetInt32());
        await lab.DraftAsync(device.Id, MaskJson.Upper(4));

        var seen = new List<string>();
        string? next = null;
        do
        {
            var page = await (await engineer.GetAsync($"/api/devices/{device.Id}/masks?condition=standard&limit=3&cursor={next}")).ShouldBeAsync(HttpStatusCode.OK);
            seen.AddRange(page.GetProperty("items").EnumerateArray().Select(m => $"{m.GetProperty("state").GetString()} {m.GetProperty("revision")}".TrimEnd()));
            next = page.GetProperty("next").GetString();
        }
        while (next is not null);
        Assert.Equal(["draft", "released 3", "released 2", "released 1"], seen);

        var view = await (await engineer.GetAsync($"/api/devices/{device.Id}")).ShouldBeAsync(HttpStatusCode.OK);
        Assert.Equal([3, 1], view.GetProperty("conditions").EnumerateArray().Select(c => c.GetProperty("maskRevision").GetInt32()));
    }

    [Fact]
    public async Task Of_many_who_release_the_same_draft_at_once_one_does()
    {
        var device = await lab.NewDeviceAsync();
        var engineer = await lab.SignInAsync("engineer");
        var id = (await lab.DraftAsync(device.Id, MaskJson.Upper(1))).GetProperty("id").GetGuid();

        var answers = await Task.WhenAll(Enumerable.Range(0, 6).Select(_ => engineer.PostAsJsonAsync($"/api/masks/{id}/release", new { reason = "Agreed" })));

        Assert.Equal(1, (await Assert.Single(answers, a => a.StatusCode == HttpStatusCode.OK).ShouldBeAsync(HttpStatusCode.OK)).GetProperty("revision").GetInt32());
        foreach (var answer in answers.Where(a => a.StatusCode != HttpStatusCode.OK))
            await answer.ShouldRefuseAsync(HttpStatusCode.Conflict, "maskReleased");
        await using var scope = lab.Services.CreateAsyncScope();
        Assert.Equal(1, await scope.ServiceProvider.GetRequiredService<ResponseLedgerContext>().MaskRevisions.CountAsync(r => r.ConditionId == device.ConditionId));
    }

    [Fact]
    public async Task A_release_names_the_state_that_was_looked_at_where_it_wants_to()
    {
        var device = await lab.NewDeviceAsync();
        var engineer = await lab.SignInAsync("engineer");
        var draft = await lab.DraftAsync(device.Id, MaskJson.Upper(1));
        var id = draft.GetProperty("id").GetGuid();
        await (await engineer.PutAsync(id, MaskJson.Upper(2), draft.GetProperty("etag").GetString())).ShouldBeAsync(HttpStatusCode.OK);

        using var request = new HttpRequestMessage(HttpMethod.Post, $"/api/masks/{id}/release") { Content = JsonContent.Create(new { reason = "Agreed" }) };
        request.Headers.TryAddWithoutValidation("If-Match", draft.GetProperty("etag").GetString());
        await (await engineer.SendAsync(request)).ShouldRefuseAsync(HttpStatusCode.PreconditionFailed, "draftChanged");
    }

    [Fact]
    public async Task What_keeps_a_mask_from_release_is_told_by_path()
    {
        var engineer = await lab.SignInAsync("engineer");
        var cases = new (string Path, object Mask)[]
        {
            ("", new { title = "Nothing", limits = Array.Empty<object>(), requirements = Array.Empty<object>() }),
            ("limits[1]", new { title = "Two of a name", limits = new[] { Limit("a", 100, 1000), Limit("a", 100, 1000) }, requirements = Array.Empty<object>() }),
            ("limits[0]", new { title = "Falls back", limits = new[] { Limit("a", 1000, 100) }, requirements = Array.Empty<object>() }),
            ("requirements[0]", new
            {
                title = "Unbounded",
                limits = Array.Empty<object>(),
                requirements = new[] { new { name = "r", measure = "ripple", parameters = new { fromHz = 100, toHz = 1000 }, output = "rippleDb" } },
            }),
        };
        foreach (var (path, mask) in cases)
        {
            var device = await lab.NewDeviceAsync();
            var id = (await lab.DraftAsync(device.Id, mask)).GetProperty("id").GetGuid();
            var problem = await (await engineer.PostAsJsonAsync($"/api/masks/{id}/release", new { reason = "Agreed" })).ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity);
            Assert.Contains(problem.GetProperty("errors").EnumerateObject(), e => path.Length == 0 || e.Name.StartsWith(path, StringComparison.Ordinal));
            Assert.Equal("draft", (await (await engineer.GetAsync($"/api/masks/{id}")).ShouldBeAsync(HttpStatusCode.OK)).GetProperty("state").GetString());
        }
    }

    [Fact]
    public async Task A_release_needs_a_reason_and_an_engineer()
    {
        var device = await lab.NewDeviceAsync();
        var id = (await lab.DraftAsync(device.Id, MaskJson.Upper(1))).GetProperty("id").GetGuid();

        await (await (await lab.SignInAsync("engineer")).PostAsJsonAsync($"/api/masks/{id}/release", new { reason = " " })).ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity);
        foreach (var role in new[] { "operator", "quality", "auditor" })
            await (await (await lab.SignInAsync(role)).PostAsJsonAsync($"/api/masks/{id}/release", new { reason = "Agreed" })).ShouldBeAsync(HttpStatusCode.Forbidden);
    }

    [Fact]
    public async Task A_release_leaves_a_basis_in_force_and_an_entry_with_the_digest()
    {
        var device = await lab.NewDeviceAsync();
        var view = await lab.ReleaseAsync(device.Id, MaskJson.Upper(1));

        await using var scope = lab.Services.CreateAsyncScope();
        var db = scope.ServiceProvider.GetRequiredService<ResponseLedgerContext>();
        var basis = await CurrentBases.FindAsync(db, device.ConditionId, TestContext.Current.CancellationToken);
        Assert.Equal(view.GetProperty("id").GetGuid(), basis?.MaskId);
        var entries = (await db.LedgerEntries.Where(e => e.Kind == "mask.released").Select(e => e.Bytes).ToListAsync())
            .Select(bytes => System.Text.Encoding.UTF8.GetString(bytes)).Where(text => text.Contains(view.GetProperty("id").GetString()!, StringComparison.Ordinal));
        Assert.Contains(view.GetProperty("sha256").GetString()!, Assert.Single(entries), StringComparison.Ordinal);
    }

    private static object Limit(string name, double fromHz, double toHz) => new
    {
        name,
        quantity = "gainDb",
        side = "upper",
        basis = "absolute",
        corners = new[] { new { frequencyHz = fromHz, value = 0 }, new { frequencyHz = toHz, value = 0 } },
    };
}

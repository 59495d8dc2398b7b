using System.Net;
using System.Net.Http.Json;
using System.Security.Cryptography;
using System.Text.Json;
using Microsoft.EntityFrameworkCore;
using Microsoft.Extensions.DependencyInjection;
using ResponseLedger.Records.Decisions;
using ResponseLedger.Server.Tests.Lots;
using ResponseLedger.Store;

namespace ResponseLedger.Server.Tests.SignOff;

public sealed class DecisionTests(Lab lab)
{
    [Fact]
    public async Task A_lot_whose_units_all_pass_is_approved_and_the_record_pins_what_it_rests_on()
    {
        var scene = await LotScene.NewAsync(lab, 2, furtherConditions: ["hot"]);
        var golden = await scene.SendAsync("golden", Runs.RunScene.Csv(0, Lab.Unique("golden")), purpose: "golden");
        await scene.SetGoldenAsync(golden);
        var spoilt = await scene.SendAsync("a", 3);
        var runs = new Dictionary<string, string> { ["a standard"] = await scene.SendAsync("a", 0), ["b standard"] = await scene.SendAsync("b", 0.25) };
        var retest = await scene.SendAsync("b", 0.5);
        runs["a hot"] = await scene.SendAsync("a", 0.125, "hot");
        runs["b hot"] = await scene.SendAsync("b", 0, "hot");
        await scene.InvalidateAsync(spoilt);

        var answer = await scene.DecideAsync("approve", reason: null);
        var decision = await answer.ShouldBeAsync(HttpStatusCode.Created);

        Assert.Equal($"/api/decisions/{decision.GetProperty("id").GetString()}", answer.Headers.Location?.OriginalString);
        Assert.Equal(1, decision.GetProperty("ordinal").GetInt32());
        Assert.Equal("engineer@example.test", decision.GetProperty("signedBy").GetProperty("email").GetString());

        // The bytes: their digest is the one that is shown, in the ETag, and in the ledger.
        var response = await scene.Engineer.GetAsync($"/api/decisions/{decision.GetProperty("id").GetString()}/record");
        var bytes = await response.Content.ReadAsByteArrayAsync();
        var digest = Convert.ToHexStringLower(SHA256.HashData(bytes));
        Assert.Equal(digest, decision.GetProperty("sha256").GetString());
        Assert.Equal($"\"{digest}\"", response.Headers.ETag?.Tag);
        Assert.Equal("application/json", response.Content.Headers.ContentType?.MediaType);
        await using var scope = lab.Services.CreateAsyncScope();
        var db = scope.ServiceProvider.GetRequiredService<ResponseLedgerContext>();
        var entries = await db.LedgerEntries.Where(e => e.Kind == "lot.decided").Select(e => e.Bytes).ToListAsync();
        Assert.Single(entries, e => JsonDocument.Parse(e).RootElement.GetProperty("detail").TryGetProperty("recordSha256", out var pinned) && pinned.GetString() == digest);

        // What they say, checked against the store and the API.
        Assert.True(DecisionDocument.TryParse(bytes, out var document, out _));
        var record = document.Record;
        Assert.Equal(DecisionWord.Approve, record.Decision);
        Assert.Equal((scene.LotId, scene.LotNumber, 2, 1), (record.Lot.LotId, record.Lot.Number, record.Lot.Size, record.Lot.DecisionOrdinal));
        Assert.Equal(new DecisionCounts(2, 2, 2, 0, 0, 0, 1), record.Counts);
        Assert.Equal(DecisionWord.Approve, record.Recommendation.Decision);
        var standard = Assert.Single(record.Conditions, c => c.Name == "standard");
        var mask = await db.MaskRevisions.SingleAsync(m => m.ConditionId == standard.ConditionId);
        Assert.Equal((mask.MaskId, 1), (standard.Mask!.MaskRevisionId, standard.Mask.Revision));
        Assert.Equal(mask.Sha256, standard.Mask.Sha256);
        Assert.Equal(golden, standard.Golden!.RunId.ToString());
        Assert.Equal(await FilesDigestAsync(db, standard.Golden.RunId), Convert.ToHexStringLower(standard.Golden.FilesSha256));
        Assert.Null(Assert.Single(record.Conditions, c => c.Name == "hot").Golden);

        var pins = await db.DecisionVerdicts.Where(v => v.DecisionId == record.DecisionId).ToListAsync();
        Assert.Equal(4, pins.Count);
        foreach (var unit in record.Units)
        {
            Assert.Equal(2, unit.Runs.Count);
            foreach (var run in unit.Runs)
            {
                var condition = record.Conditions.Single(c => c.ConditionId == run.ConditionId);
                Assert.Equal(runs[$"{unit.Serial} {condition.Name}"], run.RunId.ToString());
                Assert.Equal(await db.RunFiles.Where(f => f.RunId == run.RunId).Select(f => f.Sha256).SingleAsync(), Assert.Single(run.FilesSha256));
                var verdict = await db.Verdicts.SingleAsync(v => v.Id == run.VerdictId);
                Assert.Equal((run.ReadingId, (short)run.Outcome!), (verdict.ReadingId, verdict.Outcome));
                Assert.Equal(condition.Mask!.MaskRevisionId, await db.Bases.Where(b => b.Id == verdict.BasisId).Select(b => b.MaskId).SingleAsync());
                Assert.Equal(verdict.Margins[verdict.WorstIndex!.Value], run.Worst!.Margin);
                Assert.Single(pins, p => p.RunId == run.RunId && p.ReadingId == run.ReadingId && p.VerdictId == run.VerdictId && p.UnitId == unit.UnitId && p.ConditionId == run.ConditionId);
            }
        }

        var other = Assert.Single(record.Units.Single(u => u.Serial == "a").OtherRuns);
        Assert.Equal((spoilt, OtherRunStanding.Invalidated, "contact"), (other.RunId.ToString(), other.Standing, other.Cause));
        other = Assert.Single(record.Units.Single(u => u.Serial == "b").OtherRuns);
        Assert.Equal((retest, OtherRunStanding.Retest), (other.RunId.ToString(), other.Standing));
        Assert.True(JsonElement.DeepEquals(JsonDocument.Parse(bytes).RootElement, decision.GetProperty("record")));
    }

    [Fact]
    public async Task A_lot_with_units_that_neither_pass_nor_are_withdrawn_is_not_approved()
    {
        var scene = await LotScene.NewAsync(lab, 3);
        await scene.SendAsync("a", 0);
        await scene.SendAsync("b", 3);

        var problem = await (await scene.DecideAsync("approve")).ShouldRefuseAsync(HttpStatusCode.Conflict, "unitsNotPassed");
        Assert.Contains("2 of 3 units neither pass nor are withdrawn: 1 fails, 1 is not fully tested.", problem.GetProperty("detail").GetString(), StringComparison.Ordinal);

        // The unit that was withdrawn fails still, and is in nobody's way.
        await (await scene.DispositionAsync("b", "scrap")).ShouldBeAsync(HttpStatusCode.Created);
        problem = await (await scene.DecideAsync("approve")).ShouldRefuseAsync(HttpStatusCode.Conflict, "unitsNotPassed");
        Assert.Contains("1 of 3 units neither passes nor is withdrawn.", problem.GetProperty("detail").GetString(), StringComparison.Ordinal);
        await scene.SendAsync("c", 0);
        await (await scene.DecideAsync("approve")).ShouldBeAsync(HttpStatusCode.Created);

        Assert.Equal("3 3 2 1 0 1 0", await scene.CountsAsync());
        Assert.Equal("approved", (await scene.LotAsync()).GetProperty("state").GetString());
    }

    [Fact]
    public async Task A_unit_under_concession_asks_for_an_approval_with_concession()
    {
        var scene = await LotScene.NewAsync(lab, 2);
        await scene.SendAsync("a", 0);
        await scene.SendAsync("b", 3);
        await (await scene.DecideAsync("approveWithConcession")).ShouldRefuseAsync(HttpStatusCode.Conflict, "unitsNotPassed");
        await (await scene.DispositionAsync("b", "concession")).ShouldBeAsync(HttpStatusCode.Created);

        Assert.Equal(["concessionNeeded"], await scene.BlockersAsync());
        Assert.Equal("concessionNeeded", (await (await scene.DecideAsync("approve")).ShouldRefuseAsync(HttpStatusCode.Conflict, "unitsNotPassed")).GetProperty("reason").GetString());
        await (await scene.DecideAsync("approveWithConcession")).ShouldBeAsync(HttpStatusCode.Created);

        Assert.Equal("approvedWithConcession", (await scene.LotAsync()).GetProperty("state").GetString());
    }

    [Fact]
    public async Task There_is_no_concession_where_every_unit_passes()
    {
        var scene = await LotScene.NewAsync(lab, 1);
        await scene.SendAsync("a", 0);

        await (await scene.DecideAsync("approveWithConcession")).ShouldRefuseAsync(HttpStatusCode.Conflict, "noConcession");
    }

    [Fact]
    public async Task Without_a_released_mask_a_lot_can_only_be_rejected()
    {
        var scene = await LotScene.NewAsync(lab, 1, mask: false);
        await scene.SendAsync("a", 0);

        Assert.Equal("noReleasedMask", (await (await scene.DecideAsync("approve")).ShouldRefuseAsync(HttpStatusCode.Conflict, "unitsNotPassed")).GetProperty("reason").GetString());
        var decision = await (await scene.DecideAsync("reject")).ShouldBeAsync(HttpStatusCode.Created);

        Assert.Equal(JsonValueKind.Null, decision.GetProperty("record").GetProperty("conditions")[0].GetProperty("maskRevisionId").ValueKind);
        Assert.Equal("rejected", (await scene.LotAsync()).GetProperty("state").GetString());
    }

    [Fact]
    public async Task A_lot_without_any_run_can_be_rejected()
    {
        var scene = await LotScene.NewAsync(lab, 3, ["a"]);

        var decision = await (await scene.DecideAsync("reject")).ShouldBeAsync(HttpStatusCode.Created);

        Assert.Equal(1, decision.GetProperty("record").GetProperty("counts").GetProperty("units").GetInt32());
    }

    [Fact]
    public async Task A_lot_with_more_units_than_its_size_is_not_decided()
    {
        var scene = await LotScene.NewAsync(lab, 1, ["a"]);
        var stray = await scene.SendAsync("a", 0);
        await using (var scope = lab.Services.CreateAsyncScope())
        {
            // Whether intake takes a unit too many is not this test's subject, so the assignment is made directly.
            var acts = scope.ServiceProvider.GetRequiredService<Store.Acts.ActRunner>();
            await acts.RunAsync(Ledger.Actor.Server, (act, _) =>
            {
                var unit = new Store.Model.Unit { Id = act.NewId(), DeviceId = scene.DeviceId, Serial = "one too many", At = act.At };
                act.Db.AddRange(unit, new Store.Model.LotUnit { LotId = scene.LotId, UnitId = unit.Id, At = act.At });
                act.Record("lot.changed", [], []);
                return Task.FromResult(true);
            }, CancellationToken.None);
        }

        await (await scene.DecideAsync("reject")).ShouldRefuseAsync(HttpStatusCode.Conflict, "moreUnitsThanSize");
        Assert.NotEmpty(stray);
    }

    [Theory]
    [InlineData("ship it", "Reviewed.", "decision")]
    [InlineData(null, "Reviewed.", "decision")]
    [InlineData("reject", "", "reason")]
    [InlineData("reject", null, "reason")]
    [InlineData("approveWithConcession", " ", "reason")]
    public async Task A_decision_that_cannot_stand_is_refused_by_the_field(string? decision, string? reason, string field)
    {
        var scene = await LotScene.NewAsync(lab, 1);

        var problem = await (await scene.DecideAsync(decision!, reason)).ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity);

        Assert.True(problem.GetProperty("errors").TryGetProperty(field, out _), problem.ToString());
    }

    [Fact]
    public async Task A_wrong_password_signs_nothing_and_is_counted()
    {
        var scene = await LotScene.NewAsync(lab, 1);
        await scene.SendAsync("a", 0);
        var (email, signer) = await lab.NewPersonAsync("engineer");

        var problem = await (await scene.DecideAsync("approve", client: signer, password: "not this one")).ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity);

        Assert.True(problem.GetProperty("errors").TryGetProperty("password", out _), problem.ToString());
        Assert.Equal("open", (await scene.LotAsync()).GetProperty("state").GetString());
        await using var scope = lab.Services.CreateAsyncScope();
        var db = scope.ServiceProvider.GetRequiredService<ResponseLedgerContext>();
        Assert.Equal(1, await db.Users.Where(p => p.Email == email).Select(p => p.AccessFailedCount).SingleAsync());
        await (await scene.DecideAsync("approve", client: signer, password: "")).ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity);
    }

    [Theory]
    [InlineData("operator")]
    [InlineData("auditor")]
    public async Task Operators_and_auditors_do_not_sign(string role)
    {
        var scene = await LotScene.NewAsync(lab, 1, ["a"]);
        var client = await lab.SignInAsync(role);

        await (await scene.DecideAsync("reject", client: client)).ShouldBeAsync(HttpStatusCode.Forbidden);
        await (await scene.DispositionAsync("a", "scrap", client)).ShouldBeAsync(HttpStatusCode.Forbidden);
    }

    [Fact]
    public async Task A_device_may_ask_for_quality()
    {
        var scene = await LotScene.NewAsync(lab, 1);
        await scene.SendAsync("a", 0);
        await (await (await lab.SignInAsync("quality")).PatchAsJsonAsync($"/api/devices/{scene.DeviceId}", new { signingNeedsQuality = true })).ShouldBeAsync(HttpStatusCode.OK);

        await (await scene.DecideAsync("approve")).ShouldRefuseAsync(HttpStatusCode.Forbidden, "notAllowed");
        await (await scene.DecideAsync("approve", client: await lab.SignInAsync("quality"))).ShouldBeAsync(HttpStatusCode.Created);
    }

    [Fact]
    public async Task A_device_may_keep_people_from_signing_for_runs_of_their_own()
    {
        var scene = await LotScene.NewAsync(lab, 1);
        await (await (await lab.SignInAsync("quality")).PatchAsJsonAsync($"/api/devices/{scene.DeviceId}", new { signingExcludesOwnRuns = true })).ShouldBeAsync(HttpStatusCode.OK);
        var (_, sender) = await lab.NewPersonAsync("engineer");
        await scene.SendAsync("a", 0, client: sender);

        await (await scene.DecideAsync("approve", client: sender)).ShouldRefuseAsync(HttpStatusCode.Conflict, "ownRuns");
        await (await scene.DecideAsync("approve")).ShouldBeAsync(HttpStatusCode.Created);
    }

    [Fact]
    public async Task Of_many_who_decide_at_once_one_wins_and_the_others_are_told()
    {
        var scene = await LotScene.NewAsync(lab, 1);
        await scene.SendAsync("a", 0);
        var quality = await lab.SignInAsync("quality");

        var answers = await Task.WhenAll(Enumerable.Range(0, 8).Select(i => scene.DecideAsync(i % 2 == 0 ? "approve" : "reject", client: i < 4 ? scene.Engineer : quality)));

        Assert.Equal(1, answers.Count(a => a.StatusCode == HttpStatusCode.Created));
        foreach (var answer in answers.Where(a => a.StatusCode != HttpStatusCode.Created))
            await answer.ShouldRefuseAsync(HttpStatusCode.Conflict, "lotDecided");
        Assert.Single((await scene.GetAsync($"/api/lots/{scene.LotId}/decisions")).GetProperty("items").EnumerateArray());
    }

    private static async Task<string> FilesDigestAsync(ResponseLedgerContext db, Guid runId)
        => Convert.ToHexStringLower(RunFilesDigest.Of(await db.RunFiles.Where(f => f.RunId == runId).OrderBy(f => f.Ordinal).Select(f => f.Sha256).ToListAsync()));
}

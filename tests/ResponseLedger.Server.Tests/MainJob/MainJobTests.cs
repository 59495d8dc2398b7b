using System.Net;
using System.Net.Http.Json;
using System.Security.Cryptography;
using System.Text.Json;
using static ResponseLedger.Server.Tests.MainJob.LowPassDevice;

namespace ResponseLedger.Server.Tests.MainJob;

/// <summary>The whole job as a lab does it, over HTTP alone: from the first sign-in to a signed lot that nothing can change any more.</summary>
public sealed class MainJobTests
{
    private const string Lot = "2026-17";
    private const int SpoiltLine = 40;

    private readonly Dictionary<string, (string Condition, string Name, byte[] Content)> sent = [];
    private readonly Dictionary<string, string> runs = [];

    [Theory]
    [InlineData("scrap", "approve", "approved")]
    [InlineData("concession", "approveWithConcession", "approvedWithConcession")]
    public async Task From_files_to_a_signed_lot(string disposition, string decision, string state)
    {
        await using var lab = await Lab.StartAsync();
        using var people = await LabPeople.ComeInAsync(lab.Server);
        var device = await PrepareAsync(people);
        var lot = await people.Operator.MadeAsync("/api/lots", new { deviceId = device.Id, number = Lot, size = 4, serials = new[] { "SN001", "SN002", "SN003", "SN004" } });
        var lotPath = $"/api/lots/{lot.Text("id")}";

        await SweepStandardAsync(people);
        await SweepHotAsync(people);
        await RetestAsync(people, lotPath);
        await OverlayCheck.AgreesWithTracesAsync(people.Engineer, lotPath, RunsIn(Standard), device.GoldenRuns[Standard]);

        await RefusedApprovalsAsync(people, lotPath);
        var off = (await people.Quality.SeeAsync($"{lotPath}/units")).Item("serial", "SN004");
        await people.Engineer.MadeAsync($"{lotPath}/units/{off.Text("unitId")}/disposition", new { disposition, reason = "C3 has the wrong value." });
        var signed = await people.Quality.MadeAsync($"{lotPath}/decisions", new { decision, reason = "Reviewed with the engineer.", password = LabPeople.PasswordOf("quality") });
        Assert.Equal(state, (await people.Operator.SeeAsync(lotPath)).Text("state"));

        var record = await RecordCheck.DigestAsync(people.Quality, signed, sent, device);
        await NothingChangesAfterAsync(people, lotPath);
        await EveryActIsInTheLedgerAsync(people, record);
    }

    // One request, three makes of file, and one that is spoilt: it alone is refused, with its place, and is sent again mended.
    private async Task SweepStandardAsync(LabPeople people)
    {
        var wrongPart = new LowPass(7_000);
        var results = await people.SendAsync(
            HttpStatusCode.Created, Lot, Standard,
            Keep("SN001", Standard, "SN001_std.csv", new LowPass(10_200).CommaCsv()),
            ("SN004_std.csv", wrongPart.Spoilt(SpoiltLine)),
            Keep("SN002", Standard, "SN002_std.csv", new LowPass(9_800).SemicolonCsv()),
            Keep("SN003 bad contact", Standard, "SN003_std.s2p", new LowPass(10_100, OffsetDb: -3).TwoPort()));

        Assert.Equal(["accepted", "refused", "accepted", "accepted"], results.Select(r => r.Text("outcome")));
        Assert.Equal(["SN001", "SN004", "SN002", "SN003"], results.Select(r => r.Text("serial")));
        var issue = Assert.Single(results[1].GetProperty("issues").EnumerateArray());
        Assert.Equal((SpoiltLine, 2), (issue.GetProperty("line").GetInt32(), issue.GetProperty("column").GetInt32()));
        Assert.Contains("-O.5", issue.Text("message"), StringComparison.Ordinal);
        Assert.Equal(["pass", "pass", "fail"], results.Where(r => r.Text("outcome") == "accepted").Select(r => r.GetProperty("verdict").Text("outcome")));
        Taken("SN001", results[0]);
        Taken("SN002", results[2]);
        Taken("SN003 bad contact", results[3]);

        var mended = Assert.Single(await people.SendAsync(HttpStatusCode.Created, Lot, Standard, Keep("SN004", Standard, "SN004_std.csv", wrongPart.CommaCsv())));
        Taken("SN004", mended);
        var worst = mended.GetProperty("verdict").GetProperty("worst");
        Assert.Equal(("fail", "corner", "Hz"), (mended.GetProperty("verdict").Text("outcome"), worst.Text("criterion"), worst.Text("unit")));
        Assert.Equal(7_000 - 8_500, worst.GetProperty("margin").GetDouble(), 5.0);
    }

    private async Task SweepHotAsync(LabPeople people)
    {
        string[] serials = ["SN001", "SN002", "SN003", "SN004"];
        var files = serials.Select((s, i) => Keep($"{s} hot", Hot, $"{s}_hot.txt", new LowPass(9_500 + 50 * i).ComplexTabs(s))).ToArray();
        var results = await people.SendAsync(HttpStatusCode.Created, Lot, Hot, files);
        Assert.All(results, r => Assert.Equal("pass", r.GetProperty("verdict").Text("outcome")));
        foreach (var (serial, result) in serials.Zip(results))
            Taken($"{serial} hot", result);
    }

    // The probe had no contact: a second sweep alone changes nothing, until an engineer finds the cause of the first.
    private async Task RetestAsync(LabPeople people, string lotPath)
    {
        var retest = Assert.Single(await people.SendAsync(
            HttpStatusCode.Created, Lot, Standard, Keep("SN003", Standard, "SN003_std_2.s2p", new LowPass(10_100).TwoPort())));
        Taken("SN003", retest);
        Assert.Contains(retest.GetProperty("notes").EnumerateArray(), n => n.Text("code") == "retestDoesNotCount");
        Assert.Equal("fail", (await people.Engineer.SeeAsync($"{lotPath}/units")).Item("serial", "SN003").Text("outcome"));

        var finding = new { cause = "No contact", reason = "The probe was bent; seen under the microscope." };
        await (await people.Operator.PostAsJsonAsync($"/api/runs/{RunOf("SN003 bad contact")}/invalidation", finding)).ShouldRefuseAsync(HttpStatusCode.Forbidden);
        await people.Engineer.MadeAsync($"/api/runs/{RunOf("SN003 bad contact")}/invalidation", finding);
        var unit = (await people.Engineer.SeeAsync($"{lotPath}/units")).Item("serial", "SN003");
        Assert.Equal("pass", unit.Text("outcome"));
        Assert.Equal(1, unit.GetProperty("invalidated").GetInt32());
    }

    private static async Task RefusedApprovalsAsync(LabPeople people, string lotPath)
    {
        var lot = await people.Quality.SeeAsync(lotPath);
        Assert.Equal(["unitsNotPassed"], lot.GetProperty("blockers").EnumerateArray().Select(b => b.Text("code")));
        var decisions = $"{lotPath}/decisions";
        await (await people.Quality.PostAsJsonAsync(decisions, new { decision = "approve", reason = "", password = LabPeople.PasswordOf("quality") }))
            .ShouldRefuseAsync(HttpStatusCode.Conflict, "unitsNotPassed");
        await (await people.Operator.PostAsJsonAsync(decisions, new { decision = "approve", reason = "", password = LabPeople.PasswordOf("operator") }))
            .ShouldRefuseAsync(HttpStatusCode.Forbidden);
        var wrong = await (await people.Quality.PostAsJsonAsync(decisions, new { decision = "reject", reason = "Guessed.", password = "not the password at all" }))
            .ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity);
        Assert.True(wrong.GetProperty("errors").TryGetProperty("password", out _), wrong.ToString());
        Assert.Equal("open", (await people.Quality.SeeAsync(lotPath)).Text("state"));
    }

    private async Task NothingChangesAfterAsync(LabPeople people, string lotPath)
    {
        var before = (await people.Quality.SeeAsync($"{lotPath}/units")).ToString();
        var late = Assert.Single(await people.SendAsync(HttpStatusCode.UnprocessableEntity, Lot, Standard, ("SN004_again.csv", new LowPass(10_000).CommaCsv("late"))));
        Assert.Equal("lotDecided", Assert.Single(late.GetProperty("issues").EnumerateArray()).Text("code"));
        foreach (var (unit, (condition, name, content)) in sent)
        {
            var again = Assert.Single(await people.SendAsync(HttpStatusCode.OK, Lot, condition, (name, content)));
            Assert.Equal(("duplicate", RunOf(unit)), (again.Text("outcome"), again.Text("runId")));
        }

        await (await people.Engineer.PostAsJsonAsync($"/api/runs/{RunOf("SN001")}/invalidation", new { cause = "Late", reason = "Too late." }))
            .ShouldRefuseAsync(HttpStatusCode.Conflict, "lotDecided");
        await (await people.Quality.PostAsJsonAsync($"{lotPath}/decisions", new { decision = "reject", reason = "Second thoughts.", password = LabPeople.PasswordOf("quality") }))
            .ShouldRefuseAsync(HttpStatusCode.Conflict, "lotDecided");
        Assert.Equal(before, (await people.Quality.SeeAsync($"{lotPath}/units")).ToString());
    }

    private async Task EveryActIsInTheLedgerAsync(LabPeople people, string recordSha256)
    {
        var entries = await LedgerWalk.ReadAsync(people.Quality, "lot.decided", pageSize: 7);
        string[] expected =
        [
            "bench.created 1", "condition.added 1", "device.created 1", "golden.set 2", "lot.created 1", "lot.decided 1", "mask.drafted 2", "mask.released 2",
            "person.created 4", "run.invalidated 1", $"run.received {2 + sent.Count}", "token.created 1", "unit.dispositioned 1",
        ];
        Assert.Equal(expected, entries.GroupBy(e => e.Text("kind")).Select(g => $"{g.Key} {g.Count()}").Order(StringComparer.Ordinal));

        JsonElement Only(string kind) => entries.Single(e => e.Text("kind") == kind);
        var received = entries.Where(e => e.Text("kind") == "run.received").ToList();
        Assert.All(received, e => Assert.Equal(("bench", "Bay 3's computer"), (e.GetProperty("actor").Text("kind"), e.GetProperty("actor").Text("name"))));
        foreach (var (unit, (_, _, content)) in sent)
        {
            var entry = received.Single(e => e.GetProperty("subject").Text("runId") == RunOf(unit));
            Assert.Equal(Sha256(content), Assert.Single(entry.GetProperty("detail").GetProperty("files").EnumerateArray()).Text("sha256"));
        }

        Assert.Equal(RunOf("SN003 bad contact"), Only("run.invalidated").GetProperty("subject").Text("runId"));
        Assert.Equal("SN004", Only("unit.dispositioned").GetProperty("subject").Text("serial"));
        Assert.Equal("The engineer", Only("unit.dispositioned").GetProperty("actor").Text("name"));
        Assert.Equal("The quality", Only("lot.decided").GetProperty("actor").Text("name"));
        Assert.Equal(recordSha256, Only("lot.decided").GetProperty("detail").Text("recordSha256"));
        Assert.All(entries, e => Assert.DoesNotContain(LabPeople.PasswordOf("quality"), e.ToString(), StringComparison.Ordinal));
    }

    private (string Name, byte[] Content) Keep(string unit, string condition, string name, byte[] content)
    {
        sent.Add(unit, (condition, name, content));
        return (name, content);
    }

    private void Taken(string unit, JsonElement result)
    {
        Assert.True(result.Text("outcome") == "accepted", result.ToString());
        runs.Add(unit, result.Text("runId"));
    }

    private string RunOf(string unit) => runs[unit];

    private Dictionary<string, string> RunsIn(string condition)
        => runs.Where(r => sent[r.Key].Condition == condition && r.Key != "SN003 bad contact").ToDictionary(r => r.Key, r => r.Value);

    private static string Sha256(byte[] content) => Convert.ToHexStringLower(SHA256.HashData(content));
}

using System.Net;
using System.Net.Http.Json;
using System.Text.Json;

namespace ResponseLedger.Server.Tests.Lots;

public sealed class LotTests(Lab lab)
{
    [Fact]
    public async Task A_new_lot_is_open_and_counts_the_units_that_were_declared()
    {
        var scene = await LotScene.NewAsync(lab, 4, ["S1", " S2 "]);

        var lot = await scene.LotAsync();

        Assert.Equal("open", lot.GetProperty("state").GetString());
        Assert.Equal(4, lot.GetProperty("size").GetInt32());
        Assert.Equal(scene.PartNumber, lot.GetProperty("partNumber").GetString());
        Assert.Equal(1, lot.GetProperty("maskRevision").GetInt32());
        Assert.Equal(JsonValueKind.Null, lot.GetProperty("goldenRunId").ValueKind);
        Assert.Equal(JsonValueKind.Null, lot.GetProperty("decision").ValueKind);
        Assert.Equal("standard", Assert.Single(lot.GetProperty("conditions").EnumerateArray()).GetProperty("name").GetString());
        Assert.Equal("2 0 0 0 0 0 0", await scene.CountsAsync());
        Assert.Equal(["unitsNotPassed"], await scene.BlockersAsync());
        Assert.Equal(["S1", "S2"], (await scene.UnitsAsync("?sort=serial")).GetProperty("items").EnumerateArray().Select(u => u.GetProperty("serial").GetString()!));
    }

    [Fact]
    public async Task A_number_is_taken_once_within_a_device()
    {
        var scene = await LotScene.NewAsync(lab, 1);

        await (await scene.Engineer.PostAsJsonAsync("/api/lots", new { deviceId = scene.DeviceId, number = scene.LotNumber, size = 3 }))
            .ShouldRefuseAsync(HttpStatusCode.Conflict, "lotExists");
        var other = await LotScene.NewAsync(lab, 1);
        await (await scene.Engineer.PostAsJsonAsync("/api/lots", new { deviceId = other.DeviceId, number = scene.LotNumber, size = 3 })).ShouldBeAsync(HttpStatusCode.Created);
    }

    [Fact]
    public async Task Of_many_who_open_the_same_lot_at_once_one_does()
    {
        var scene = await LotScene.NewAsync(lab, 1);
        var number = Lab.Unique("race");

        var answers = await Task.WhenAll(Enumerable.Range(0, 6).Select(_ =>
            scene.Engineer.PostAsJsonAsync("/api/lots", new { deviceId = scene.DeviceId, number, size = 3, serials = new[] { "a", "b" } })));

        Assert.Equal(1, answers.Count(a => a.StatusCode == HttpStatusCode.Created));
        foreach (var answer in answers.Where(a => a.StatusCode != HttpStatusCode.Created))
            await answer.ShouldRefuseAsync(HttpStatusCode.Conflict, "lotExists");
    }

    [Theory]
    [InlineData("""{"number":"x","size":1}""", "deviceId")]
    [InlineData("""{"deviceId":"{device}","number":" ","size":1}""", "number")]
    [InlineData("""{"deviceId":"{device}","number":"x","size":0}""", "size")]
    [InlineData("""{"deviceId":"{device}","number":"x","size":100001}""", "size")]
    [InlineData("""{"deviceId":"{device}","number":"x"}""", "size")]
    [InlineData("""{"deviceId":"{device}","number":"x","size":1,"serials":["a","b"]}""", "serials")]
    [InlineData("""{"deviceId":"{device}","number":"x","size":5,"serials":["a"," a"]}""", "serials")]
    [InlineData("""{"deviceId":"{device}","number":"x","size":5,"serials":["a",""]}""", "serials[1]")]
    [InlineData("""{"deviceId":"0198c0de-0000-7000-8000-000000000000","number":"x","size":5}""", "deviceId")]
    public async Task A_lot_that_cannot_stand_is_refused_by_the_field(string body, string field)
    {
        var scene = await LotScene.NewAsync(lab, 1);
        using var content = new StringContent(body.Replace("{device}", scene.DeviceId.ToString(), StringComparison.Ordinal), null, "application/json");

        var problem = await (await scene.Engineer.PostAsync("/api/lots", content)).ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity);

        Assert.True(problem.GetProperty("errors").TryGetProperty(field, out _), problem.ToString());
    }

    [Fact]
    public async Task A_serial_number_that_the_device_knows_keeps_its_unit()
    {
        var scene = await LotScene.NewAsync(lab, 2, ["same"]);
        var first = (await scene.UnitAsync("same")).GetProperty("unitId").GetGuid();

        await scene.NextLotAsync(2, ["same", "other"]);

        Assert.Equal(first, (await scene.UnitAsync("same")).GetProperty("unitId").GetGuid());
    }

    [Fact]
    public async Task Lots_are_listed_newest_first_page_by_page_by_device_state_and_search()
    {
        var scene = await LotScene.NewAsync(lab, 1, ["unit-of-the-first"]);
        var numbers = new List<string> { scene.LotNumber };
        for (var i = 0; i < 4; i++)
        {
            await scene.NextLotAsync(1);
            numbers.Insert(0, scene.LotNumber);
        }

        var serial = Lab.Unique("only here");
        await scene.SendAsync(serial, 0);
        await (await scene.DecideAsync("approve")).ShouldBeAsync(HttpStatusCode.Created);

        Assert.Equal(numbers, await NumbersAsync(scene, $"device={scene.DeviceId}&limit=2"));
        Assert.Equal(numbers, await NumbersAsync(scene, $"device={scene.PartNumber}"));
        Assert.Equal(numbers, await NumbersAsync(scene, $"device={scene.PartNumber}/A"));
        Assert.Empty(await NumbersAsync(scene, $"device={scene.PartNumber}/B"));
        Assert.Equal([numbers[0]], await NumbersAsync(scene, $"device={scene.PartNumber}&state=approved"));
        Assert.Equal(numbers[1..], await NumbersAsync(scene, $"device={scene.PartNumber}&state=open&limit=3"));
        Assert.Empty(await NumbersAsync(scene, $"device={scene.PartNumber}&state=rejected"));
        Assert.Equal([numbers[0]], await NumbersAsync(scene, $"search={Uri.EscapeDataString(serial)}"));
        Assert.Equal([numbers[4]], await NumbersAsync(scene, $"device={scene.PartNumber}&search=unit-of-the-first"));
        Assert.Contains(numbers[2], await NumbersAsync(scene, $"search={numbers[2].ToUpperInvariant()}"));
        Assert.Equal(numbers, await NumbersAsync(scene, $"search={scene.PartNumber.ToLowerInvariant()}"));
        Assert.Empty(await NumbersAsync(scene, "search=%25"));
    }

    [Theory]
    [InlineData("/api/lots?state=closed", "state")]
    [InlineData("/api/lots?limit=501", "limit")]
    [InlineData("/api/lots?cursor=nonsense", "cursor")]
    [InlineData("/api/lots?search=%00", "search")]
    [InlineData("/api/lots/{lot}/units?sort=height", "sort")]
    [InlineData("/api/lots/{lot}/overlay?quantity=height", "quantity")]
    [InlineData("/api/lots/{lot}/overlay?basis=none", "basis")]
    [InlineData("/api/lots/{lot}/overlay?points=1", "points")]
    [InlineData("/api/lots/{lot}/overlay?condition=none", "condition")]
    public async Task A_parameter_that_cannot_stand_is_refused(string path, string field)
    {
        var scene = await LotScene.NewAsync(lab, 1);

        var problem = await (await scene.Engineer.GetAsync(path.Replace("{lot}", scene.LotId.ToString(), StringComparison.Ordinal)))
            .ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity);

        Assert.True(problem.GetProperty("errors").TryGetProperty(field, out _), problem.ToString());
    }

    [Theory]
    [InlineData("")]
    [InlineData("/units")]
    [InlineData("/statistics")]
    [InlineData("/overlay")]
    [InlineData("/decisions")]
    public async Task A_lot_that_is_not_there_is_not_found(string path)
    {
        var auditor = await lab.SignInAsync("auditor");

        await (await auditor.GetAsync($"/api/lots/0198c0de-0000-7000-8000-000000000000{path}")).ShouldRefuseAsync(HttpStatusCode.NotFound, "notFound");
    }

    [Fact]
    public async Task An_auditor_opens_no_lots()
    {
        var scene = await LotScene.NewAsync(lab, 1);
        var auditor = await lab.SignInAsync("auditor");

        await (await auditor.PostAsJsonAsync("/api/lots", new { deviceId = scene.DeviceId, number = "x", size = 1 })).ShouldBeAsync(HttpStatusCode.Forbidden);
    }

    [Fact]
    public async Task A_lot_of_2000_units_is_paged_without_a_gap_or_a_repetition()
    {
        string[] serials = [.. Enumerable.Range(0, 2_000).Select(i => $"{i:0000}")];
        var scene = await LotScene.NewAsync(lab, 2_000, serials);
        await scene.SendAsync("0700", 3);
        await scene.SendAsync("0701", 0);

        foreach (var sort in new[] { "serial", "margin" })
        {
            var seen = new List<string>();
            string? cursor = null;
            do
            {
                var page = await scene.UnitsAsync($"?sort={sort}&limit=333{(cursor is null ? "" : $"&cursor={cursor}")}");
                seen.AddRange(page.GetProperty("items").EnumerateArray().Select(u => u.GetProperty("serial").GetString()!));
                cursor = page.GetProperty("next").GetString();
            }
            while (cursor is not null);

            Assert.Equal(serials, seen.Order(StringComparer.Ordinal));
            if (sort == "margin")
                Assert.Equal(("0700", "0701"), (seen[0], seen[^1]));
            else
                Assert.Equal(serials, seen);
        }
    }

    private static async Task<List<string>> NumbersAsync(LotScene scene, string query)
    {
        var numbers = new List<string>();
        string? cursor = null;
        do
        {
            var page = await scene.GetAsync($"/api/lots?{query}{(cursor is null ? "" : $"&cursor={cursor}")}");
            numbers.AddRange(page.GetProperty("items").EnumerateArray().Select(l => l.GetProperty("number").GetString()!));
            cursor = page.GetProperty("next").GetString();
        }
        while (cursor is not null);
        return numbers;
    }
}

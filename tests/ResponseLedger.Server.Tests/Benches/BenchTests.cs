using System.Net;
using System.Net.Http.Json;
using System.Text.Json;

namespace ResponseLedger.Server.Tests.Benches;

public sealed class BenchTests(Lab lab)
{
    [Fact]
    public async Task A_manager_makes_a_bench_that_everybody_sees()
    {
        var manager = await lab.SignInAsync("manager");
        var name = Lab.Unique("bench");

        var made = await (await manager.PostAsJsonAsync("/api/benches", new { name = $" {name} " })).ShouldBeAsync(HttpStatusCode.Created);
        Assert.Equal(name, made.GetProperty("name").GetString());
        Assert.Equal(JsonValueKind.Null, made.GetProperty("lastSeenAt").ValueKind);
        Assert.Equal(0, made.GetProperty("columns").GetArrayLength());

        var auditor = await lab.SignInAsync("auditor");
        var read = await (await auditor.GetAsync($"/api/benches/{made.GetProperty("id").GetGuid()}")).ShouldBeAsync(HttpStatusCode.OK);
        Assert.Equal(made.GetRawText(), read.GetRawText());
    }

    [Fact]
    public async Task A_name_belongs_to_one_bench_also_when_many_take_it_at_once()
    {
        var manager = await lab.SignInAsync("manager");
        var name = Lab.Unique("bench");

        var answers = await Task.WhenAll(Enumerable.Range(0, 5).Select(_ => manager.PostAsJsonAsync("/api/benches", new { name })));

        Assert.Single(answers, a => a.StatusCode == HttpStatusCode.Created);
        foreach (var answer in answers.Where(a => a.StatusCode != HttpStatusCode.Created))
            await answer.ShouldRefuseAsync(HttpStatusCode.Conflict, "benchExists");
    }

    [Fact]
    public async Task Only_a_manager_makes_benches_and_an_engineer_may_change_the_serial_pattern_alone()
    {
        var id = await NewBenchAsync();
        var engineer = await lab.SignInAsync("engineer");

        await (await engineer.PostAsJsonAsync("/api/benches", new { name = Lab.Unique("bench") })).ShouldBeAsync(HttpStatusCode.Forbidden);
        var changed = await (await engineer.PatchAsJsonAsync($"/api/benches/{id}", new { serialPattern = "SN(?<serial>[0-9]+)" })).ShouldBeAsync(HttpStatusCode.OK);
        Assert.Equal("SN(?<serial>[0-9]+)", changed.GetProperty("serialPattern").GetString());
        await (await engineer.PatchAsJsonAsync($"/api/benches/{id}", new { noiseFloorDb = -80.0 })).ShouldRefuseAsync(HttpStatusCode.Forbidden, "notAllowed");
        await (await engineer.PatchAsJsonAsync($"/api/benches/{id}", new { remark = "mine" })).ShouldRefuseAsync(HttpStatusCode.Forbidden, "notAllowed");
        await (await (await lab.SignInAsync("operator")).PatchAsJsonAsync($"/api/benches/{id}", new { serialPattern = "x" })).ShouldBeAsync(HttpStatusCode.Forbidden);
    }

    [Fact]
    public async Task What_is_left_out_stays_and_null_clears()
    {
        var id = await NewBenchAsync();
        var manager = await lab.SignInAsync("manager");

        await (await manager.PatchAsJsonAsync($"/api/benches/{id}", new { noiseFloorDb = -92.5, remark = "Hall 2\nAnalyser due in May", serialPattern = "[A-Z]+" })).ShouldBeAsync(HttpStatusCode.OK);
        var second = await (await manager.PatchAsJsonAsync($"/api/benches/{id}", new { serialPattern = (string?)null })).ShouldBeAsync(HttpStatusCode.OK);

        Assert.Equal(JsonValueKind.Null, second.GetProperty("serialPattern").ValueKind);
        Assert.Equal(-92.5, second.GetProperty("noiseFloorDb").GetDouble());
        Assert.Equal("Hall 2\nAnalyser due in May", second.GetProperty("remark").GetString());
    }

    [Theory]
    [InlineData("serialPattern", """{"serialPattern":"([A-Z"}""")]
    [InlineData("serialPattern", """{"serialPattern":"[0-9]*"}""")]
    [InlineData("serialPattern", """{"serialPattern":" "}""")]
    [InlineData("noiseFloorDb", """{"noiseFloorDb":1e9}""")]
    [InlineData("noiseFloorDb", """{"noiseFloorDb":"-80"}""")]
    public async Task A_setting_that_cannot_work_is_refused(string field, string body)
    {
        var id = await NewBenchAsync();
        var manager = await lab.SignInAsync("manager");

        var answer = await manager.PatchAsync($"/api/benches/{id}", new StringContent(body, System.Text.Encoding.UTF8, "application/json"));

        var problem = await answer.ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity);
        Assert.True(problem.GetProperty("errors").TryGetProperty(field, out _), problem.GetRawText());
    }

    [Fact]
    public async Task Pages_give_every_bench_once_by_name()
    {
        var manager = await lab.SignInAsync("manager");
        var names = Enumerable.Range(0, 5).Select(_ => Lab.Unique("paged")).ToList();
        foreach (var name in names)
            await (await manager.PostAsJsonAsync("/api/benches", new { name })).ShouldBeAsync(HttpStatusCode.Created);

        var found = new List<string>();
        string? next = null;
        do
        {
            var page = await (await manager.GetAsync($"/api/benches?limit=2&cursor={next}")).ShouldBeAsync(HttpStatusCode.OK);
            found.AddRange(page.GetProperty("items").EnumerateArray().Select(b => b.GetProperty("name").GetString()!));
            next = page.GetProperty("next").GetString();
        }
        while (next is not null);

        Assert.Equal(found.Order(StringComparer.Ordinal), found);
        Assert.Equal(names.Order(StringComparer.Ordinal), found.Where(names.Contains));
    }

    [Fact]
    public async Task Changes_at_once_are_kept_one_after_the_other_or_told_to_come_again()
    {
        var id = await NewBenchAsync();
        var manager = await lab.SignInAsync("manager");

        var answers = await Task.WhenAll(Enumerable.Range(0, 6).Select(i => manager.PatchAsJsonAsync($"/api/benches/{id}", new { remark = $"remark {i}" })));

        Assert.Contains(answers, a => a.StatusCode == HttpStatusCode.OK);
        foreach (var answer in answers.Where(a => a.StatusCode != HttpStatusCode.OK))
            await answer.ShouldRefuseAsync(HttpStatusCode.Conflict, "changedMeanwhile");
    }

    [Fact]
    public async Task Serials_are_found_in_names_as_an_upload_from_the_bench_would()
    {
        var id = await NewBenchAsync();
        var oper = await lab.SignInAsync("operator");
        string[] fileNames = ["A7_1.csv", "run SN0012.txt", "plain.csv", "_.csv"];

        var usual = await (await oper.PostAsJsonAsync($"/api/benches/{id}/serials", new { fileNames })).ShouldBeAsync(HttpStatusCode.OK);
        Assert.Equal(["A7", "run SN0012", "plain", null], Serials(usual));

        await (await (await lab.SignInAsync("engineer")).PatchAsJsonAsync($"/api/benches/{id}", new { serialPattern = "SN(?<serial>[0-9]+)" })).ShouldBeAsync(HttpStatusCode.OK);
        var byPattern = await (await oper.PostAsJsonAsync($"/api/benches/{id}/serials", new { fileNames })).ShouldBeAsync(HttpStatusCode.OK);
        Assert.Equal([null, "0012", null, null], Serials(byPattern));
        await (await oper.PostAsJsonAsync($"/api/benches/{id}/serials", new { fileNames = Array.Empty<string>() })).ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity);
        await (await oper.PostAsJsonAsync("/api/benches/0199aaaa-0000-7000-8000-000000000002/serials", new { fileNames })).ShouldBeAsync(HttpStatusCode.NotFound);
    }

    private static string?[] Serials(JsonElement answer) => [.. answer.GetProperty("items").EnumerateArray().Select(item => item.GetProperty("serial").GetString())];

    private async Task<Guid> NewBenchAsync()
    {
        var manager = await lab.SignInAsync("manager");
        return (await (await manager.PostAsJsonAsync("/api/benches", new { name = Lab.Unique("bench") })).ShouldBeAsync(HttpStatusCode.Created)).GetProperty("id").GetGuid();
    }
}

using System.Net;
using System.Net.Http.Json;
using System.Text.Json;

namespace ResponseLedger.Server.Tests.Devices;

public sealed class DeviceTests(Lab lab)
{
    [Fact]
    public async Task A_new_device_has_the_condition_standard_and_the_usual_rules()
    {
        var device = (await lab.NewDeviceAsync()).Body;

        Assert.Equal("standard", Assert.Single(device.GetProperty("conditions").EnumerateArray()).GetProperty("name").GetString());
        Assert.Equal("V/V", device.GetProperty("gainUnit").GetString());
        Assert.Equal(JsonValueKind.Null, device.GetProperty("criticalPhaseDeg").ValueKind);
        Assert.Equal("simple", device.GetProperty("decisionRule").GetString());
        Assert.False(device.GetProperty("signingNeedsQuality").GetBoolean());
        Assert.False(device.GetProperty("signingNeedsTwo").GetBoolean());
        Assert.False(device.GetProperty("signingExcludesOwnRuns").GetBoolean());
        Assert.Equal(JsonValueKind.Null, device.GetProperty("retestsAllowed").ValueKind);
    }

    [Theory]
    [InlineData(null, -180)]
    [InlineData(0, 0)]
    [InlineData(-180, -180)]
    public async Task A_loop_has_a_critical_phase(int? stated, int expected)
    {
        var engineer = await lab.SignInAsync("engineer");

        var body = await (await engineer.PostAsJsonAsync("/api/devices", new { partNumber = Lab.Unique("LOOP"), revision = "1", title = "Servo", kind = "loop", criticalPhaseDeg = stated }))
            .ShouldBeAsync(HttpStatusCode.Created);

        Assert.Equal(expected, body.GetProperty("criticalPhaseDeg").GetInt32());
    }

    [Fact]
    public async Task Texts_are_trimmed_and_a_device_is_found_again_by_its_address()
    {
        var engineer = await lab.SignInAsync("engineer");
        var part = Lab.Unique("TRIM");

        var answer = await engineer.PostAsJsonAsync("/api/devices", new { partNumber = $"  {part} ", revision = " B ", title = " Preamplifier ", kind = "transfer", gainUnit = " V/Pa " });
        var made = await answer.ShouldBeAsync(HttpStatusCode.Created);
        var read = await (await engineer.GetAsync(answer.Headers.Location)).ShouldBeAsync(HttpStatusCode.OK);

        Assert.Equal(made.GetRawText(), read.GetRawText());
        Assert.Equal((part, "B", "Preamplifier", "V/Pa"), (
            read.GetProperty("partNumber").GetString(), read.GetProperty("revision").GetString(), read.GetProperty("title").GetString(), read.GetProperty("gainUnit").GetString()));
    }

    [Theory]
    [InlineData("partNumber", """{"partNumber":"A/B","revision":"1","title":"t","kind":"transfer"}""")]
    [InlineData("partNumber", """{"partNumber":"  ","revision":"1","title":"t","kind":"transfer"}""")]
    [InlineData("partNumber", """{"partNumber":"A\u0007B","revision":"1","title":"t","kind":"transfer"}""")]
    [InlineData("partNumber", """{"revision":"1","title":"t","kind":"transfer"}""")]
    [InlineData("revision", """{"partNumber":"A","revision":"","title":"t","kind":"transfer"}""")]
    [InlineData("title", """{"partNumber":"A","revision":"1","title":"a\nb","kind":"transfer"}""")]
    [InlineData("kind", """{"partNumber":"A","revision":"1","title":"t","kind":"Transfer"}""")]
    [InlineData("criticalPhaseDeg", """{"partNumber":"A","revision":"1","title":"t","kind":"transfer","criticalPhaseDeg":-180}""")]
    [InlineData("criticalPhaseDeg", """{"partNumber":"A","revision":"1","title":"t","kind":"loop","criticalPhaseDeg":90}""")]
    [InlineData("gainUnit", """{"partNumber":"A","revision":"1","title":"t","kind":"loop","gainUnit":" "}""")]
    public async Task A_device_that_cannot_stand_is_refused_by_field(string field, string body)
    {
        var engineer = await lab.SignInAsync("engineer");

        var problem = await (await engineer.PostAsync("/api/devices", Json(body))).ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity);

        Assert.True(problem.GetProperty("errors").TryGetProperty(field, out _), problem.GetRawText());
    }

    [Fact]
    public async Task Names_end_at_one_hundred_characters()
    {
        var engineer = await lab.SignInAsync("engineer");
        var fits = Lab.Unique("L").PadRight(100, 'x');

        await (await engineer.PostAsJsonAsync("/api/devices", new { partNumber = fits, revision = "1", title = "t", kind = "transfer" })).ShouldBeAsync(HttpStatusCode.Created);
        await (await engineer.PostAsJsonAsync("/api/devices", new { partNumber = fits + "x", revision = "1", title = "t", kind = "transfer" })).ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity);
    }

    [Fact]
    public async Task Of_many_who_make_the_same_device_at_once_one_makes_it()
    {
        var engineer = await lab.SignInAsync("engineer");
        var request = new { partNumber = Lab.Unique("SAME"), revision = "1", title = "t", kind = "transfer" };

        var answers = await Task.WhenAll(Enumerable.Range(0, 6).Select(_ => engineer.PostAsJsonAsync("/api/devices", request)));

        Assert.Single(answers, a => a.StatusCode == HttpStatusCode.Created);
        foreach (var answer in answers.Where(a => a.StatusCode != HttpStatusCode.Created))
            await answer.ShouldRefuseAsync(HttpStatusCode.Conflict, "deviceExists");
    }

    [Fact]
    public async Task A_search_finds_part_number_and_title_whatever_their_case_and_takes_signs_literally()
    {
        var engineer = await lab.SignInAsync("engineer");
        var stem = Lab.Unique("FIND");
        foreach (var (part, title) in new[] { ($"{stem}-100%", "Board"), ($"{stem}-1000", "Preamplifier of the hydrophone"), ($"{stem}-X", $"like {stem}_100") })
            await (await engineer.PostAsJsonAsync("/api/devices", new { partNumber = part, revision = "1", title, kind = "transfer" })).ShouldBeAsync(HttpStatusCode.Created);

        async Task<int> CountAsync(string search)
            => (await (await engineer.GetAsync($"/api/devices?search={Uri.EscapeDataString(search)}")).ShouldBeAsync(HttpStatusCode.OK)).GetProperty("items").GetArrayLength();

        Assert.Equal(3, await CountAsync(stem.ToLowerInvariant()));
        Assert.Equal(1, await CountAsync($"{stem}-100%"));
        Assert.Equal(1, await CountAsync($"{stem}_100"));
        Assert.Equal(0, await CountAsync($"{stem}-nothing"));
    }

    [Fact]
    public async Task Pages_give_every_device_once_in_the_order_of_part_number_and_revision()
    {
        var engineer = await lab.SignInAsync("engineer");
        var stem = Lab.Unique("PAGE");
        foreach (var (part, revision) in new[] { ("b", "2"), ("B", "1"), ("a", "1"), ("b", "10"), ("b", "1") })
            await (await engineer.PostAsJsonAsync("/api/devices", new { partNumber = $"{stem}{part}", revision, title = "t", kind = "transfer" })).ShouldBeAsync(HttpStatusCode.Created);

        var found = new List<string>();
        string? next = null;
        do
        {
            var page = await (await engineer.GetAsync($"/api/devices?search={stem}&limit=2&cursor={next}")).ShouldBeAsync(HttpStatusCode.OK);
            found.AddRange(page.GetProperty("items").EnumerateArray().Select(d => $"{d.GetProperty("partNumber").GetString()![stem.Length..]}/{d.GetProperty("revision").GetString()}"));
            next = page.GetProperty("next").GetString();
        }
        while (next is not null);

        Assert.Equal(["B/1", "a/1", "b/1", "b/10", "b/2"], found);
        await (await engineer.GetAsync("/api/devices?cursor=abc")).ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity);
        await (await engineer.GetAsync("/api/devices?limit=501")).ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity);
    }

    [Fact]
    public async Task Operators_and_auditors_read_devices_and_change_none()
    {
        var device = await lab.NewDeviceAsync();
        foreach (var role in new[] { "operator", "auditor", "quality" })
        {
            var person = await lab.SignInAsync(role);
            await (await person.GetAsync($"/api/devices/{device.Id}")).ShouldBeAsync(HttpStatusCode.OK);
            await (await person.PatchAsJsonAsync($"/api/devices/{device.Id}", new { title = "Mine" })).ShouldBeAsync(HttpStatusCode.Forbidden);
            await (await person.PostAsJsonAsync($"/api/devices/{device.Id}/conditions", new { name = "hot" })).ShouldBeAsync(HttpStatusCode.Forbidden);
        }
    }

    [Fact]
    public async Task An_unknown_device_is_not_found()
    {
        var engineer = await lab.SignInAsync("engineer");
        var nothing = Guid.CreateVersion7(TimeProvider.System.GetUtcNow());

        await (await engineer.GetAsync($"/api/devices/{nothing}")).ShouldRefuseAsync(HttpStatusCode.NotFound, "notFound");
        await (await engineer.GetAsync($"/api/devices/{nothing}/conditions")).ShouldRefuseAsync(HttpStatusCode.NotFound, "notFound");
        await (await engineer.GetAsync($"/api/devices/{nothing}/golden")).ShouldRefuseAsync(HttpStatusCode.NotFound, "notFound");
        await (await engineer.PatchAsJsonAsync($"/api/devices/{nothing}", new { title = "t" })).ShouldRefuseAsync(HttpStatusCode.NotFound, "notFound");
        await (await engineer.PostAsJsonAsync($"/api/devices/{nothing}/conditions", new { name = "hot" })).ShouldRefuseAsync(HttpStatusCode.NotFound, "notFound");
    }

    private static StringContent Json(string body) => new(body, System.Text.Encoding.UTF8, "application/json");
}

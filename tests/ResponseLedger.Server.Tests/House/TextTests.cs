using System.Net;
using System.Net.Http.Json;
using System.Text;
using Microsoft.AspNetCore.Routing;
using Microsoft.Extensions.DependencyInjection;
using ResponseLedger.Server.Runs.Upload;
using ResponseLedger.Server.Tests.Devices;
using ResponseLedger.Server.Tests.Masks;
using ResponseLedger.Server.Tests.Runs;

namespace ResponseLedger.Server.Tests.House;

/// <summary>Texts that nothing can keep, or that deceive whoever reads them, are refused by their field everywhere.</summary>
public sealed class TextTests(Lab lab)
{
    private const string UnknownId = "0199aaaa-0000-7000-8000-000000000001";

    /// <summary>A zero character, a line break, a line separator and an override of direction, as JSON writes them.</summary>
    public static TheoryData<string> BadInNames => [@"a\u0000b", @"a\nb", @"a\u2028b", @"a\u202Eb", @"a\u2066b"];

    [Theory]
    [MemberData(nameof(BadInNames))]
    public async Task Every_name_is_one_plain_line(string name)
    {
        var device = await lab.NewDeviceAsync();
        var findings = new List<string>();
        (string Role, string Method, string Address, string Body, string Field)[] requests =
        [
            ("manager", "POST", "/api/people", $$"""{"email":"{{name}}@example.test","name":"N"}""", "email"),
            ("manager", "POST", "/api/people", $$"""{"email":"n@example.test","name":"{{name}}"}""", "name"),
            ("manager", "PATCH", $"/api/people/{UnknownId}", $$"""{"name":"{{name}}"}""", "name"),
            ("manager", "POST", "/api/tokens", $$"""{"name":"{{name}}","scopes":["read"]}""", "name"),
            ("manager", "POST", "/api/tokens", $$"""{"name":"N","scopes":["read"],"bench":"{{name}}"}""", "bench"),
            ("manager", "POST", "/api/benches", $$"""{"name":"{{name}}"}""", "name"),
            ("manager", "PATCH", $"/api/benches/{UnknownId}", $$"""{"serialPattern":"{{name}}"}""", "serialPattern"),
            ("manager", "POST", "/api/session", $$"""{"email":"{{name}}@x","password":"p"}""", "email"),
            ("engineer", "POST", "/api/devices", $$"""{"partNumber":"{{name}}","revision":"A","title":"T","kind":"loop"}""", "partNumber"),
            ("engineer", "POST", "/api/devices", $$"""{"partNumber":"P","revision":"{{name}}","title":"T","kind":"loop"}""", "revision"),
            ("engineer", "PATCH", $"/api/devices/{device.Id}", $$"""{"title":"{{name}}"}""", "title"),
            ("engineer", "POST", $"/api/devices/{device.Id}/conditions", $$"""{"name":"{{name}}"}""", "name"),
            ("engineer", "POST", "/api/lots", $$"""{"deviceId":"{{device.Id}}","number":"{{name}}","size":1}""", "number"),
            ("engineer", "POST", "/api/lots", $$"""{"deviceId":"{{device.Id}}","number":"N","size":1,"serials":["{{name}}"]}""", "serials[0]"),
            ("engineer", "POST", $"/api/devices/{device.Id}/masks", $$"""{"title":"{{name}}","limits":[],"requirements":[]}""", "title"),
            ("engineer", "POST", $"/api/devices/{device.Id}/masks", Mask($$"""{"name":"{{name}}","quantity":"gainDb","side":"upper","basis":"absolute","corners":[]}"""), "limits[0].name"),
            ("engineer", "POST", $"/api/devices/{device.Id}/masks", Mask("", $$"""{"name":"{{name}}","measure":"peak","parameters":{},"output":"gainDb"}"""), "requirements[0].name"),
            ("engineer", "POST", $"/api/devices/{device.Id}/masks", Mask("", $$"""{"name":"N","measure":"{{name}}","parameters":{},"output":"gainDb"}"""), "requirements[0].measure"),
            ("engineer", "POST", $"/api/devices/{device.Id}/masks", Mask("", $$"""{"name":"N","measure":"peak","parameters":{},"output":"{{name}}"}"""), "requirements[0].output"),
            ("engineer", "POST", $"/api/runs/{UnknownId}/invalidation", $$"""{"cause":"{{name}}","reason":"R"}""", "cause"),
            ("engineer", "POST", $"/api/runs/{UnknownId}/reassignment", $$"""{"serial":"{{name}}","reason":"R"}""", "serial"),
        ];
        foreach (var (role, method, address, body, field) in requests)
        {
            var client = await lab.SignInAsync(role);
            using var request = new HttpRequestMessage(new HttpMethod(method), address) { Content = new StringContent(body, Encoding.UTF8, "application/json") };
            using var response = await client.SendAsync(request);
            var answer = await response.Content.ReadAsStringAsync();
            if (response.StatusCode != HttpStatusCode.UnprocessableEntity || !answer.Contains($"\"{field}\":[", StringComparison.Ordinal))
                findings.Add($"{method} {address} {body} answered {(int)response.StatusCode}: {answer}");
        }

        Assert.True(findings.Count == 0, string.Join(Environment.NewLine, findings));
    }

    [Fact]
    public async Task A_reason_may_have_lines_and_a_mask_with_ordinary_names_is_taken()
    {
        var device = await lab.NewDeviceAsync();
        var draft = await lab.DraftAsync(device.Id, MaskJson.Rich);
        var engineer = await lab.SignInAsync("engineer");

        await (await engineer.PostAsJsonAsync($"/api/masks/{draft.GetProperty("id").GetString()}/release", new { reason = "Agreed\n\twith the customer" })).ShouldBeAsync(HttpStatusCode.OK);
        await (await engineer.PostAsJsonAsync($"/api/masks/{draft.GetProperty("id").GetString()}/release", new { reason = "Agreed\0" })).ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity);
    }

    [Fact]
    public async Task No_query_of_any_route_takes_a_control_character()
    {
        var findings = new List<string>();
        var manager = await lab.SignInAsync("manager");
        foreach (var route in lab.Services.GetRequiredService<EndpointDataSource>().Endpoints.OfType<RouteEndpoint>()
            .Where(e => e.Metadata.GetRequiredMetadata<HttpMethodMetadata>().HttpMethods.Contains("GET") && e.RoutePattern.RawText!.StartsWith("/api", StringComparison.Ordinal)))
        {
            var address = string.Join('/', route.RoutePattern.PathSegments.Select(s => s.IsSimple && s.Parts[0].IsLiteral ? ((Microsoft.AspNetCore.Routing.Patterns.RoutePatternLiteralPart)s.Parts[0]).Content : UnknownId));
            foreach (var query in new[] { "search=%00", "cursor=%0A", "anything=a%00b", "a%00b=1" })
            {
                using var response = await manager.GetAsync($"/{address}?{query}");
                var answer = await response.Content.ReadAsStringAsync();
                if (response.StatusCode != HttpStatusCode.UnprocessableEntity || !answer.Contains("\"errors\":{", StringComparison.Ordinal))
                    findings.Add($"/{address}?{query} answered {(int)response.StatusCode}: {answer}");
            }
        }

        Assert.True(findings.Count == 0, string.Join(Environment.NewLine, findings));
        await (await lab.Anonymous().GetAsync("/api/devices?search=%00")).ShouldRefuseAsync(HttpStatusCode.Unauthorized);
    }

    [Fact]
    public async Task A_long_file_name_is_cut_between_characters_and_never_within_one()
    {
        var scene = await RunScene.NewAsync(lab, mask: false);
        var name = $"S1_{new string('x', 251)}😀.csv";

        var run = await scene.RunAsync(await scene.AcceptedAsync(name, RunScene.Csv(0, name)));

        Assert.Equal($"S1_{new string('x', 251)}", run.GetProperty("files")[0].GetProperty("name").GetString());
    }

    [Theory]
    [InlineData("a\u202Eb.csv", "ab.csv")]
    [InlineData("a\u2028b\0c.csv", "abc.csv")]
    [InlineData("C:\\sweeps\\😀.csv", "😀.csv")]
    public void A_file_name_is_kept_as_one_plain_line_of_whole_characters(string sent, string kept)
    {
        Assert.Equal(kept, PartFileName.Clean(sent));
        Assert.Equal($"\uFFFD{kept}", PartFileName.Clean($"\uD83D{sent[(sent.LastIndexOf('\\') + 1)..]}"));
    }

    [Fact]
    public async Task A_pattern_that_cuts_a_character_in_two_finds_no_serial_number()
    {
        var scene = await RunScene.NewAsync(lab, mask: false);
        var manager = await lab.SignInAsync("manager");
        var bench = await (await manager.PostAsJsonAsync("/api/benches", new { name = scene.Bench })).ShouldBeAsync(HttpStatusCode.Created);
        await (await manager.PatchAsJsonAsync($"/api/benches/{bench.GetProperty("id").GetString()}", new { serialPattern = "^." })).ShouldBeAsync(HttpStatusCode.OK);

        var result = await scene.SendOneAsync("😀.csv", RunScene.Csv(0));

        Assert.Equal(["serialNotFound"], RunScene.Codes(result, "issues"));
    }

    private static string Mask(string limit, string requirement = "") => $$"""{"title":"T","limits":[{{limit}}],"requirements":[{{requirement}}]}""";
}

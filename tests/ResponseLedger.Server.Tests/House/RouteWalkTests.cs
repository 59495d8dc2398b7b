using System.Net;
using System.Text;
using System.Text.RegularExpressions;
using Microsoft.AspNetCore.Routing;
using Microsoft.Extensions.DependencyInjection;

namespace ResponseLedger.Server.Tests.House;

/// <summary>Walks every route that the server has, as every caller and with every common mistake.</summary>
public sealed partial class RouteWalkTests(Lab lab)
{
    private const string UnknownId = "0199aaaa-0000-7000-8000-000000000001";

    [Fact]
    public void Every_route_is_in_the_table()
        => Assert.Empty(Routes().Except(RouteTable.Policies.Keys));

    [Fact]
    public async Task Each_caller_gets_as_far_as_the_policy_says_and_never_a_redirect_or_a_fault()
    {
        var findings = new List<string>();
        foreach (var caller in RouteTable.Callers)
        {
            using var client = await CallerAsync(caller);

            // Signing out comes last, for it ends the caller's session.
            foreach (var route in Routes().OrderBy(r => r == "DELETE /api/session").ThenBy(r => r, StringComparer.Ordinal))
            {
                var policy = RouteTable.Policies.GetValueOrDefault(route, "read");
                using var response = await client.SendAsync(Request(route, "{}"));
                var status = (int)response.StatusCode;
                var admitted = RouteTable.Admits[policy].Contains(caller);
                var expected = admitted ? "anything but 401, 403" : caller == "nobody" ? "401" : "403";

                // An empty sign-in is refused by validation, so a 401 never comes of the walk's body.
                if (admitted ? status is 401 or 403 : status != (caller == "nobody" ? 401 : 403))
                    findings.Add($"{caller}: {route} answered {status}, expected {expected}");
                await CheckFormAsync($"{caller}: {route}", response, findings);
            }
        }

        Assert.True(findings.Count == 0, string.Join(Environment.NewLine, findings));
    }

    [Fact]
    public async Task Without_the_header_every_unsafe_route_answers_400_before_it_asks_who_is_there()
    {
        var findings = new List<string>();
        using var client = lab.Server.Client(withHeader: false);
        foreach (var route in Unsafe())
        {
            using var response = await client.SendAsync(Request(route, "{}"));
            if (response.StatusCode != HttpStatusCode.BadRequest)
                findings.Add($"{route} answered {(int)response.StatusCode}");
            await CheckFormAsync(route, response, findings);
        }

        Assert.True(findings.Count == 0, string.Join(Environment.NewLine, findings));
    }

    [Theory]
    [InlineData("Origin", "https://elsewhere.example")]
    [InlineData("Origin", "null")]
    [InlineData("Sec-Fetch-Site", "cross-site")]
    [InlineData("Sec-Fetch-Site", "same-site")]
    public async Task From_another_site_every_unsafe_route_answers_403(string header, string value)
    {
        var findings = new List<string>();
        var client = await lab.SignInAsync("manager");
        foreach (var route in Unsafe())
        {
            var request = Request(route, "{}");
            request.Headers.Add(header, value);
            using var response = await client.SendAsync(request);
            if (response.StatusCode != HttpStatusCode.Forbidden)
                findings.Add($"{route} answered {(int)response.StatusCode}");
            await CheckFormAsync(route, response, findings);
        }

        Assert.True(findings.Count == 0, string.Join(Environment.NewLine, findings));
    }

    [Fact]
    public async Task An_unknown_id_is_not_found()
    {
        var findings = new List<string>();
        var client = await lab.SignInAsync("manager");
        foreach (var route in Routes().Where(r => r.StartsWith("GET", StringComparison.Ordinal) && r.Contains("{id}", StringComparison.Ordinal)))
        {
            using var response = await client.SendAsync(Request(route, null));
            if (response.StatusCode != HttpStatusCode.NotFound)
                findings.Add($"{route} answered {(int)response.StatusCode}");
            await CheckFormAsync(route, response, findings);
        }

        Assert.True(findings.Count == 0, string.Join(Environment.NewLine, findings));
    }

    [Theory]
    [InlineData("{\"cut\":")]
    [InlineData("[]")]
    [InlineData("null")]
    [InlineData("")]
    [InlineData("\"text\"")]
    public async Task A_bad_body_is_a_refusal_and_never_a_fault(string body)
    {
        var findings = new List<string>();
        var (_, client) = await lab.NewPersonAsync("manager");
        foreach (var route in Unsafe().Where(r => !r.StartsWith("DELETE", StringComparison.Ordinal)))
        {
            using var response = await client.SendAsync(Request(route, body));
            if ((int)response.StatusCode is not (400 or 404 or 415 or 422 or 428))
                findings.Add($"{route} answered {(int)response.StatusCode}: {await response.Content.ReadAsStringAsync()}");
            await CheckFormAsync(route, response, findings);
        }

        client.Dispose();
        Assert.True(findings.Count == 0, string.Join(Environment.NewLine, findings));
    }

    [Fact]
    public async Task The_description_names_every_route_of_the_api()
    {
        var description = await (await lab.Anonymous().GetAsync("/openapi/v1.json")).ShouldBeAsync(HttpStatusCode.OK);

        var described = description.GetProperty("paths").EnumerateObject()
            .SelectMany(path => path.Value.EnumerateObject().Select(operation => $"{operation.Name.ToUpperInvariant()} {path.Name}")).ToHashSet();
        Assert.Empty(Routes().Where(route => route.Contains(" /api/", StringComparison.Ordinal)).Except(described));
    }

    private List<string> Routes()
        => [.. lab.Services.GetRequiredService<EndpointDataSource>().Endpoints.OfType<RouteEndpoint>()
            .SelectMany(e => e.Metadata.GetRequiredMetadata<HttpMethodMetadata>().HttpMethods.Select(method => $"{method} {Plain(e.RoutePattern.RawText!)}"))
            .Where(route => !route.StartsWith("HEAD ", StringComparison.Ordinal))
            .Distinct()
            .Order(StringComparer.Ordinal)];

    private IEnumerable<string> Unsafe() => Routes().Where(route => !route.StartsWith("GET ", StringComparison.Ordinal));

    private async Task<HttpClient> CallerAsync(string caller) => caller switch
    {
        "nobody" => lab.Anonymous(),
        "none" => (await lab.NewPersonAsync()).Client,
        _ when caller.StartsWith("token:", StringComparison.Ordinal) => await lab.TokenAsync([caller[6..]]),
        _ => (await lab.NewPersonAsync(caller)).Client,
    };

    private static HttpRequestMessage Request(string route, string? body)
    {
        var (method, pattern) = (route[..route.IndexOf(' ', StringComparison.Ordinal)], route[(route.IndexOf(' ', StringComparison.Ordinal) + 1)..]);
        var address = Parameter().Replace(pattern.Replace("{documentName}", "v1", StringComparison.Ordinal), UnknownId);
        var request = new HttpRequestMessage(new HttpMethod(method), address);
        if (body is not null && method is not ("GET" or "DELETE"))
            request.Content = new StringContent(body, Encoding.UTF8, "application/json");
        return request;
    }

    private static async Task CheckFormAsync(string what, HttpResponseMessage response, List<string> findings)
    {
        var status = (int)response.StatusCode;
        if (status is >= 300 and < 400 or >= 500)
            findings.Add($"{what} answered {status}: {await response.Content.ReadAsStringAsync()}{FaultLog.Last}");
        if (status >= 400 && response.Content.Headers.ContentType?.MediaType != "application/problem+json")
            findings.Add($"{what} answered {status} without problem details");
    }

    private static string Plain(string pattern) => Constraint().Replace("/" + pattern.Trim('/'), "{$1}");

    [GeneratedRegex(@"\{(\w+)(:[^}]*)?\}")]
    private static partial Regex Constraint();

    [GeneratedRegex(@"\{\w+\}")]
    private static partial Regex Parameter();
}

using System.Buffers.Text;
using System.Net;
using System.Net.Http.Json;
using System.Text;
using Microsoft.AspNetCore.Identity;
using Microsoft.Extensions.DependencyInjection;

namespace ResponseLedger.Server.Tests.House;

/// <summary>What a problem document says of requests that cannot be read.</summary>
public sealed class ProblemTests(Lab lab)
{
    [Theory]
    [InlineData("/api/devices?limit=abc", "limit")]
    [InlineData("/api/devices?limit=", "limit")]
    [InlineData("/api/devices?limit=2147483648", "limit")]
    [InlineData("/api/runs?limit=abc", "limit")]
    [InlineData("/api/lots?limit=1.5", "limit")]
    [InlineData("/api/people?limit=abc", "limit")]
    [InlineData("/api/ledger/entries?after=9223372036854775808", "after")]
    [InlineData("/api/ledger/entries?after=1&limit=x", "limit")]
    [InlineData("/api/lots/0199aaaa-0000-7000-8000-000000000001/overlay?points=many", "points")]
    [InlineData("/api/runs/0199aaaa-0000-7000-8000-000000000001/file?index=one", "index")]
    public async Task A_number_in_a_query_that_cannot_be_read_is_told_by_its_name(string address, string field)
    {
        var manager = await lab.SignInAsync("manager");

        var problem = await (await manager.GetAsync(address)).ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity, "invalid");

        Assert.True(problem.GetProperty("errors").TryGetProperty(field, out _), problem.ToString());
    }

    [Theory]
    [InlineData("/api/devices")]
    [InlineData("/api/lots")]
    [InlineData("/api/runs")]
    [InlineData("/api/benches")]
    [InlineData("/api/people")]
    [InlineData("/api/tokens")]
    public async Task A_cursor_that_the_list_did_not_give_is_refused(string list)
    {
        var manager = await lab.SignInAsync("manager");
        string[] made =
        [
            "nonsense", "%", "0", "AAAA", "\u00E9", Encoded("{}"), Encoded("null"), Encoded("[]"), Encoded("7"), Encoded("\"x\""), Encoded("{\"Id\":1}"),
            Encoded("{\"PartNumber\":null,\"Revision\":null}"), Encoded("{\"PartNumber\":\"a\\u0000\",\"Revision\":\"b\"}"), Encoded("{\"PartNumber\":\"a\"}"),
            Encoded("{\"Name\":null}"), Encoded("{\"Name\":\"\\u0000\"}"), Encoded("{\"Name\":\"\\ud800\"}"), Encoded("{ \"Name\":\"a\"}"), Encoded("{\"ReceivedNo\":1e99}"),
        ];
        foreach (var cursor in made)
        {
            using var response = await manager.GetAsync($"{list}?cursor={Uri.EscapeDataString(cursor)}");
            var problem = await response.ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity);
            Assert.True(problem.GetProperty("errors").TryGetProperty("cursor", out _), problem.ToString());
        }
    }

    [Theory]
    [InlineData("""{"email":"a@example.te""")]
    [InlineData("""{"email":"a@example.test","name":""")]
    [InlineData("""{"email":"a@example.test","name":tru""")]
    [InlineData("""{"email":"a@example.test","roles":["operator","quali""")]
    [InlineData("""{"email":"a@example.test"}}""")]
    public async Task A_body_that_is_no_JSON_is_400_and_no_member_is_to_blame(string body)
    {
        var manager = await lab.SignInAsync("manager");

        var problem = await (await manager.PostAsync("/api/people", new StringContent(body, Encoding.UTF8, "application/json"))).ShouldRefuseAsync(HttpStatusCode.BadRequest, "badRequest");

        Assert.False(problem.TryGetProperty("errors", out _), problem.ToString());
    }

    [Theory]
    [InlineData("PATCH", """{"retestsAllowed":""")]
    [InlineData("PATCH", """{"retestsAllowed":1""")]
    public async Task A_member_that_may_be_left_out_is_not_blamed_for_a_cut_either(string method, string body)
    {
        var manager = await lab.SignInAsync("manager");
        using var request = new HttpRequestMessage(new HttpMethod(method), "/api/devices/0199aaaa-0000-7000-8000-000000000001") { Content = new StringContent(body, Encoding.UTF8, "application/json") };

        await (await manager.SendAsync(request)).ShouldRefuseAsync(HttpStatusCode.BadRequest, "badRequest");
    }

    [Fact]
    public async Task A_member_of_another_type_is_named()
    {
        var manager = await lab.SignInAsync("manager");

        var problem = await (await manager.PostAsJsonAsync("/api/people", new { email = 1 })).ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity, "invalid");

        Assert.True(problem.GetProperty("errors").TryGetProperty("email", out _), problem.ToString());
    }

    [Fact]
    public async Task A_body_over_the_limit_is_told_the_limit_of_its_address()
    {
        var manager = await lab.SignInAsync("manager");

        using var response = await manager.PostAsJsonAsync("/api/devices", new { title = new string('x', 1 << 21) });

        var problem = await response.ShouldRefuseAsync(HttpStatusCode.RequestEntityTooLarge, "tooLarge");
        Assert.Contains("1 MiB", problem.GetProperty("detail").GetString(), StringComparison.Ordinal);
        Assert.DoesNotContain("files", problem.GetProperty("detail").GetString(), StringComparison.Ordinal);
    }

    [Theory]
    [InlineData("GET", "/api/no-such-route")]
    [InlineData("PUT", "/api/devices")]
    [InlineData("GET", "/api/lots/0199aaaa-0000-7000-8000-000000000001")]
    [InlineData("GET", "/api/devices?limit=0")]
    [InlineData("POST", "/api/devices")]
    [InlineData("POST", "/api/runs")]
    public async Task Every_problem_has_a_blank_type_a_code_and_a_sentence(string method, string address)
    {
        var manager = await lab.SignInAsync("manager");
        using var request = new HttpRequestMessage(new HttpMethod(method), address);
        if (method == "POST")
            request.Content = new StringContent("{", Encoding.UTF8, "application/json");

        AssertComplete(await (await manager.SendAsync(request)).ShouldBeProblemAsync());
        AssertComplete(await (await lab.Anonymous().SendAsync(new HttpRequestMessage(new HttpMethod(method), address))).ShouldBeProblemAsync());
    }

    [Fact]
    public async Task A_fault_says_that_it_is_one_and_stands_in_the_log()
    {
        await using var own = await Lab.StartAsync(adjust: builder => builder.Services.AddSingleton<ILookupNormalizer, Failing>());

        using var response = await own.Anonymous().PostAsJsonAsync("/api/session", new { email = Failing.Email, password = "p" });

        Assert.Equal(HttpStatusCode.InternalServerError, response.StatusCode);
        var problem = await response.ShouldBeProblemAsync();
        AssertComplete(problem);
        Assert.Equal("fault", problem.GetProperty("code").GetString());
        Assert.DoesNotContain(Failing.Secret, problem.ToString(), StringComparison.Ordinal);
        Assert.Contains(Failing.Secret, FaultLog.Last, StringComparison.Ordinal);
    }

    private static string Encoded(string json) => Base64Url.EncodeToString(Encoding.UTF8.GetBytes(json));

    private static void AssertComplete(System.Text.Json.JsonElement problem)
    {
        Assert.Equal("about:blank", problem.GetProperty("type").GetString());
        Assert.NotEmpty(problem.GetProperty("code").GetString()!);
        Assert.EndsWith(".", problem.GetProperty("detail").GetString(), StringComparison.Ordinal);
        Assert.NotEmpty(problem.GetProperty("title").GetString()!);
    }

    private sealed class Failing : ILookupNormalizer
    {
        public const string Email = "failing@example.test";
        public const string Secret = "the normalizer broke";

        public string? NormalizeName(string? name) => name == Email ? throw new InvalidOperationException(Secret) : name?.ToUpperInvariant();

        public string? NormalizeEmail(string? email) => NormalizeName(email);
    }
}

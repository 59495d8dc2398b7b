using System.Net;
using System.Net.Http.Json;
using System.Security.Cryptography;
using System.Security.Cryptography.X509Certificates;
using Microsoft.AspNetCore.Hosting;
using ResponseLedger.TestDatabase;

namespace ResponseLedger.Server.Tests.House;

public sealed class HeaderTests(Lab lab)
{
    [Theory]
    [InlineData("/")]
    [InlineData("/api/about")]
    [InlineData("/api/session")]
    [InlineData("/api/no-such-route")]
    [InlineData("/health/live")]
    public async Task Every_answer_keeps_the_browser_strict(string address)
    {
        using var client = lab.Anonymous();
        using var response = await client.GetAsync(address);

        var policy = Assert.Single(response.Headers.GetValues("Content-Security-Policy"));
        Assert.StartsWith("default-src 'none'; script-src 'self'", policy, StringComparison.Ordinal);
        Assert.DoesNotContain("unsafe", policy, StringComparison.Ordinal);
        Assert.Contains("frame-ancestors 'none'", policy, StringComparison.Ordinal);
        Assert.Equal("nosniff", Assert.Single(response.Headers.GetValues("X-Content-Type-Options")));
        Assert.Equal("same-origin", Assert.Single(response.Headers.GetValues("Cross-Origin-Opener-Policy")));
        Assert.NotEmpty(response.Headers.GetValues("Referrer-Policy"));
        Assert.NotEmpty(response.Headers.GetValues("Permissions-Policy"));
        Assert.False(response.Headers.Contains("Server"));
        Assert.False(response.Headers.Contains("Strict-Transport-Security"));
    }

    [Fact]
    public async Task The_shell_is_asked_for_each_time_and_its_files_have_the_version_in_their_address()
    {
        using var client = lab.Anonymous();
        using var shell = await client.GetAsync("/");
        var html = await shell.Content.ReadAsStringAsync();

        Assert.Equal("no-cache", shell.Headers.CacheControl!.ToString());
        Assert.DoesNotContain("{version}", html, StringComparison.Ordinal);
        Assert.DoesNotContain(" style=", html, StringComparison.Ordinal);
        using var again = new HttpRequestMessage(HttpMethod.Get, "/");
        again.Headers.IfNoneMatch.Add(shell.Headers.ETag!);
        Assert.Equal(HttpStatusCode.NotModified, (await client.SendAsync(again)).StatusCode);

        // An address that ends in a slash is a row of the import map that stands for a folder.
        foreach (var address in html.Split('"').Where(part => part.StartsWith("/a/", StringComparison.Ordinal) && !part.EndsWith('/')))
        {
            using var file = await client.GetAsync(address);
            Assert.True(file.StatusCode == HttpStatusCode.OK, $"{address} answered {(int)file.StatusCode}");
            Assert.True(file.Content.Headers.ContentLength > 0, address);
        }
    }

    [Theory]
    [InlineData("/lots")]
    [InlineData("/lots/0199aaaa-0000-7000-8000-000000000001?quantity=phase")]
    [InlineData("/sign-in")]
    [InlineData("/no-such-page")]
    public async Task A_browser_that_asks_for_a_page_gets_the_shell_at_every_address(string address)
    {
        using var client = lab.Anonymous();
        using var request = new HttpRequestMessage(HttpMethod.Get, address);
        request.Headers.Add("Accept", "text/html,application/xhtml+xml,*/*;q=0.8");

        using var response = await client.SendAsync(request);

        Assert.Equal(HttpStatusCode.OK, response.StatusCode);
        Assert.Equal("text/html", response.Content.Headers.ContentType?.MediaType);
        Assert.Contains("<script type=\"importmap\">", await response.Content.ReadAsStringAsync(), StringComparison.Ordinal);
    }

    [Theory]
    [InlineData("/api/no-such-route", "text/html")]
    [InlineData("/health/none", "text/html")]
    [InlineData("/openapi/none", "text/html")]
    [InlineData("/a/x/none.js", "text/html")]
    [InlineData("/lots", "application/json")]
    [InlineData("/lots", "*/*")]
    public async Task A_program_and_an_address_of_the_API_get_no_shell(string address, string accept)
    {
        using var client = lab.Anonymous();
        using var request = new HttpRequestMessage(HttpMethod.Get, address);
        request.Headers.Add("Accept", accept);

        await (await client.SendAsync(request)).ShouldRefuseAsync(HttpStatusCode.NotFound);
    }

    [Theory]
    [InlineData("br")]
    [InlineData("gzip")]
    public async Task Files_of_the_pages_are_compressed_and_answers_of_the_API_never_are(string encoding)
    {
        using var client = lab.Anonymous();
        client.DefaultRequestHeaders.Add("Accept-Encoding", encoding);
        var html = await (await lab.Anonymous().GetAsync("/")).Content.ReadAsStringAsync();
        foreach (var address in html.Split('"').Where(part => part.StartsWith("/a/", StringComparison.Ordinal) && (part.EndsWith(".js", StringComparison.Ordinal) || part.EndsWith(".css", StringComparison.Ordinal))))
        {
            using var file = await client.GetAsync(address);
            Assert.True(file.Content.Headers.ContentEncoding.SequenceEqual([encoding]), address);
            Assert.Contains("Accept-Encoding", file.Headers.Vary);
        }

        using var shell = await client.GetAsync("/");
        Assert.Equal([encoding], shell.Content.Headers.ContentEncoding);
        foreach (var address in new[] { "/api/about", "/api/session", "/health/live", "/openapi/v1.json" })
        {
            using var answer = await client.GetAsync(address);
            Assert.Empty(answer.Content.Headers.ContentEncoding);
        }
    }

    [Theory]
    [InlineData("/a/x/../../appsettings.json")]
    [InlineData("/a/x/%2e%2e/ResponseLedger.sln")]
    [InlineData("/a/x/none.js")]
    [InlineData("/appsettings.json")]
    public async Task Nothing_but_the_pages_files_is_served(string address)
    {
        using var client = lab.Anonymous();

        await (await client.GetAsync(address)).ShouldRefuseAsync(HttpStatusCode.NotFound);
    }

    [Fact]
    public async Task The_cookie_is_closed_to_scripts_and_other_sites_and_has_no_prefix_that_plain_http_refuses()
    {
        using var client = lab.Anonymous();
        using var response = await client.PostAsJsonAsync("/api/session", new { email = Lab.ManagerEmail, password = Lab.Password });

        var cookie = Assert.Single(response.Headers.GetValues("Set-Cookie"));
        Assert.StartsWith("responseledger=", cookie, StringComparison.Ordinal);
        Assert.Contains("; httponly", cookie, StringComparison.OrdinalIgnoreCase);
        Assert.Contains("; samesite=strict", cookie, StringComparison.OrdinalIgnoreCase);
        Assert.DoesNotContain("; secure", cookie, StringComparison.OrdinalIgnoreCase);
        Assert.DoesNotContain("expires=", cookie, StringComparison.OrdinalIgnoreCase);
    }

    [Fact]
    public async Task On_https_the_cookie_is_secure_and_the_browser_is_told_to_stay_there()
    {
        using var key = ECDsa.Create(ECCurve.NamedCurves.nistP256);
        var now = TimeProvider.System.GetUtcNow();
        using var certificate = new CertificateRequest("CN=127.0.0.1", key, HashAlgorithmName.SHA256).CreateSelfSigned(now.AddMinutes(-5), now.AddHours(1));
        await using var store = await TestDatabases.CreateAsync();
        var settings = StartTests.Settings(store);
        settings["urls"] = "https://127.0.0.1:0";
        await using var server = await RunningServer.StartAsync(settings, builder => builder.WebHost.ConfigureKestrel(kestrel => kestrel.ConfigureHttpsDefaults(https => https.ServerCertificate = certificate)));
        using var handler = new HttpClientHandler { UseCookies = false, ServerCertificateCustomValidationCallback = (_, shown, _, _) => shown?.Thumbprint == certificate.Thumbprint };
        using var client = new HttpClient(handler) { BaseAddress = server.Address };
        client.DefaultRequestHeaders.Add("X-ResponseLedger", "1");
        while ((await client.GetAsync("/health/ready")).StatusCode != HttpStatusCode.OK)
            await Task.Delay(20);

        using var response = await client.PostAsJsonAsync("/api/session", new { email = Lab.ManagerEmail, password = Lab.Password });

        await response.ShouldBeAsync(HttpStatusCode.NoContent);
        Assert.Contains("; secure", Assert.Single(response.Headers.GetValues("Set-Cookie")), StringComparison.OrdinalIgnoreCase);
        Assert.True(response.Headers.Contains("Strict-Transport-Security"));
    }

    [Fact]
    public async Task A_body_over_one_mebibyte_is_refused_where_no_files_are_sent()
    {
        var manager = await lab.SignInAsync("manager");

        using var response = await manager.PostAsJsonAsync("/api/people", new { email = "big@example.test", name = new string('x', 1 << 21) });

        await response.ShouldRefuseAsync(HttpStatusCode.RequestEntityTooLarge, "tooLarge");
    }
}

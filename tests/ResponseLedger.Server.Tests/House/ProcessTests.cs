using System.Diagnostics;
using System.Net;
using System.Net.Http.Json;
using System.Text.RegularExpressions;
using ResponseLedger.TestDatabase;

namespace ResponseLedger.Server.Tests.House;

/// <summary>The server as a process of its own: what it says on the console and how it ends.</summary>
public sealed class ProcessTests
{
    private static readonly TimeSpan Longest = TimeSpan.FromSeconds(60);

    [Fact]
    public async Task Without_a_password_in_the_settings_a_one_time_password_is_printed_and_must_be_changed_at_once()
    {
        await using var store = await TestDatabases.CreateAsync();
        using var process = Start(new()
        {
            ["ASPNETCORE_URLS"] = "http://127.0.0.1:0",
            ["ConnectionStrings__Ledger"] = store.ServerConnectionString,
            ["ConnectionStrings__LedgerOwner"] = store.OwnerConnectionString,
            ["RESPONSELEDGER_ADMIN_EMAIL"] = "first@example.test",
            ["RESPONSELEDGER_DEMO"] = "0",
        });
        try
        {
            var printed = await UntilAsync(process, "one-time password: (\\S+)");
            var address = Regex.Match(printed.Before, "Now listening on: (\\S+)").Groups[1].Value;
            await UntilAsync(process, "ResponseLedger is ready");
            using var client = new HttpClient { BaseAddress = new Uri(address) };
            client.DefaultRequestHeaders.Add("X-ResponseLedger", "1");
            var oneTime = printed.Match.Groups[1].Value;

            await (await client.PostAsJsonAsync("/api/session", new { email = "first@example.test", password = oneTime })).ShouldBeAsync(HttpStatusCode.NoContent);
            await (await client.GetAsync("/api/people")).ShouldRefuseAsync(HttpStatusCode.Forbidden, "passwordChangeDue");
            await (await client.PostAsJsonAsync("/api/session/password", new { current = oneTime, @new = Lab.Password })).ShouldBeAsync(HttpStatusCode.NoContent);
            await (await client.GetAsync("/api/people")).ShouldBeAsync(HttpStatusCode.OK);
        }
        finally
        {
            process.Kill();
            await process.WaitForExitAsync();
        }
    }

    [Theory]
    [InlineData("RESPONSELEDGER_DEMO", "maybe", "RESPONSELEDGER_DEMO")]
    [InlineData("RESPONSELEDGER_ADMIN_PASSWORD", "short", "at least 15 characters")]
    [InlineData("ConnectionStrings__Ledger", "Host=127.0.0.1;Port=1;Username=nobody;Database=ledger", "database")]
    [InlineData("ConnectionStrings__Ledger", "Hots=127.0.0.1", "connection string")]
    [InlineData("ASPNETCORE_URLS", "http://192.0.2.1:1", "192.0.2.1")]
    public async Task A_start_that_fails_says_why_in_one_message_and_ends_with_1(string key, string value, string told)
    {
        await using var store = await TestDatabases.CreateAsync();
        using var process = Start(new()
        {
            ["ASPNETCORE_URLS"] = "http://127.0.0.1:0",
            ["ConnectionStrings__Ledger"] = store.ServerConnectionString,
            ["ConnectionStrings__LedgerOwner"] = key == "ConnectionStrings__Ledger" ? null : store.OwnerConnectionString,
            ["RESPONSELEDGER_ADMIN_EMAIL"] = "first@example.test",
            [key] = value,
        });
        var output = process.StandardOutput.ReadToEndAsync();
        var errors = await process.StandardError.ReadToEndAsync().WaitAsync(Longest);
        await process.WaitForExitAsync();

        Assert.Equal(1, process.ExitCode);
        Assert.StartsWith("ResponseLedger cannot start: ", errors, StringComparison.Ordinal);
        Assert.Contains(told, errors, StringComparison.OrdinalIgnoreCase);
        Assert.Single(errors.Split('\n', StringSplitOptions.RemoveEmptyEntries));
        await output;
    }

    private static Process Start(Dictionary<string, string?> environment)
    {
        var start = new ProcessStartInfo("dotnet", [Path.Combine(AppContext.BaseDirectory, "ResponseLedger.Server.dll")])
        {
            RedirectStandardOutput = true,
            RedirectStandardError = true,
        };
        foreach (var (key, value) in environment)
            start.Environment[key] = value;
        return Process.Start(start)!;
    }

    private static async Task<(Match Match, string Before)> UntilAsync(Process process, string pattern)
    {
        using var timeout = new CancellationTokenSource(Longest);
        var before = "";
        while (await process.StandardOutput.ReadLineAsync(timeout.Token) is { } line)
        {
            before += line + "\n";
            if (Regex.Match(line, pattern) is { Success: true } match)
                return (match, before);
        }

        throw new InvalidOperationException($"The server ended before it said \"{pattern}\": {before}{await process.StandardError.ReadToEndAsync(timeout.Token)}");
    }
}

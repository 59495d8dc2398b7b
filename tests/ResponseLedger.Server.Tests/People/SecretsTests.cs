using System.Collections.Concurrent;
using System.Net;
using System.Net.Http.Json;
using Microsoft.Extensions.Logging;
using Npgsql;

namespace ResponseLedger.Server.Tests.People;

public sealed class SecretsTests
{
    [Fact]
    public async Task Passwords_tokens_and_cookies_stay_out_of_the_log_and_of_the_ledger()
    {
        var log = new Captured();
        await using var lab = await Lab.StartAsync(adjust: builder => builder.Logging.AddProvider(log).AddFilter<Captured>(null, LogLevel.Trace).SetMinimumLevel(LogLevel.Trace));
        using var client = lab.Anonymous();
        using var signIn = await client.PostAsJsonAsync("/api/session", new { email = Lab.ManagerEmail, password = Lab.Password });
        var cookie = signIn.Headers.GetValues("Set-Cookie").Single().Split(';')[0]["responseledger=".Length..];
        await client.PostAsJsonAsync("/api/session", new { email = Lab.ManagerEmail, password = "a wrong one, not to be kept" });
        var person = await (await client.PostAsJsonAsync("/api/people", new { email = "p@example.test", name = "P" })).ShouldBeAsync(HttpStatusCode.Created);
        var token = await (await client.PostAsJsonAsync("/api/tokens", new { name = "t", scopes = new[] { "read" } })).ShouldBeAsync(HttpStatusCode.Created);
        client.DefaultRequestHeaders.Authorization = new("Bearer", token.GetProperty("token").GetString());
        await (await client.GetAsync("/api/ledger/entries")).ShouldBeAsync(HttpStatusCode.OK);
        string[] secrets =
        [
            Lab.Password, "a wrong one, not to be kept", cookie, person.GetProperty("oneTimePassword").GetString()!, token.GetProperty("token").GetString()![^43..],
            new NpgsqlConnectionStringBuilder(lab.Store.ServerConnectionString).Password!,
        ];

        Assert.NotEmpty(log.Lines);
        Assert.Contains(log.Lines, line => line.Contains("/api/tokens", StringComparison.Ordinal));
        foreach (var secret in secrets)
            Assert.DoesNotContain(log.Lines, line => line.Contains(secret, StringComparison.Ordinal));
        await using var connection = new NpgsqlConnection(lab.Store.OwnerConnectionString);
        await connection.OpenAsync();
        await using var command = new NpgsqlCommand("select string_agg(convert_from(bytes, 'UTF8'), ' ') from ledger_entry", connection);
        var ledger = (string)(await command.ExecuteScalarAsync())!;
        Assert.Contains("token.created", ledger, StringComparison.Ordinal);
        foreach (var secret in secrets)
            Assert.DoesNotContain(secret, ledger, StringComparison.Ordinal);
    }

    private sealed class Captured : ILoggerProvider
    {
        public ConcurrentQueue<string> Lines { get; } = new();

        public ILogger CreateLogger(string categoryName) => new Writer(Lines);

        public void Dispose()
        {
        }

        private sealed class Writer(ConcurrentQueue<string> lines) : ILogger
        {
            public IDisposable? BeginScope<TState>(TState state)
                where TState : notnull => null;

            public bool IsEnabled(LogLevel logLevel) => true;

            public void Log<TState>(LogLevel logLevel, EventId eventId, TState state, Exception? exception, Func<TState, Exception?, string> formatter)
                => lines.Enqueue($"{formatter(state, exception)} {exception}");
        }
    }
}

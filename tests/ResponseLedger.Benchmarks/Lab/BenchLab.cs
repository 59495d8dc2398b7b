using System.Diagnostics;
using System.Net;
using System.Net.Http.Json;
using System.Runtime.InteropServices;
using System.Text.Json;
using Microsoft.AspNetCore.Builder;
using Microsoft.AspNetCore.Hosting.Server;
using Microsoft.AspNetCore.Hosting.Server.Features;
using Microsoft.Extensions.DependencyInjection;
using Microsoft.Extensions.Logging;
using Npgsql;
using ResponseLedger.Benchmarks.Measuring;
using ResponseLedger.Server.Start;
using ResponseLedger.Store.Acts;
using ResponseLedger.TestDatabase;

namespace ResponseLedger.Benchmarks.Lab;

/// <summary>How long a request took.</summary>
/// <param name="ServerMs">By the server, from its first middleware to its last.</param>
/// <param name="ClientMs">By the client, from sending to the whole answer.</param>
/// <param name="Status">The status.</param>
/// <param name="Body">The answer.</param>
internal sealed record TimedAnswer(double ServerMs, double ClientMs, HttpStatusCode Status, byte[] Body)
{
    public JsonElement Json => JsonDocument.Parse(Body).RootElement;
}

/// <summary>The real server on Kestrel in this process, on a database of its own, with a manager and a bench token.</summary>
internal sealed class BenchLab : IAsyncDisposable
{
    private const string Email = "manager@example.test";
    private const string Password = "four owls count the sweeps";

    private readonly TestStore store;
    private readonly House house;
    private readonly WebApplication app;
    private readonly ServerTimes times;
    private int unique;

    private BenchLab(TestStore store, House house, WebApplication app, ServerTimes times)
    {
        this.store = store;
        this.house = house;
        this.app = app;
        this.times = times;
        Manager = NewClient();
        Manager.DefaultRequestHeaders.Add("X-ResponseLedger", "1");
        Bench = NewClient();
    }

    public TestStore Store => store;

    public IServiceProvider Services => app.Services;

    /// <summary>A signed-in manager, by cookie.</summary>
    public HttpClient Manager { get; }

    /// <summary>A bench, by token.</summary>
    public HttpClient Bench { get; }

    public static async Task<BenchLab> StartAsync()
    {
        var store = await TestDatabases.CreateAsync();
        var settings = new Dictionary<string, string>
        {
            ["urls"] = "http://127.0.0.1:0",
            ["ConnectionStrings:Ledger"] = store.ServerConnectionString,
            ["ConnectionStrings:LedgerOwner"] = store.OwnerConnectionString,
            ["RESPONSELEDGER_ADMIN_EMAIL"] = Email,
            ["RESPONSELEDGER_ADMIN_PASSWORD"] = Password,
        };
        var builder = WebApplication.CreateBuilder(new WebApplicationOptions
        {
            ApplicationName = "ResponseLedger.Server",
            ContentRootPath = AppContext.BaseDirectory,
            EnvironmentName = "Production",
            Args = [.. settings.Select(s => $"--{s.Key}={s.Value}")],
        });
        builder.Logging.ClearProviders();
        var house = await House.OpenAsync(builder);
        var app = builder.Build();
        var times = new ServerTimes();
        app.Use(next => http => times.MeasureAsync(http, next));
        House.Use(app);

        // The server says on the console where it listens; here only tables belong there.
        var console = Console.Out;
        Console.SetOut(TextWriter.Null);
        await app.StartAsync();
        var lab = new BenchLab(store, house, app, times);
        await lab.ReadyAsync();
        Console.SetOut(console);

        await lab.PostAsync("/api/session", new { email = Email, password = Password });
        await lab.PostAsync("/api/benches", new { name = BenchName });
        var token = await lab.PostAsync("/api/tokens", new { name = "benchmark", scopes = new[] { "runs", "read" }, bench = BenchName });
        lab.Bench.DefaultRequestHeaders.Authorization = new("Bearer", token.GetProperty("token").GetString());
        return lab;
    }

    public const string BenchName = "Bay 1";

    /// <summary>A name that nothing else here has.</summary>
    public string Unique(string stem) => $"{stem}-{Interlocked.Increment(ref unique)}";

    public async Task DescribeAsync(Report report)
    {
        await using var connection = new NpgsqlConnection(Store.ServerConnectionString);
        await connection.OpenAsync();
        await using var ask = new NpgsqlCommand("select current_setting('fsync'), current_setting('synchronous_commit')", connection);
        await using var row = await ask.ExecuteReaderAsync();
        await row.ReadAsync();
        report.Table(
            ["machine", "value"],
            ["cores", Environment.ProcessorCount.ToString(System.Globalization.CultureInfo.InvariantCulture)],
            ["system", RuntimeInformation.OSDescription],
            [".NET", RuntimeInformation.FrameworkDescription],
            ["PostgreSQL", connection.PostgreSqlVersion.ToString()],
            ["fsync, synchronous_commit", $"{row.GetString(0)}, {row.GetString(1)}"],
            ["cluster in", Environment.GetEnvironmentVariable(TestDatabases.FolderVariable) ?? ""]);
    }

    /// <summary>Sends a request that makes or changes something as the manager; an answer that is no success ends the run.</summary>
    public async Task<JsonElement> PostAsync(string path, object body, HttpMethod? method = null)
    {
        using var request = new HttpRequestMessage(method ?? HttpMethod.Post, path) { Content = JsonContent.Create(body) };
        using var response = await Manager.SendAsync(request);
        var text = await response.Content.ReadAsStringAsync();
        if (!response.IsSuccessStatusCode)
            throw new InvalidOperationException($"{path} answered {(int)response.StatusCode}: {text}");
        return text.Length == 0 ? default : JsonDocument.Parse(text).RootElement;
    }

    /// <summary>Sends a request and takes both times of it.</summary>
    public async Task<TimedAnswer> TimeAsync(HttpClient client, HttpRequestMessage request)
    {
        var (id, serverMs) = times.Expect();
        request.Headers.Add(ServerTimes.Header, id);
        var start = Stopwatch.GetTimestamp();
        using var response = await client.SendAsync(request);
        var body = await response.Content.ReadAsByteArrayAsync();
        var clientMs = Stopwatch.GetElapsedTime(start).TotalMilliseconds;
        return new TimedAnswer(await serverMs, clientMs, response.StatusCode, body);
    }

    /// <summary>Gets a page or list that must be there.</summary>
    public async Task<TimedAnswer> GetAsync(HttpClient client, string path, string? accept = null)
    {
        using var request = new HttpRequestMessage(HttpMethod.Get, path);
        if (accept is not null)
            request.Headers.Add("Accept", accept);
        var answer = await TimeAsync(client, request);
        return answer.Status == HttpStatusCode.OK ? answer
            : throw new InvalidOperationException($"{path} answered {(int)answer.Status}: {System.Text.Encoding.UTF8.GetString(answer.Body)}");
    }

    /// <summary>One number that the store gives.</summary>
    public async Task<long> CountAsync(string sql)
    {
        await using var connection = new NpgsqlConnection(Store.OwnerConnectionString);
        await connection.OpenAsync();
#pragma warning disable CA2100 // The statements are constants of this project.
        await using var ask = new NpgsqlCommand(sql, connection) { CommandTimeout = 300 };
#pragma warning restore CA2100
        return Convert.ToInt64(await ask.ExecuteScalarAsync() ?? 0L, System.Globalization.CultureInfo.InvariantCulture);
    }

    /// <summary>Waits until every entry of the ledger has its position, so that the sequencer's own commits disturb no measurement.</summary>
    public async Task SettleAsync()
    {
        Services.GetRequiredService<LedgerSequencer>().Wake();
        while (await CountAsync("select count(*) from ledger_queue") > 0)
            await Task.Delay(2);
    }

    public async ValueTask DisposeAsync()
    {
        Manager.Dispose();
        Bench.Dispose();
        await app.StopAsync();
        await app.DisposeAsync();
        await house.DisposeAsync();
        await store.DisposeAsync();
    }

    private HttpClient NewClient()
    {
        var address = app.Services.GetRequiredService<IServer>().Features.Get<IServerAddressesFeature>()!.Addresses.First();
        return new HttpClient(new SocketsHttpHandler { CookieContainer = new CookieContainer() }) { BaseAddress = new Uri(address) };
    }

    private async Task ReadyAsync()
    {
        while ((await Manager.GetAsync("/health/ready")).StatusCode != HttpStatusCode.OK)
            await Task.Delay(20);
    }
}

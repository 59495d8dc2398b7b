using System.Net;
using System.Net.Http.Json;
using Microsoft.AspNetCore.Builder;
using Microsoft.Extensions.DependencyInjection;
using Microsoft.Extensions.Time.Testing;
using ResponseLedger.TestDatabase;

[assembly: AssemblyFixture(typeof(ResponseLedger.Server.Tests.Lab))]

namespace ResponseLedger.Server.Tests;

/// <summary>
/// A lab for tests: one server on one database for the whole assembly (take it by a constructor argument), with a person for
/// each role. A test owns its data by making names of its own (<see cref="Unique"/>). A test that needs another clock, other
/// settings or an empty ledger starts a lab of its own by <see cref="StartAsync"/>.
/// </summary>
public sealed class Lab : IAsyncLifetime
{
    public const string ManagerEmail = "manager@example.test";
    public const string Password = "four owls count the sweeps";

    private static int unique;

    private readonly Dictionary<string, string?> settings;
    private readonly Action<WebApplicationBuilder>? adjust;
    private readonly SemaphoreSlim turn = new(1, 1);
    private readonly Dictionary<string, HttpClient> clients = [];
    private TestStore? store;
    private RunningServer? server;

    public Lab()
        : this(null, null)
    {
    }

    private Lab(IReadOnlyDictionary<string, string?>? settings, Action<WebApplicationBuilder>? adjust)
    {
        this.settings = new(settings ?? new Dictionary<string, string?>());
        this.adjust = adjust;
    }

    /// <summary>The running server.</summary>
    public RunningServer Server => server ?? throw new InvalidOperationException("The lab has not started.");

    /// <summary>The server's services, for a look at the store.</summary>
    public IServiceProvider Services => Server.Services;

    /// <summary>The lab's database.</summary>
    public TestStore Store => store ?? throw new InvalidOperationException("The lab has not started.");

    /// <summary>The clock, where the lab was started with one.</summary>
    public FakeTimeProvider Clock => (FakeTimeProvider)Services.GetRequiredService<TimeProvider>();

    /// <summary>Starts a lab of a test's own.</summary>
    public static async Task<Lab> StartAsync(IReadOnlyDictionary<string, string?>? settings = null, FakeTimeProvider? clock = null, Action<WebApplicationBuilder>? adjust = null)
    {
        var lab = new Lab(settings, builder =>
        {
            if (clock is not null)
                builder.Services.AddSingleton<TimeProvider>(clock);
            adjust?.Invoke(builder);
        });
        await lab.InitializeAsync();
        return lab;
    }

    public async ValueTask InitializeAsync()
    {
        store = await TestDatabases.CreateAsync();
        var all = new Dictionary<string, string?>
        {
            ["urls"] = "http://127.0.0.1:0",
            ["ConnectionStrings:Ledger"] = store.ServerConnectionString,
            ["ConnectionStrings:LedgerOwner"] = store.OwnerConnectionString,
            ["RESPONSELEDGER_ADMIN_EMAIL"] = ManagerEmail,
            ["RESPONSELEDGER_ADMIN_PASSWORD"] = Password,
        };
        foreach (var (key, value) in settings)
            all[key] = value;
        server = await RunningServer.StartAsync(all, adjust);
        await server.ReadyAsync();
    }

    /// <summary>A name that no other test has.</summary>
    public static string Unique(string stem) => $"{stem}-{Interlocked.Increment(ref unique)}";

    /// <summary>A client without a session; it carries the header that unsafe requests need.</summary>
    public HttpClient Anonymous() => Server.Client();

    /// <summary>A client of the lab's person with this role: operator, engineer, quality, manager, auditor, or "none". One for the whole lab; do not sign it out or change its headers.</summary>
    public async Task<HttpClient> SignInAsync(string role)
    {
        await turn.WaitAsync();
        try
        {
            if (clients.TryGetValue(role, out var known))
                return known;

            var client = await SignInAsync(ManagerEmail, Password, "manager");
            if (role == "manager")
                return client;

            await MakePersonAsync(client, $"{role}@example.test", role == "none" ? [] : [role]);
            return await SignInAsync($"{role}@example.test", Password, role);
        }
        finally
        {
            turn.Release();
        }
    }

    /// <summary>Makes a person of a test's own, with <see cref="Password"/>, and signs in.</summary>
    public async Task<(string Email, HttpClient Client)> NewPersonAsync(params string[] roles)
    {
        var email = $"{Unique("person")}@example.test";
        await MakePersonAsync(await SignInAsync("manager"), email, roles);
        var client = Anonymous();
        await (await client.PostAsJsonAsync("/api/session", new { email, password = Password })).ShouldBeAsync(HttpStatusCode.NoContent);
        return (email, client);
    }

    /// <summary>A client of a new bench token with these scopes; bound to a bench only if one is named.</summary>
    public async Task<HttpClient> TokenAsync(IReadOnlyList<string>? scopes = null, string? bench = null)
    {
        var manager = await SignInAsync("manager");
        var made = await (await manager.PostAsJsonAsync("/api/tokens", new { name = Unique("token"), scopes = scopes ?? ["runs", "read"], bench })).ShouldBeAsync(HttpStatusCode.Created);
        var client = Server.Client(withHeader: false);
        client.DefaultRequestHeaders.Authorization = new("Bearer", made.GetProperty("token").GetString());
        return client;
    }

    public async ValueTask DisposeAsync()
    {
        foreach (var client in clients.Values)
            client.Dispose();
        turn.Dispose();
        if (server is not null)
            await server.DisposeAsync();
        if (store is not null)
            await store.DisposeAsync();
    }

    private async Task<HttpClient> SignInAsync(string email, string password, string role)
    {
        if (clients.TryGetValue(role, out var known))
            return known;

        var client = Anonymous();
        await (await client.PostAsJsonAsync("/api/session", new { email, password })).ShouldBeAsync(HttpStatusCode.NoContent);
        return clients[role] = client;
    }

    private static async Task MakePersonAsync(HttpClient manager, string email, string[] roles)
        => await (await manager.PostAsJsonAsync("/api/people", new { email, name = email.Split('@')[0], password = Password, roles })).ShouldBeAsync(HttpStatusCode.Created);
}

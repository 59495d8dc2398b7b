using System.Collections.Concurrent;
using System.Diagnostics;
using System.Globalization;
using System.Net;
using System.Net.Sockets;
using System.Text.Json;
using Npgsql;

namespace ResponseLedger.Server.Tests.MainJob;

/// <summary>The real server as a process of its own, on an embedded store in a data folder of a test's own, without the demo lab; it can be killed and started again.</summary>
internal sealed class ServerProcess : IAsyncDisposable
{
    private static readonly TimeSpan Longest = TimeSpan.FromMinutes(3);

    private readonly string dataFolder = Directory.CreateTempSubdirectory("responseledger-kill-").FullName;
    private readonly ConcurrentQueue<string> said = new();
    private Process? process;

    /// <summary>Where it listens, over all starts.</summary>
    public Uri Address { get; } = new($"http://127.0.0.1:{FreePort().ToString(CultureInfo.InvariantCulture)}");

    /// <summary>Whether the server's own process lives.</summary>
    public bool IsAlive => process is { HasExited: false };

    /// <summary>Everything that it said, over all starts.</summary>
    public string Said => string.Join('\n', said);

    /// <summary>The postmaster that runs in the data folder now, or 0.</summary>
    public int PostmasterId => PostmasterFile is [var id, ..] ? int.Parse(id, CultureInfo.InvariantCulture) : 0;

    private string[] PostmasterFile
    {
        get
        {
            var path = Path.Combine(dataFolder, "postgres", "postmaster.pid");
            return File.Exists(path) ? File.ReadAllLines(path) : [];
        }
    }

    /// <summary>Starts it, and waits until it is ready.</summary>
    public async Task StartAsync()
    {
        var start = new ProcessStartInfo("dotnet", [Path.Combine(AppContext.BaseDirectory, "ResponseLedger.Server.dll")])
        {
            RedirectStandardOutput = true,
            RedirectStandardError = true,
        };
        start.Environment["ASPNETCORE_URLS"] = Address.ToString();
        start.Environment["RESPONSELEDGER_DATA"] = dataFolder;
        start.Environment["RESPONSELEDGER_DEMO"] = "0";
        start.Environment["RESPONSELEDGER_ADMIN_EMAIL"] = Lab.ManagerEmail;
        start.Environment["RESPONSELEDGER_ADMIN_PASSWORD"] = Lab.Password;
        start.Environment.Remove("ConnectionStrings__Ledger");
        process = Process.Start(start)!;
        process.OutputDataReceived += (_, line) => said.Enqueue(line.Data ?? "");
        process.ErrorDataReceived += (_, line) => said.Enqueue(line.Data ?? "");
        process.BeginOutputReadLine();
        process.BeginErrorReadLine();
        await ReadyAsync();
    }

    /// <summary>Waits until it is ready; fails when it ends instead.</summary>
    public async Task ReadyAsync()
    {
        using var client = new HttpClient { BaseAddress = Address };
        var since = TimeProvider.System.GetTimestamp();
        while (!await IsReadyAsync(client))
        {
            Assert.True(IsAlive, $"The server ended:\n{Said}");
            Assert.True(TimeProvider.System.GetElapsedTime(since) < Longest, $"Not ready after {Longest}:\n{Said}");
            await Task.Delay(100);
        }
    }

    /// <summary>A client without a session, with cookies of its own; it carries the header that unsafe requests need.</summary>
    public HttpClient Client()
    {
        var client = new HttpClient(new SocketsHttpHandler { CookieContainer = new CookieContainer() }) { BaseAddress = Address };
        client.DefaultRequestHeaders.Add("X-ResponseLedger", "1");
        return client;
    }

    /// <summary>Connects to the store behind the server's back, as the owner of its tables.</summary>
    public async Task<NpgsqlConnection> OpenStoreAsync()
    {
        var secrets = JsonElement.Parse(await File.ReadAllBytesAsync(Path.Combine(dataFolder, "postgres.secrets.json")));
        var connection = new NpgsqlConnection(new NpgsqlConnectionStringBuilder
        {
            Host = "127.0.0.1",
            Port = int.Parse(PostmasterFile[3], CultureInfo.InvariantCulture),
            Database = "ledger",
            Username = "ledger_owner",
            Password = secrets.GetProperty("Owner").GetString(),
            Pooling = false,
        }.ConnectionString);
        await connection.OpenAsync();
        return connection;
    }

    /// <summary>SIGKILL, for what is named, all at the same moment.</summary>
    public async Task KillAsync(Victim victim)
    {
        var postmaster = PostmasterId;
        var backends = ChildrenOf(postmaster);
        if (victim is Victim.Server or Victim.ServerAndDatabase)
            process!.Kill();
        if (victim is Victim.Postmaster or Victim.Database or Victim.ServerAndDatabase)
            Kill(postmaster);
        if (victim is Victim.Database or Victim.ServerAndDatabase)
            backends.ForEach(Kill);
        if (victim is Victim.Server or Victim.ServerAndDatabase)
            await process!.WaitForExitAsync();
    }

    public async ValueTask DisposeAsync()
    {
        if (process is not null)
            await KillAsync(Victim.ServerAndDatabase);
        process?.Dispose();

        // What was killed lets go of its files a moment later.
        for (var attempt = 0; Directory.Exists(dataFolder); attempt++)
        {
            try
            {
                Directory.Delete(dataFolder, recursive: true);
            }
            catch (IOException) when (attempt < 100)
            {
                await Task.Delay(50);
            }
        }
    }

    private static async Task<bool> IsReadyAsync(HttpClient client)
    {
        try
        {
            using var response = await client.GetAsync("/health/ready");
            return response.StatusCode == HttpStatusCode.OK;
        }
        catch (HttpRequestException)
        {
            // It does not listen yet.
            return false;
        }
    }

    private static void Kill(int processId)
    {
        try
        {
            using var victim = Process.GetProcessById(processId);
            victim.Kill();
        }
        catch (Exception gone) when (gone is ArgumentException or InvalidOperationException)
        {
            // A backend that ended by itself in between.
        }
    }

    // The parent's number is the second field after the command, which stands in brackets and may hold anything.
    private static List<int> ChildrenOf(int parent)
    {
        var children = new List<int>();
        foreach (var folder in Directory.GetDirectories("/proc").Where(f => int.TryParse(Path.GetFileName(f), CultureInfo.InvariantCulture, out _)))
        {
            try
            {
                var stat = File.ReadAllText(Path.Combine(folder, "stat"));
                if (stat[(stat.LastIndexOf(')') + 2)..].Split(' ')[1] == parent.ToString(CultureInfo.InvariantCulture))
                    children.Add(int.Parse(Path.GetFileName(folder), CultureInfo.InvariantCulture));
            }
            catch (IOException)
            {
                // It ended while we looked.
            }
        }

        return children;
    }

    private static int FreePort()
    {
        using var probe = new TcpListener(IPAddress.Loopback, 0);
        probe.Start();
        return ((IPEndPoint)probe.LocalEndpoint).Port;
    }
}

/// <summary>What a kill -9 takes.</summary>
public enum Victim
{
    /// <summary>The server alone: its postmaster is left behind.</summary>
    Server,

    /// <summary>The postmaster alone: its backends outlive it for a moment, and the server goes on.</summary>
    Postmaster,

    /// <summary>The postmaster and all its backends; the server goes on.</summary>
    Database,

    /// <summary>Everything.</summary>
    ServerAndDatabase,
}

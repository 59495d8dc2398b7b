using System.Diagnostics;
using System.Net;
using System.Net.Sockets;
using ResponseLedger.Benchmarks.Measuring;

namespace ResponseLedger.Benchmarks.Start;

/// <summary>From starting the built server's process, with its embedded store, to the first 200 of /health/ready.</summary>
internal static class ReadinessBenchmark
{
    private static readonly TimeSpan Longest = TimeSpan.FromSeconds(120);

    public static async Task RunAsync(Report report, Effort effort)
    {
        var folder = Path.Combine(Path.GetTempPath(), "responseledger-bench-" + Guid.CreateVersion7(TimeProvider.System.GetUtcNow()).ToString("N"));
        try
        {
            var (first, existing, afterDeath) = (new Samples(), new Samples(), new Samples());
            first.Add(await StartAsync(folder, Quit.Asked));
            for (var i = 0; i < effort.Of(7, 1); i++)
                existing.Add(await StartAsync(folder, Quit.Asked));
            for (var i = 0; i < effort.Of(3, 0); i++)
            {
                await StartAsync(folder, Quit.Killed);
                afterDeath.Add(await StartAsync(folder, Quit.Asked));
            }

            string[][] rows =
            [
                Row("first start: cluster, tables, first manager", first),
                Row("existing store", existing),
                .. afterDeath.Count == 0 ? Array.Empty<string[]>() : [Row("existing store, after the server's kill -9", afterDeath)],
            ];
            report.Table(
                ["process start to /health/ready 200 (goal on an existing store: under 5 s)", "starts", "median ms", "slowest ms"],
                rows);
        }
        catch (InvalidOperationException failure)
        {
            report.Fail(failure.Message);
        }
        finally
        {
            if (Directory.Exists(folder))
                Directory.Delete(folder, recursive: true);
        }
    }

    private static string[] Row(string what, Samples samples)
        => [what, Report.Number(samples.Count), Report.Ms(samples.Median), Report.Ms(samples.Slowest)];

    private static async Task<double> StartAsync(string folder, Quit quit)
    {
        var address = new Uri($"http://127.0.0.1:{FreePort()}");
        var start = new ProcessStartInfo("dotnet", [Path.Combine(AppContext.BaseDirectory, "ResponseLedger.Server.dll")])
        {
            RedirectStandardOutput = true,
            RedirectStandardError = true,
        };
        start.Environment["ASPNETCORE_URLS"] = address.ToString();
        start.Environment["RESPONSELEDGER_DATA"] = folder;
        start.Environment["RESPONSELEDGER_DEMO"] = "0";
        start.Environment["RESPONSELEDGER_ADMIN_EMAIL"] = "manager@example.test";
        start.Environment["RESPONSELEDGER_ADMIN_PASSWORD"] = "four owls count the sweeps";
        var since = Stopwatch.GetTimestamp();
        using var process = Process.Start(start)!;
        var output = process.StandardOutput.ReadToEndAsync();
        var errors = process.StandardError.ReadToEndAsync();
        var ready = await ReadyAsync(process, address, since);
        var took = Stopwatch.GetElapsedTime(since).TotalMilliseconds;
        await EndAsync(process, quit);
        return !ready ? throw new InvalidOperationException($"The server did not become ready: {await output}{await errors}")
            : quit == Quit.Asked && process.ExitCode != 0 ? throw new InvalidOperationException($"The server ended with {process.ExitCode}: {await output}{await errors}")
            : took;
    }

    private static async Task<bool> ReadyAsync(Process process, Uri address, long since)
    {
        using var client = new HttpClient { BaseAddress = address };
        while (!process.HasExited && Stopwatch.GetElapsedTime(since) < Longest)
        {
            try
            {
                using var answer = await client.GetAsync("/health/ready");
                if (answer.StatusCode == HttpStatusCode.OK)
                    return true;
            }
            catch (HttpRequestException)
            {
                // It does not listen yet.
            }

            await Task.Delay(10);
        }

        return false;
    }

    // A server that is asked to end stops its PostgreSQL too; a killed one leaves it, and the next start meets it.
    private static async Task EndAsync(Process process, Quit quit)
    {
        if (process.HasExited)
            return;
        if (quit == Quit.Asked && !OperatingSystem.IsWindows())
            await Process.Start("kill", ["-TERM", process.Id.ToString(System.Globalization.CultureInfo.InvariantCulture)]).WaitForExitAsync();
        else
            process.Kill();
        await process.WaitForExitAsync();
    }

    private static int FreePort()
    {
        using var probe = new Socket(AddressFamily.InterNetwork, SocketType.Stream, ProtocolType.Tcp);
        probe.Bind(new IPEndPoint(IPAddress.Loopback, 0));
        return ((IPEndPoint)probe.LocalEndPoint!).Port;
    }

    private enum Quit
    {
        Asked,
        Killed,
    }
}

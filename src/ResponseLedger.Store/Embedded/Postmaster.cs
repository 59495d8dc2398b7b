using System.Diagnostics;
using System.Globalization;
using System.Net;
using System.Net.Sockets;
using System.Security.Cryptography;
using Microsoft.Extensions.Logging;

namespace ResponseLedger.Store.Embedded;

/// <summary>Starts and stops the postmaster of one cluster, whatever an earlier one left behind.</summary>
internal sealed class Postmaster(ClusterFolder folder, PostgresBinaries binaries, PostgresUser user, EmbeddedPostgresOptions options, BoundedLog log)
{
    private static readonly TimeSpan Poll = TimeSpan.FromMilliseconds(15);
    private static readonly TimeSpan BetweenAttempts = TimeSpan.FromMilliseconds(250);
    private static readonly TimeSpan StopTimeout = TimeSpan.FromSeconds(60);

    // What a start may meet that passes by itself: backends that outlived their postmaster and hold its shared memory,
    // a postmaster still on its way out, somebody on the port.
    private static readonly string[] Passing =
    [
        "pre-existing shared memory block", "lock file \"postmaster.pid\" already exists", "could not create any TCP/IP sockets",
    ];

    /// <summary>The loopback port; kept over restarts, since connection strings name it.</summary>
    public int Port { get; private set; } = FreePort();

    /// <summary>Starts it and waits until it takes connections.</summary>
    /// <param name="portMayChange">Whether another port may be tried when this one is taken.</param>
    /// <param name="cancellationToken">Gives up, and ends what was started.</param>
    /// <exception cref="EmbeddedPostgresException">It does not start; the message carries the end of its log.</exception>
    public async Task<Process> StartAsync(bool portMayChange, CancellationToken cancellationToken)
    {
        var since = options.Time.GetTimestamp();
        while (true)
        {
            var stalePid = await StopLeftoverAsync(cancellationToken);
            log.ForgetTail();
            var process = Process.Start(StartInfo(stalePid)) ?? throw new EmbeddedPostgresException($"{binaries.Postgres} could not be started.");
            process.StandardInput.Close();
            var copying = Task.WhenAll(log.CopyAsync(process.StandardError), log.CopyAsync(process.StandardOutput));
            try
            {
                if (await BecomesReadyAsync(process, cancellationToken))
                    return process;
            }
            catch
            {
                await StopAsync(process);
                throw;
            }

            // Orphaned backends may hold the pipe open after the postmaster's end.
            await Task.WhenAny(copying, Task.Delay(BetweenAttempts, options.Time, cancellationToken));
            process.Dispose();
            var said = log.Tail();
            if (!Passing.Any(said.Contains) || options.Time.GetElapsedTime(since) > options.StartTimeout)
                throw new EmbeddedPostgresException($"The embedded PostgreSQL in {folder.Root} does not start. The end of {log.Path}:\n{said}");
            if (portMayChange && said.Contains("could not create any TCP/IP sockets", StringComparison.Ordinal))
                Port = FreePort();
            await Task.Delay(BetweenAttempts, options.Time, cancellationToken);
        }
    }

    /// <summary>Stops it: open transactions are rolled back, everything is flushed.</summary>
    public async Task StopAsync(Process process)
    {
        if (!process.HasExited)
        {
            var said = await PgCtlStopAsync(CancellationToken.None);

            // One that has not written its file yet has touched nothing either.
            if (said.ExitCode != 0 && !process.HasExited)
                process.Kill();
            await process.WaitForExitAsync(CancellationToken.None);
        }

        process.Dispose();
    }

    /// <summary>
    /// Stops a postmaster that an earlier server left. It is stopped rather than adopted: only a child's death is told at once, and its
    /// settings may be those of an older version. Returns the process id in a file that nobody stands behind any more.
    /// </summary>
    public async Task<int?> StopLeftoverAsync(CancellationToken cancellationToken)
    {
        if (PostmasterFile.Read(folder.Cluster) is not { } file)
            return null;
        if (!await file.IsAliveAsync(folder.Cluster, user, cancellationToken))
            return file.ProcessId;
        options.Logger.LogWarning("A PostgreSQL of an earlier server (process {ProcessId}) still runs in {Folder}: stopping it", file.ProcessId, folder.Root);
        var said = await PgCtlStopAsync(cancellationToken);
        if (said.ExitCode != 0 && await file.IsAliveAsync(folder.Cluster, user, cancellationToken))
            throw new EmbeddedPostgresException($"The PostgreSQL of an earlier server (process {file.ProcessId}) in {folder.Root} does not stop: {said.Output}");
        return PostmasterFile.Read(folder.Cluster)?.ProcessId;
    }

    private Task<ProgramRun.Result> PgCtlStopAsync(CancellationToken cancellationToken)
        => ProgramRun.ToEndAsync(
            user.CommandLine(
                binaries.PgCtl, "stop", "-D", folder.Cluster, "-m", "fast", "-w", "-t", StopTimeout.TotalSeconds.ToString(CultureInfo.InvariantCulture)),
            cancellationToken);

    private async Task<bool> BecomesReadyAsync(Process process, CancellationToken cancellationToken)
    {
        var since = options.Time.GetTimestamp();
        var told = TimeSpan.Zero;
        while (!process.HasExited)
        {
            if (PostmasterFile.Read(folder.Cluster) is { IsReady: true } file && file.ProcessId == process.Id)
                return true;

            // Recovery after a crash takes as long as there is log to replay; giving up would only begin it again.
            if (options.Time.GetElapsedTime(since) - told > TimeSpan.FromSeconds(10))
            {
                told = options.Time.GetElapsedTime(since);
                options.Logger.LogInformation("PostgreSQL in {Folder} is still starting ({Seconds:F0} s), most likely recovering", folder.Root, told.TotalSeconds);
            }

            await Task.Delay(Poll, options.Time, cancellationToken);
        }

        return false;
    }

    private ProcessStartInfo StartInfo(int? stalePid)
    {
        string[] settings =
        [
            "listen_addresses=127.0.0.1", $"port={Port}", "unix_socket_directories=", $"max_connections={options.MaxConnections}",
            "fsync=on", "full_page_writes=on", "synchronous_commit=on", "timezone=UTC", "log_timezone=UTC",
            "logging_collector=off", "log_destination=stderr", "log_line_prefix=%m [%p] ",
        ];
        var start = ProgramRun.Prepare(user.CommandLineInOwnSession([binaries.Postgres, "-D", folder.Cluster, .. settings.SelectMany(s => new[] { "-c", s })]));

        // PostgreSQL takes its file for live when any process of its user, or a zombie, bears the number in it. We have seen that this
        // one is not its postmaster; told that it is its grandparent, PostgreSQL passes it over, and still examines the shared memory.
        if (stalePid is { } id)
            start.Environment["PG_GRANDPARENT_PID"] = id.ToString(CultureInfo.InvariantCulture);
        return start;
    }

    // Under the range from which systems give ports to outgoing connections, so that nobody sits on it at a restart; never 5432.
    private static int FreePort()
    {
        while (true)
        {
            var port = RandomNumberGenerator.GetInt32(15_500, 32_000);
            using var probe = new Socket(AddressFamily.InterNetwork, SocketType.Stream, ProtocolType.Tcp);
            try
            {
                probe.Bind(new IPEndPoint(IPAddress.Loopback, port));
                return port;
            }
            catch (SocketException e) when (e.SocketErrorCode is SocketError.AddressAlreadyInUse or SocketError.AccessDenied)
            {
                // Taken: the next one.
            }
        }
    }
}

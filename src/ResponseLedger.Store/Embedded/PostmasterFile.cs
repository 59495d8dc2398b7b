using System.Diagnostics;
using System.Globalization;

namespace ResponseLedger.Store.Embedded;

/// <summary>What <c>postmaster.pid</c> says. It is read and never deleted: PostgreSQL finds in it the shared memory of backends that outlived their postmaster.</summary>
/// <param name="ProcessId">The postmaster that wrote it.</param>
/// <param name="Status">What it says of itself: starting, ready, stopping; empty when it has not said yet.</param>
internal sealed record PostmasterFile(int ProcessId, string Status)
{
    private const int StatusLine = 7;

    public bool IsReady => Status == "ready";

    /// <summary>Reads the file of a cluster; null when there is none, or none that can be read as one.</summary>
    public static PostmasterFile? Read(string cluster)
    {
        try
        {
            var lines = File.ReadAllLines(Path.Combine(cluster, "postmaster.pid"));
            return lines.Length > 0 && int.TryParse(lines[0], CultureInfo.InvariantCulture, out var id)
                ? new PostmasterFile(Math.Abs(id), lines.Length > StatusLine ? lines[StatusLine].Trim() : "")
                : null;
        }
        catch (Exception e) when (e is IOException or UnauthorizedAccessException)
        {
            return null;
        }
    }

    /// <summary>Whether that process lives and is PostgreSQL on this cluster: not a zombie, and not another process that was given its number later.</summary>
    public async Task<bool> IsAliveAsync(string cluster, PostgresUser user, CancellationToken cancellationToken)
    {
        try
        {
            using var process = Process.GetProcessById(ProcessId);
            if (process.HasExited || !process.ProcessName.StartsWith("postgres", StringComparison.OrdinalIgnoreCase))
                return false;
            if (!OperatingSystem.IsLinux())
                return true;

            // The state follows the command in brackets, which may hold anything.
            var stat = await File.ReadAllTextAsync($"/proc/{ProcessId}/stat", cancellationToken);
            if (stat[(stat.LastIndexOf(')') + 2)..][0] is 'Z' or 'X')
                return false;
        }
        catch (Exception e) when (e is ArgumentException or InvalidOperationException or IOException)
        {
            return false;
        }

        // A postmaster stands in its cluster's folder. Its own user may look where; in a container root may not.
        // Where that user may not look either, the process is somebody else's, so not ours.
        var standsIn = await ProgramRun.ToEndAsync(user.CommandLine("readlink", $"/proc/{ProcessId}/cwd"), cancellationToken);
        var ours = await ProgramRun.ToEndAsync(user.CommandLine("readlink", "-f", cluster), cancellationToken);
        return standsIn.ExitCode == 0 && standsIn.Output == ours.Output;
    }
}

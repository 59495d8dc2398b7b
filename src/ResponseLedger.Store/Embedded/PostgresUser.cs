using System.Globalization;

namespace ResponseLedger.Store.Embedded;

/// <summary>
/// The user that PostgreSQL's programs run as. PostgreSQL refuses to run as root, so a server run by root hands them to an
/// unprivileged user by setpriv, which puts the program in its own place: the process is the postmaster itself.
/// </summary>
/// <param name="Name">The user's name; null where the programs run as we do.</param>
/// <param name="GroupId">The user's primary group; null likewise.</param>
internal sealed record PostgresUser(string? Name, int? GroupId)
{
    private static readonly string[] Candidates = ["postgres", "nobody"];

    /// <summary>Chooses: ourselves, or as root the first of the unprivileged users that exists.</summary>
    /// <exception cref="EmbeddedPostgresException">Root, and there is nobody to hand over to, or nothing to do it with.</exception>
    public static PostgresUser Choose()
    {
        if (OperatingSystem.IsWindows() || !Environment.IsPrivilegedProcess)
            return new PostgresUser(null, null);
        if (InPath("setpriv") is null)
            throw new EmbeddedPostgresException("PostgreSQL does not run as root, and setpriv (package util-linux) is missing. Install it, or start the server as another user.");

        var accounts = File.ReadLines("/etc/passwd").Select(line => line.Split(':')).Where(fields => fields.Length > 3).ToArray();
        foreach (var candidate in Candidates)
        {
            if (accounts.FirstOrDefault(fields => fields[0] == candidate) is { } account)
                return new PostgresUser(candidate, int.Parse(account[3], CultureInfo.InvariantCulture));
        }

        throw new EmbeddedPostgresException("PostgreSQL does not run as root, and this machine has neither a user postgres nor a user nobody. Start the server as another user.");
    }

    /// <summary>The command line that runs a program as this user.</summary>
    public IReadOnlyList<string> CommandLine(params IEnumerable<string> program)
        => Name is null
            ? [.. program]
            : ["setpriv", $"--reuid={Name}", $"--regid={GroupId!.Value.ToString(CultureInfo.InvariantCulture)}", "--clear-groups", "--", .. program];

    /// <summary>The same in a session of its own where the system can: a Ctrl+C meant for the server must not reach PostgreSQL before the server has finished its work.</summary>
    public IReadOnlyList<string> CommandLineInOwnSession(params IEnumerable<string> program)
        => !OperatingSystem.IsWindows() && InPath("setsid") is { } setsid ? [setsid, .. CommandLine(program)] : CommandLine(program);

    /// <summary>Hands a file or folder, with all in it, to this user.</summary>
    public async Task OwnAsync(string path, CancellationToken cancellationToken)
    {
        if (Name is null)
            return;
        var said = await ProgramRun.ToEndAsync(["chown", "-R", $"{Name}:{GroupId}", path], cancellationToken);
        if (said.ExitCode != 0)
            throw new EmbeddedPostgresException($"{path} could not be handed to the user {Name}: {said.Output}");
    }

    /// <summary>Checks that this user can reach a folder through its parents.</summary>
    /// <exception cref="EmbeddedPostgresException">A parent bars the way.</exception>
    public async Task RequireReachableAsync(string folder, CancellationToken cancellationToken)
    {
        if (Name is null || OperatingSystem.IsWindows())
            return;
        var said = await ProgramRun.ToEndAsync(CommandLine("test", "-x", folder), cancellationToken);
        if (said.ExitCode == 0)
            return;
        var barred = folder;
        for (var parent = Path.GetDirectoryName(folder); parent is not null; parent = Path.GetDirectoryName(parent))
        {
            if (!File.GetUnixFileMode(parent).HasFlag(UnixFileMode.OtherExecute))
                barred = parent;
        }

        throw new EmbeddedPostgresException(
            $"PostgreSQL runs as the user {Name}, who cannot reach {folder}: {barred} bars the way. " +
            $"Allow it (chmod o+x {barred}) or set {EmbeddedPostgresOptions.DataFolderVariable} to a folder that others may pass through.");
    }

    private static string? InPath(string program)
        => (Environment.GetEnvironmentVariable("PATH") ?? "").Split(Path.PathSeparator, StringSplitOptions.RemoveEmptyEntries)
            .Select(folder => Path.Combine(folder, program))
            .FirstOrDefault(File.Exists);
}

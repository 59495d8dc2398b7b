using System.Globalization;
using System.Text.RegularExpressions;
using ResponseLedger.Store.Setup;

namespace ResponseLedger.Store.Embedded;

/// <summary>PostgreSQL's programs on this machine.</summary>
/// <param name="Folder">Where initdb, postgres and pg_ctl stand.</param>
/// <param name="MajorVersion">Their major version.</param>
internal sealed partial record PostgresBinaries(string Folder, int MajorVersion)
{
    private static readonly string Suffix = OperatingSystem.IsWindows() ? ".exe" : "";

    public string Initdb => Program("initdb");
    public string Postgres => Program("postgres");
    public string PgCtl => Program("pg_ctl");

    /// <summary>Finds programs of at least the oldest version that serves; of exactly <paramref name="majorVersion"/> where a cluster asks for it.</summary>
    /// <exception cref="EmbeddedPostgresException">None fit; the message says what to install or set.</exception>
    public static async Task<PostgresBinaries> FindAsync(string? namedFolder, int? majorVersion, CancellationToken cancellationToken)
    {
        var seen = new List<PostgresBinaries>();
        foreach (var folder in string.IsNullOrWhiteSpace(namedFolder) ? await PlacesAsync(cancellationToken) : [namedFolder])
        {
            if (seen.Any(s => s.Folder == folder) || await LookAsync(folder, cancellationToken) is not { } found)
                continue;
            if (majorVersion is null ? found.MajorVersion >= StoreRequirements.OldestMajorVersion : found.MajorVersion == majorVersion)
                return found;
            seen.Add(found);
        }

        throw new EmbeddedPostgresException(Explain(namedFolder, majorVersion, seen)) { IsAbsence = true };
    }

    private static string Explain(string? namedFolder, int? majorVersion, List<PostgresBinaries> seen)
    {
        var wanted = majorVersion is { } major
            ? $"The data folder was made by PostgreSQL {major}, and no programs of that version were found"
            : $"No PostgreSQL {StoreRequirements.OldestMajorVersion} or newer was found";
        var where = string.IsNullOrWhiteSpace(namedFolder) ? "on this machine" : $"in {namedFolder}";
        var others = seen.Count == 0 ? "" : $" (there is {string.Join(", ", seen.Select(s => $"{s.MajorVersion} in {s.Folder}"))})";
        return $"{wanted} {where}{others}. Install its server package (Debian and Ubuntu: apt-get install postgresql; macOS: brew install postgresql@{majorVersion ?? 16}; " +
            $"Windows: the installer from postgresql.org), or set {EmbeddedPostgresOptions.BinariesVariable} to the folder that holds initdb, postgres and pg_ctl, " +
            "or set ConnectionStrings__Ledger to use a PostgreSQL server of your own.";
    }

    private static async Task<PostgresBinaries?> LookAsync(string folder, CancellationToken cancellationToken)
    {
        var found = new PostgresBinaries(folder, 0);
        if (!File.Exists(found.Initdb) || !File.Exists(found.PgCtl) || !File.Exists(found.Postgres))
            return null;
        var said = await ProgramRun.ToEndAsync([found.Postgres, "--version"], cancellationToken);
        var version = VersionPattern().Match(said.Output);
        return said.ExitCode == 0 && version.Success
            ? found with { MajorVersion = int.Parse(version.Groups[1].ValueSpan, CultureInfo.InvariantCulture) }
            : null;
    }

    private static async Task<List<string>> PlacesAsync(CancellationToken cancellationToken)
    {
        var places = new List<string>();
        var path = (Environment.GetEnvironmentVariable("PATH") ?? "").Split(Path.PathSeparator, StringSplitOptions.RemoveEmptyEntries);

        // A lone link to postgres in PATH leads to the folder where the rest stands.
        places.AddRange(path.Select(folder => Resolve(Path.Combine(folder, "postgres" + Suffix))).OfType<string>());
        if (path.Select(folder => Path.Combine(folder, "pg_config" + Suffix)).FirstOrDefault(File.Exists) is { } config)
        {
            var said = await ProgramRun.ToEndAsync([config, "--bindir"], cancellationToken);
            if (said.ExitCode == 0)
                places.Add(said.Output);
        }

        places.AddRange(Versions("/usr/lib/postgresql", "*", "bin"));
        places.AddRange(Versions("/usr", "pgsql-*", "bin"));
        if (OperatingSystem.IsMacOS())
        {
            places.AddRange(Versions("/opt/homebrew/opt", "postgresql@*", "bin"));
            places.AddRange(Versions("/usr/local/opt", "postgresql@*", "bin"));
            places.AddRange(Versions("/Applications/Postgres.app/Contents/Versions", "*", "bin"));
            places.AddRange(Versions("/Library/PostgreSQL", "*", "bin"));
        }

        if (OperatingSystem.IsWindows())
            places.AddRange(Versions(Path.Combine(Environment.GetFolderPath(Environment.SpecialFolder.ProgramFiles), "PostgreSQL"), "*", "bin"));
        return places;
    }

    private static string? Resolve(string program)
        => File.Exists(program) ? Path.GetDirectoryName(File.ResolveLinkTarget(program, returnFinalTarget: true)?.FullName ?? program) : null;

    // Newest first, by the number in the folder's name.
    private static IEnumerable<string> Versions(string parent, string pattern, string child)
        => !Directory.Exists(parent)
            ? []
            : Directory.GetDirectories(parent, pattern)
                .Select(folder => (Folder: Path.Combine(folder, child), Number: NumberPattern().Match(Path.GetFileName(folder))))
                .Where(place => place.Number.Success)
                .OrderByDescending(place => double.Parse(place.Number.ValueSpan, CultureInfo.InvariantCulture))
                .Select(place => place.Folder);

    private string Program(string name) => Path.Combine(Folder, name + Suffix);

    [GeneratedRegex(@"\(PostgreSQL\) (\d+)")]
    private static partial Regex VersionPattern();

    [GeneratedRegex(@"\d+(\.\d+)?")]
    private static partial Regex NumberPattern();
}

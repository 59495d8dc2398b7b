using System.Globalization;
using System.Security.Cryptography;
using System.Text.Json;

namespace ResponseLedger.Store.Embedded;

/// <summary>The data folder: who holds it, the passwords, and the cluster in it.</summary>
internal sealed class ClusterFolder : IDisposable
{
    public const string OwnerRole = "ledger_owner";
    public const string ServerRole = "ledger_server";

    private readonly FileStream held;

    private ClusterFolder(string root, FileStream held, Secrets passwords)
    {
        Root = root;
        this.held = held;
        Passwords = passwords;
    }

    public sealed record Secrets(string Owner, string Server);

    public string Root { get; }
    public Secrets Passwords { get; }
    public string Cluster => Path.Combine(Root, "postgres");
    public string LogFile => Path.Combine(Root, "postgres.log");

    /// <summary>The major version that made the cluster; null when there is none yet.</summary>
    public int? MajorVersion
    {
        get
        {
            var file = Path.Combine(Cluster, "PG_VERSION");
            return File.Exists(file) ? int.Parse(File.ReadAllText(file).Trim(), CultureInfo.InvariantCulture) : null;
        }
    }

    /// <summary>Takes hold of the folder for this process; the system lets it go when the process ends, however it ends.</summary>
    /// <exception cref="EmbeddedPostgresException">Another server holds it, or it cannot be written.</exception>
    public static ClusterFolder Hold(string root, PostgresUser user)
    {
        root = Path.GetFullPath(root);
        try
        {
            Directory.CreateDirectory(root);

            // Passwords in it are readable by us alone; PostgreSQL's user only passes through to its cluster.
            if (!OperatingSystem.IsWindows() && user.Name is not null)
                File.SetUnixFileMode(root, File.GetUnixFileMode(root) | UnixFileMode.OtherExecute);
        }
        catch (Exception e) when (e is IOException or UnauthorizedAccessException)
        {
            throw new EmbeddedPostgresException($"The data folder {root} cannot be used: {e.Message} Set {EmbeddedPostgresOptions.DataFolderVariable} to a folder that can be written.", e);
        }

        var held = Lock(Path.Combine(root, "store.lock"), root);
        try
        {
            return new ClusterFolder(root, held, ReadOrMakeSecrets(Path.Combine(root, "postgres.secrets.json")));
        }
        catch
        {
            held.Dispose();
            throw;
        }
    }

    /// <summary>Makes the cluster where there is none. It takes its name when it is whole, so a break in between leaves nothing half made.</summary>
    public async Task CreateAsync(PostgresBinaries binaries, PostgresUser user, bool flush, CancellationToken cancellationToken)
    {
        var growing = Cluster + ".new";
        var passwordFile = Path.Combine(Root, "initdb.password");
        try
        {
            if (Directory.Exists(growing))
                Directory.Delete(growing, recursive: true);
            if (OperatingSystem.IsWindows())
                Directory.CreateDirectory(growing);
            else
                Directory.CreateDirectory(growing, UnixFileMode.UserRead | UnixFileMode.UserWrite | UnixFileMode.UserExecute);
            await using (var file = new StreamWriter(passwordFile, PrivateFile(FileMode.Create)))
                await file.WriteLineAsync(Passwords.Owner);
            await user.OwnAsync(growing, cancellationToken);
            await user.OwnAsync(passwordFile, cancellationToken);
            await user.RequireReachableAsync(growing, cancellationToken);
            var said = await ProgramRun.ToEndAsync(
                user.CommandLine(
                    [
                        binaries.Initdb, "-D", growing, "--no-locale", "-E", "UTF8", "--data-checksums", "--auth=scram-sha-256",
                        "-U", OwnerRole, $"--pwfile={passwordFile}", .. flush ? Array.Empty<string>() : ["--no-sync"],
                    ]),
                cancellationToken);
            if (said.ExitCode != 0)
                throw new EmbeddedPostgresException($"The embedded PostgreSQL could not be set up in {Root}. initdb said:\n{said.Output}");
            Directory.Move(growing, Cluster);
        }
        finally
        {
            File.Delete(passwordFile);
        }
    }

    public void Dispose() => held.Dispose();

    private static FileStream Lock(string path, string root)
    {
        FileStream held;
        try
        {
            held = new FileStream(path, FileMode.OpenOrCreate, FileAccess.ReadWrite, FileShare.None);
        }
        catch (IOException e)
        {
            throw new EmbeddedPostgresException(
                $"Another ResponseLedger server{Holder(path)} uses the data folder {root}. Stop it, or set {EmbeddedPostgresOptions.DataFolderVariable} to another folder for this one.", e);
        }

        held.SetLength(0);
        held.Write(System.Text.Encoding.ASCII.GetBytes(Environment.ProcessId.ToString(CultureInfo.InvariantCulture)));
        held.Flush();
        return held;
    }

    private static string Holder(string path)
    {
        try
        {
            using var reader = new StreamReader(new FileStream(path, FileMode.Open, FileAccess.Read, FileShare.ReadWrite | FileShare.Delete));
            return $" (process {reader.ReadToEnd()})";
        }
        catch (IOException)
        {
            // Windows does not let us read what another process holds; the message serves without.
            return "";
        }
    }

    private static Secrets ReadOrMakeSecrets(string path)
    {
        if (File.Exists(path))
        {
            return JsonSerializer.Deserialize<Secrets>(File.ReadAllText(path))
                ?? throw new EmbeddedPostgresException($"{path} holds no passwords. Restore it from a backup: the cluster beside it opens with nothing else.");
        }

        var made = new Secrets(NewPassword(), NewPassword());
        var growing = path + ".new";
        using (var file = new FileStream(growing, PrivateFile(FileMode.Create)))
        {
            JsonSerializer.Serialize(file, made);
            file.Flush(flushToDisk: true);
        }

        File.Move(growing, path);
        return made;
    }

    private static FileStreamOptions PrivateFile(FileMode mode)
    {
        var options = new FileStreamOptions { Mode = mode, Access = FileAccess.Write, Share = FileShare.None };
        if (!OperatingSystem.IsWindows())
            options.UnixCreateMode = UnixFileMode.UserRead | UnixFileMode.UserWrite;
        return options;
    }

    // Letters, digits, - and _ alone: they stand in SQL and connection strings as they are.
    private static string NewPassword() => System.Buffers.Text.Base64Url.EncodeToString(RandomNumberGenerator.GetBytes(32));
}

using System.Diagnostics;
using Microsoft.Extensions.Logging;
using Npgsql;

namespace ResponseLedger.Store.Embedded;

/// <summary>
/// A PostgreSQL of the server's own, made from the programs found on the machine: it starts and stops with the server, and is
/// started again when it dies. It listens on loopback with passwords (SCRAM), which works alike on every system and for every
/// data folder; a socket's path may be too long, and another user's process could not use it.
/// </summary>
public sealed class EmbeddedPostgres : IAsyncDisposable
{
    private static readonly TimeSpan BetweenRestarts = TimeSpan.FromSeconds(1);

    private readonly ClusterFolder folder;
    private readonly Postmaster postmaster;
    private readonly EmbeddedPostgresOptions options;
    private readonly CancellationTokenSource stopping = new();
    private Process process;
    private Task supervision = Task.CompletedTask;
    private volatile string? trouble;
    private int disposed;

    private EmbeddedPostgres(ClusterFolder folder, Postmaster postmaster, EmbeddedPostgresOptions options, Process process)
    {
        this.folder = folder;
        this.postmaster = postmaster;
        this.options = options;
        this.process = process;
    }

    /// <summary>The role that the server connects as; it owns nothing.</summary>
    public static string ServerRoleName => ClusterFolder.ServerRole;

    /// <summary>Null while it runs; else what is wrong, for the server's health.</summary>
    public string? Trouble => trouble;

    /// <summary>The loopback port; it stays the same over restarts.</summary>
    public int Port => postmaster.Port;

    /// <summary>The postmaster's process id.</summary>
    public int ProcessId => process.Id;

    /// <summary>The file that holds PostgreSQL's log.</summary>
    public string LogFile => folder.LogFile;

    /// <summary>Starts it, after making the cluster, its roles and databases where they are missing.</summary>
    /// <exception cref="EmbeddedPostgresException">There are no programs, the folder is in use or barred, or PostgreSQL does not start; the message says what to do.</exception>
    public static async Task<EmbeddedPostgres> StartAsync(EmbeddedPostgresOptions options, CancellationToken cancellationToken)
    {
        ArgumentNullException.ThrowIfNull(options);
        var user = PostgresUser.Choose();
        var folder = ClusterFolder.Hold(options.DataFolder, user);
        try
        {
            var binaries = await PostgresBinaries.FindAsync(options.BinariesFolder, folder.MajorVersion, cancellationToken);
            if (folder.MajorVersion is null)
            {
                options.Logger.LogInformation("Setting up PostgreSQL {Version} from {Binaries} in {Folder}", binaries.MajorVersion, binaries.Folder, folder.Root);
                await folder.CreateAsync(binaries, user, options.FlushNewCluster, cancellationToken);
            }

            await user.OwnAsync(folder.Cluster, cancellationToken);
            await user.RequireReachableAsync(folder.Cluster, cancellationToken);
            var postmaster = new Postmaster(folder, binaries, user, options, new BoundedLog(folder.LogFile));
            var started = new EmbeddedPostgres(folder, postmaster, options, await postmaster.StartAsync(portMayChange: true, cancellationToken));
            try
            {
                await started.PrepareAsync(cancellationToken);
            }
            catch
            {
                await postmaster.StopAsync(started.process);
                throw;
            }

            started.supervision = started.SuperviseAsync();
            options.Logger.LogInformation("PostgreSQL {Version} runs in {Folder} on port {Port}", binaries.MajorVersion, folder.Root, postmaster.Port);
            return started;
        }
        catch
        {
            folder.Dispose();
            throw;
        }
    }

    /// <summary>Deletes a data folder that nobody holds, after stopping what still runs in it; false when somebody holds it.</summary>
    internal static async Task<bool> TryRemoveAsync(string dataFolder, CancellationToken cancellationToken)
    {
        try
        {
            var user = PostgresUser.Choose();
            using (var folder = ClusterFolder.Hold(dataFolder, user))
            {
                if (folder.MajorVersion is { } version)
                {
                    var binaries = await PostgresBinaries.FindAsync(null, version, cancellationToken);
                    var options = new EmbeddedPostgresOptions { DataFolder = dataFolder };
                    await new Postmaster(folder, binaries, user, options, new BoundedLog(folder.LogFile)).StopLeftoverAsync(cancellationToken);
                }
            }

            Directory.Delete(dataFolder, recursive: true);
            return true;
        }
        catch (Exception e) when (e is EmbeddedPostgresException or IOException or UnauthorizedAccessException)
        {
            return false;
        }
    }

    /// <summary>Connects to a database as the owner of its tables, for migrations.</summary>
    public string OwnerConnectionString(string database) => ConnectionString(database, ClusterFolder.OwnerRole, folder.Passwords.Owner);

    /// <summary>Connects to a database as the server's role.</summary>
    public string ServerConnectionString(string database) => ConnectionString(database, ClusterFolder.ServerRole, folder.Passwords.Server);

    /// <summary>Stops it; whatever was committed is on disk.</summary>
    public async ValueTask DisposeAsync()
    {
        if (Interlocked.Exchange(ref disposed, 1) != 0)
            return;
        await stopping.CancelAsync();
        await supervision;
        await postmaster.StopAsync(process);
        trouble = "PostgreSQL was stopped.";
        folder.Dispose();
        stopping.Dispose();
    }

    private string ConnectionString(string database, string role, string password)
        => new NpgsqlConnectionStringBuilder
        {
            Host = "127.0.0.1",
            Port = postmaster.Port,
            Database = database,
            Username = role,
            Password = password,
            SslMode = SslMode.Disable,
            GssEncryptionMode = GssEncryptionMode.Disable,
        }.ConnectionString;

    private async Task PrepareAsync(CancellationToken cancellationToken)
    {
        var settings = new NpgsqlConnectionStringBuilder(OwnerConnectionString("postgres")) { Pooling = false };
        await using var connection = new NpgsqlConnection(settings.ConnectionString);
        try
        {
            await connection.OpenAsync(cancellationToken);
        }
        catch (PostgresException e) when (e.SqlState == PostgresErrorCodes.InvalidPassword)
        {
            throw new EmbeddedPostgresException($"The cluster in {folder.Root} does not open with the passwords beside it (postgres.secrets.json). Restore both from the same backup.", e);
        }

        await using var ask = new NpgsqlCommand("select (select array_agg(rolname::text) from pg_roles), (select array_agg(datname::text) from pg_database)", connection);
        string[] roles;
        string[] databases;
        await using (var reader = await ask.ExecuteReaderAsync(cancellationToken))
        {
            await reader.ReadAsync(cancellationToken);
            roles = reader.GetFieldValue<string[]>(0);
            databases = reader.GetFieldValue<string[]>(1);
        }

        if (!roles.Contains(ClusterFolder.ServerRole))
            await RunAsync($"create role {ClusterFolder.ServerRole} login password '{folder.Passwords.Server}'");
        foreach (var database in options.Databases)
        {
            var quoted = "\"" + database.Replace("\"", "\"\"", StringComparison.Ordinal) + "\"";
            if (!databases.Contains(database))
                await RunAsync($"create database {quoted}");
            await RunAsync($"revoke connect, temporary on database {quoted} from public");
            await RunAsync($"grant connect on database {quoted} to {ClusterFolder.ServerRole}");
        }

        async Task RunAsync(string sql)
        {
            // Names and passwords here are the options' and our own; neither statement takes parameters.
#pragma warning disable CA2100
            await using var command = new NpgsqlCommand(sql, connection);
#pragma warning restore CA2100
            await command.ExecuteNonQueryAsync(cancellationToken);
        }
    }

    private async Task SuperviseAsync()
    {
        while (!stopping.IsCancellationRequested)
        {
            try
            {
                await process.WaitForExitAsync(stopping.Token);
                trouble = "PostgreSQL died and is being started again.";
                options.Logger.LogError("PostgreSQL in {Folder} died (exit code {ExitCode}); starting it again. Its log is {Log}", folder.Root, process.ExitCode, folder.LogFile);
                while (trouble is not null)
                    await StartAgainAsync();
            }
            catch (OperationCanceledException) when (stopping.IsCancellationRequested)
            {
                return;
            }
        }
    }

    private async Task StartAgainAsync()
    {
        try
        {
            var dead = process;
            process = await postmaster.StartAsync(portMayChange: false, stopping.Token);
            dead.Dispose();
            trouble = null;
            options.Logger.LogWarning("PostgreSQL in {Folder} runs again", folder.Root);
        }
        catch (Exception e) when (e is EmbeddedPostgresException or IOException or System.ComponentModel.Win32Exception)
        {
            trouble = e.Message;
            options.Logger.LogError(e, "PostgreSQL in {Folder} could not be started again; trying on", folder.Root);
            await Task.Delay(BetweenRestarts, options.Time, stopping.Token);
        }
    }
}

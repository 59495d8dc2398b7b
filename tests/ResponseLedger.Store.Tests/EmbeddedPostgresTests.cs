using System.Diagnostics;
using System.Globalization;
using Microsoft.Extensions.Logging.Abstractions;
using Npgsql;
using ResponseLedger.Store.Embedded;

namespace ResponseLedger.Store.Tests;

/// <summary>The embedded PostgreSQL and what may befall it, each on a data folder of its own.</summary>
public sealed class EmbeddedPostgresTests : IDisposable
{
    private readonly string folder = Directory.CreateTempSubdirectory("responseledger-embedded-").FullName;
    private static CancellationToken Cancellation => TestContext.Current.CancellationToken;

    private EmbeddedPostgresOptions Options => new() { DataFolder = folder, FlushNewCluster = false };

    public void Dispose() => Directory.Delete(folder, recursive: true);

    [Fact]
    public async Task It_is_set_up_as_the_design_says_and_keeps_its_data_over_a_restart()
    {
        await using (var first = await EmbeddedPostgres.StartAsync(Options, Cancellation))
        {
            Assert.Null(first.Trouble);
            Assert.NotEqual(5432, first.Port);
            await using var owner = await Sql.OpenAsync(first.OwnerConnectionString("ledger"));
            Assert.Equal(
                ["on", "UTF8", "C", "127.0.0.1", "scram-sha-256"],
                Assert.Single(await Sql.RowsAsync(
                    owner,
                    """
                    select current_setting('data_checksums'), current_setting('server_encoding'), datcollate, current_setting('listen_addresses'),
                           (select string_agg(distinct auth_method, ',') from pg_hba_file_rules)
                    from pg_database where datname = current_database()
                    """)));
            await Sql.RunAsync(owner, "create table kept (n int)");
            await Sql.RunAsync(owner, "insert into kept values (42)");
            await using var demo = await Sql.OpenAsync(first.OwnerConnectionString("demo"));
            if (!OperatingSystem.IsWindows())
                Assert.Equal(UnixFileMode.UserRead | UnixFileMode.UserWrite, File.GetUnixFileMode(Path.Combine(folder, "postgres.secrets.json")));
        }

        await using var second = await EmbeddedPostgres.StartAsync(Options, Cancellation);
        await using var again = await Sql.OpenAsync(second.OwnerConnectionString("ledger"));
        Assert.Equal(42, await Sql.ScalarAsync<int>(again, "select n from kept"));
    }

    [Fact]
    public async Task A_second_server_on_the_same_folder_is_told_so()
    {
        await using var first = await EmbeddedPostgres.StartAsync(Options, Cancellation);
        var refused = await Assert.ThrowsAsync<EmbeddedPostgresException>(() => EmbeddedPostgres.StartAsync(Options, Cancellation));
        Assert.Contains("Another ResponseLedger server", refused.Message, StringComparison.Ordinal);
        Assert.Contains(folder, refused.Message, StringComparison.Ordinal);
        await using var untouched = await Sql.OpenAsync(first.ServerConnectionString("ledger"));
    }

    [Fact]
    public async Task A_killed_postmaster_is_started_again_and_every_acknowledged_row_is_there()
    {
        await using var postgres = await EmbeddedPostgres.StartAsync(Options, Cancellation);
        await using (var owner = await Sql.OpenAsync(postgres.OwnerConnectionString("ledger")))
            await Sql.RunAsync(owner, "create table kept (n int primary key)");

        // A backend that is busy does not see its postmaster die, and holds the shared memory until it is done.
        var busy = await Sql.OpenAsync(postgres.OwnerConnectionString("ledger"));
        var working = Record.ExceptionAsync(() => Sql.RunAsync(
            busy, "do $$ declare since timestamptz := clock_timestamp(); begin while clock_timestamp() < since + interval '3 s' loop end loop; end $$"));
        var acknowledged = new List<int>();
        var writing = WriteUntilBrokenAsync(postgres.OwnerConnectionString("ledger"), acknowledged);
        while (acknowledged.Count < 20)
            await Task.Delay(10, Cancellation);
        var killed = postgres.ProcessId;
        Process.GetProcessById(killed).Kill();
        await writing;
        await working;
        await busy.DisposeAsync();

        var since = TimeProvider.System.GetTimestamp();
        while (postgres.Trouble is not null || postgres.ProcessId == killed)
        {
            Assert.True(TimeProvider.System.GetElapsedTime(since) < TimeSpan.FromSeconds(90), postgres.Trouble);
            await Task.Delay(20, Cancellation);
        }

        await using var again = await Sql.OpenAsync(postgres.OwnerConnectionString("ledger"));
        var kept = (await Sql.RowsAsync(again, "select n from kept order by n")).Select(row => (int)row[0]!).ToArray();
        Assert.Empty(acknowledged.Except(kept));
    }

    [Fact]
    public async Task The_postmaster_of_a_killed_server_is_stopped_and_its_data_is_there()
    {
        // A server that was killed leaves exactly this: a postmaster that runs, and a folder that nobody holds.
        var user = PostgresUser.Choose();
        await (await EmbeddedPostgres.StartAsync(Options, Cancellation)).DisposeAsync();
        Process orphan;
        using (var held = ClusterFolder.Hold(folder, user))
        {
            var binaries = await PostgresBinaries.FindAsync(null, held.MajorVersion, Cancellation);
            orphan = await new Postmaster(held, binaries, user, Options, new BoundedLog(held.LogFile)).StartAsync(portMayChange: true, Cancellation);
        }

        await using var postgres = await EmbeddedPostgres.StartAsync(Options, Cancellation);
        await orphan.WaitForExitAsync(Cancellation);
        Assert.NotEqual(orphan.Id, postgres.ProcessId);
        await using var open = await Sql.OpenAsync(postgres.ServerConnectionString("ledger"));
        orphan.Dispose();
    }

    [Theory]
    [InlineData("sleep 120 & echo $!; wait", 'S')]
    [InlineData("sleep 0.3 & echo $!; exec sleep 120", 'Z')]
    public async Task A_stale_file_whose_number_belongs_to_another_process_or_a_zombie_is_no_obstacle(string script, char state)
    {
        Assert.SkipUnless(OperatingSystem.IsLinux(), "needs /proc");
        var user = PostgresUser.Choose();
        await (await EmbeddedPostgres.StartAsync(Options, Cancellation)).DisposeAsync();
        using var parent = Process.Start(ProgramRun.Prepare(user.CommandLine("sh", "-c", script)))!;
        try
        {
            var number = int.Parse((await parent.StandardOutput.ReadLineAsync(Cancellation))!, CultureInfo.InvariantCulture);
            // The second shell is replaced before its child ends, so nobody reaps it.
            while (StateOf(number) != state)
                await Task.Delay(20, Cancellation);
            var file = Path.Combine(folder, "postgres", "postmaster.pid");
            await File.WriteAllTextAsync(file, $"{number}\n{Path.Combine(folder, "postgres")}\n1790000000\n16000\n\n127.0.0.1\n 99999999    999999\nready   \n", Cancellation);
            await user.OwnAsync(file, Cancellation);
            await using var postgres = await EmbeddedPostgres.StartAsync(Options, Cancellation);
            await using var open = await Sql.OpenAsync(postgres.ServerConnectionString("ledger"));
            Assert.Equal(state, StateOf(number));
        }
        finally
        {
            parent.Kill(entireProcessTree: true);
        }
    }

    [Fact]
    public async Task Without_programs_the_message_says_what_to_install_or_set()
    {
        var refused = await Assert.ThrowsAsync<EmbeddedPostgresException>(
            () => EmbeddedPostgres.StartAsync(Options with { BinariesFolder = folder }, Cancellation));
        Assert.Contains("postgresql", refused.Message, StringComparison.Ordinal);
        Assert.Contains(EmbeddedPostgresOptions.BinariesVariable, refused.Message, StringComparison.Ordinal);
        Assert.Contains("ConnectionStrings__Ledger", refused.Message, StringComparison.Ordinal);
        Assert.True(refused.IsAbsence);
    }

    [Fact]
    public async Task A_setup_that_was_broken_off_is_begun_again()
    {
        Directory.CreateDirectory(Path.Combine(folder, "postgres.new", "base"));
        await using var postgres = await EmbeddedPostgres.StartAsync(Options, Cancellation);
        await Setup.StoreMigrator.MigrateAsync(postgres.OwnerConnectionString("ledger"), EmbeddedPostgres.ServerRoleName, NullLogger.Instance, Cancellation);
        await using var open = await Sql.OpenAsync(postgres.ServerConnectionString("ledger"));
        Assert.Equal(0L, await Sql.ScalarAsync<long>(open, "select count(*) from run"));
    }

    [Fact]
    public async Task The_log_stays_within_its_bounds()
    {
        var log = new BoundedLog(Path.Combine(folder, "log"), bytesPerFile: 1_000);
        using var lines = new StreamReader(new MemoryStream(System.Text.Encoding.UTF8.GetBytes(string.Concat(Enumerable.Range(0, 1_000).Select(n => $"line {n}\n")))));
        await log.CopyAsync(lines);
        Assert.InRange(new FileInfo(log.Path).Length, 1, 1_000);
        Assert.InRange(new FileInfo(log.Path + ".1").Length, 1, 1_000);
        Assert.EndsWith("line 999", log.Tail(), StringComparison.Ordinal);
    }

    private static char StateOf(int processId)
    {
        var stat = File.ReadAllText($"/proc/{processId}/stat");
        return stat[stat.LastIndexOf(')') + 2];
    }

    private static async Task WriteUntilBrokenAsync(string connectionString, List<int> acknowledged)
    {
        await using var connection = await Sql.OpenAsync(connectionString);
        try
        {
            for (var n = 0; ; n++)
            {
                await Sql.RunAsync(connection, $"insert into kept values ({n})");
                acknowledged.Add(n);
            }
        }
        catch (NpgsqlException)
        {
            // The postmaster was killed.
        }
    }
}

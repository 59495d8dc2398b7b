using DotNet.Testcontainers.Builders;
using DotNet.Testcontainers.Configurations;
using DotNet.Testcontainers.Containers;
using DotNet.Testcontainers.Images;
using Npgsql;

namespace ResponseLedger.TestDatabase;

/// <summary>
/// A PostgreSQL in a container: the official image, or one that was imported on this machine (tests/container-image.sh) and so
/// has no entrypoint. The latter runs PostgreSQL by a command of its own, under the user postgres, and is never pulled.
/// </summary>
internal sealed class ContainerServer : GivenServer
{
    private const string Password = "responseledger";
    private const ushort PostgresPort = 5432;
    private static readonly TimeSpan StartTimeout = TimeSpan.FromSeconds(90);

    private const string OwnCommand =
        """
        set -eu
        bin=$(ls -d /usr/lib/postgresql/*/bin | sort -V | tail -n 1)
        install -d -o postgres /srv/cluster
        printf %s "$POSTGRES_PASSWORD" >/srv/password
        chown postgres /srv/password
        su postgres -c "$bin/initdb -D /srv/cluster --no-locale -E UTF8 --data-checksums --auth=scram-sha-256 --pwfile=/srv/password --no-sync" >/dev/null
        echo 'host all all all scram-sha-256' >>/srv/cluster/pg_hba.conf
        exec su postgres -c "exec $bin/postgres -D /srv/cluster -c listen_addresses='*' -c unix_socket_directories= -c max_connections=400"
        """;

    private readonly IContainer container;

    private ContainerServer(IContainer container, string connectionString)
        : base(connectionString)
        => this.container = container;

    public static async Task<ContainerServer> StartAsync(string image, bool isImported)
    {
        if (isImported)
        {
            // Debian's daemon speaks an older protocol than the client asks for, and where no image can be pulled there is no reaper's either.
            if (Environment.GetEnvironmentVariable("DOCKER_API_VERSION") is null)
                Environment.SetEnvironmentVariable("DOCKER_API_VERSION", "1.41");
            TestcontainersSettings.ResourceReaperEnabled = false;
        }

        var builder = new ContainerBuilder(image)
            .WithEnvironment("POSTGRES_PASSWORD", Password)
            .WithPortBinding(PostgresPort, assignRandomHostPort: true)
            .WithAutoRemove(true);
        builder = isImported
            ? builder.WithImagePullPolicy(PullPolicy.Never).WithEntrypoint("/bin/sh", "-c").WithCommand(OwnCommand)
            : builder.WithCommand("-c", "max_connections=400");
        var container = builder.Build();
        await container.StartAsync();
        var settings = new NpgsqlConnectionStringBuilder
        {
            Host = container.Hostname,
            Port = container.GetMappedPublicPort(PostgresPort),
            Username = "postgres",
            Password = Password,
            Database = "postgres",
        };
        var server = new ContainerServer(container, settings.ConnectionString);
        await server.WaitUntilReadyAsync(settings.ConnectionString);
        await server.MakeRoleAsync();
        return server;
    }

    public override async ValueTask DisposeAsync()
    {
        await base.DisposeAsync();
        await container.DisposeAsync();
    }

    private async Task WaitUntilReadyAsync(string connectionString)
    {
        var since = TimeProvider.System.GetTimestamp();
        while (true)
        {
            try
            {
                await using var connection = new NpgsqlConnection(connectionString + ";Pooling=false");
                await connection.OpenAsync();
                return;
            }
            catch (NpgsqlException) when (TimeProvider.System.GetElapsedTime(since) < StartTimeout && container.State == TestcontainersStates.Running)
            {
                await Task.Delay(TimeSpan.FromMilliseconds(100));
            }
            catch (NpgsqlException e)
            {
                var (said, errors) = await container.GetLogsAsync();
                await container.DisposeAsync();
                throw new InvalidOperationException($"PostgreSQL did not start in its container. It said:\n{said}{errors}", e);
            }
        }
    }
}

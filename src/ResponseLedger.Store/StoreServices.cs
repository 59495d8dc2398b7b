using Microsoft.EntityFrameworkCore;
using Microsoft.Extensions.DependencyInjection;
using Npgsql;
using ResponseLedger.Store.Acts;
using ResponseLedger.Store.Intake;
using ResponseLedger.Store.Judging;

namespace ResponseLedger.Store;

/// <summary>Registers the store.</summary>
public static class StoreServices
{
    /// <summary>Connections the server may hold at once, well under PostgreSQL's default limit of 100.</summary>
    public const int MaxPoolSize = 40;

    // Together some 20 s: longer than a restart of the embedded PostgreSQL, shorter than a sender's patience. The steps are short,
    // so that whoever waits goes on soon after it is back.
    private const int Retries = 20;
    private static readonly TimeSpan LongestRetryDelay = TimeSpan.FromSeconds(1);

    private const int MostPrepared = 200;
    private const int BufferBytes = 64 << 10;

    private const string MigrationsAssembly = "ResponseLedger.Migrations";

    /// <summary>Registers data source, contexts, the act runner and the ledger's sequencer. A TimeProvider must be registered beside it.</summary>
    /// <param name="services">The services to add to.</param>
    /// <param name="connectionString">An Npgsql connection string; a pool size it does not name is capped at <see cref="MaxPoolSize"/>.</param>
    public static IServiceCollection AddLedgerStore(this IServiceCollection services, string connectionString)
    {
        services.AddSingleton(_ => NpgsqlDataSource.Create(Capped(connectionString)));
        services.AddPooledDbContextFactory<ResponseLedgerContext>((provider, options) => Configure(options, provider.GetRequiredService<NpgsqlDataSource>()));
        services.AddScoped(provider => provider.GetRequiredService<IDbContextFactory<ResponseLedgerContext>>().CreateDbContext());
        services.AddSingleton<ActRunner>();
        services.AddSingleton<LedgerSequencer>();
        services.AddSingleton<JudgingMaterial>();
        services.AddSingleton<ColumnMemory>();
        services.AddSingleton<RunIntake>();
        services.AddSingleton<RunVerdicts>();
        return services;
    }

    /// <summary>Sets a context up for a data source: provider, naming, migrations, retries.</summary>
    public static DbContextOptionsBuilder Configure(DbContextOptionsBuilder options, NpgsqlDataSource dataSource)
        => options
            .UseNpgsql(dataSource, npgsql => npgsql.MigrationsAssembly(MigrationsAssembly).EnableRetryOnFailure(Retries, LongestRetryDelay, null).SetPostgresVersion(15, 0))
            .UseSnakeCaseNamingConvention()
            .AddInterceptors(BrokenConnection.Interceptor);

    internal static string Capped(string connectionString)
    {
        var builder = new NpgsqlConnectionStringBuilder(connectionString);
        if (!builder.ShouldSerialize("Maximum Pool Size"))
            builder.MaxPoolSize = MaxPoolSize;
        if (!builder.ShouldSerialize("Application Name"))
            builder.ApplicationName = "ResponseLedger";

        // Most of the time of a short statement is its planning; what comes twice is prepared, on every connection by itself.
        if (!builder.ShouldSerialize("Max Auto Prepare"))
        {
            builder.MaxAutoPrepare = MostPrepared;
            builder.AutoPrepareMinUsages = 2;
        }

        // Nothing here leaves anything behind in a session (locks and settings end with their transaction), so a connection
        // that goes back to the pool needs no cleaning before its next statement.
        if (!builder.ShouldSerialize("No Reset On Close"))
            builder.NoResetOnClose = true;

        // A file with its curve is some 100 KiB, the curves of a lot a few MiB: few large pieces instead of many small ones.
        if (!builder.ShouldSerialize("Read Buffer Size"))
            builder.ReadBufferSize = BufferBytes;
        if (!builder.ShouldSerialize("Write Buffer Size"))
            builder.WriteBufferSize = BufferBytes;

        // A peer that vanished without a word is found out within a minute.
        if (!builder.ShouldSerialize("Keepalive"))
            builder.KeepAlive = 30;
        return builder.ConnectionString;
    }
}

using Microsoft.EntityFrameworkCore;
using Microsoft.EntityFrameworkCore.Diagnostics;
using Npgsql;
using ResponseLedger.Store.Acts;

namespace ResponseLedger.Store.Tests;

/// <summary>Contexts as the server configures them, on one data source, with a test's interceptors.</summary>
internal sealed class Contexts : IDbContextFactory<ResponseLedgerContext>, IAsyncDisposable
{
    private readonly NpgsqlDataSource source;
    private readonly DbContextOptions<ResponseLedgerContext> options;

    public Contexts(string connectionString, params IInterceptor[] interceptors)
    {
        source = NpgsqlDataSource.Create(connectionString);
        var builder = new DbContextOptionsBuilder<ResponseLedgerContext>();
        StoreServices.Configure(builder, source);
        builder.AddInterceptors(interceptors);
        options = builder.Options;
    }

    public ResponseLedgerContext CreateDbContext() => new(options);

    public LedgerSequencer Sequencer() => new(this, TimeProvider.System);

    public ActRunner Acts(LedgerSequencer sequencer) => new(this, TimeProvider.System, sequencer);

    public async ValueTask DisposeAsync() => await source.DisposeAsync();

    /// <summary>A lone context; its data source goes with the process.</summary>
    public static ResponseLedgerContext Open(string connectionString) => new Contexts(connectionString).CreateDbContext();
}

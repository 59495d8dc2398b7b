using Microsoft.EntityFrameworkCore;
using Microsoft.EntityFrameworkCore.Design;
using Npgsql;
using ResponseLedger.Store;

namespace ResponseLedger.Migrations;

/// <summary>Gives <c>dotnet ef</c> a context. Adding a migration reads the model alone, so nothing listens at this address.</summary>
public sealed class DesignTimeContextFactory : IDesignTimeDbContextFactory<ResponseLedgerContext>
{
    /// <inheritdoc/>
    public ResponseLedgerContext CreateDbContext(string[] args)
    {
        var options = new DbContextOptionsBuilder<ResponseLedgerContext>();
        StoreServices.Configure(options, NpgsqlDataSource.Create("Host=127.0.0.1;Database=design_time"));
        return new ResponseLedgerContext(options.Options);
    }
}

using Npgsql;

namespace ResponseLedger.TestDatabase;

/// <summary>A server that was given by a connection string; its role must be allowed to make databases and roles. The server's role is made for this process and dropped after it.</summary>
internal class GivenServer(string connectionString) : TestServer
{
    private readonly string password = Guid.CreateVersion7(TimeProvider.System.GetUtcNow()).ToString("N");

    public override string ServerRoleName { get; } = "responseledger_test_" + Guid.CreateVersion7(TimeProvider.System.GetUtcNow()).ToString("N");

    public Task MakeRoleAsync() => RunAsync($"create role {ServerRoleName} login password '{password}'");

    public override string OwnerConnectionString(string database)
        => new NpgsqlConnectionStringBuilder(connectionString) { Database = database }.ConnectionString;

    public override string ServerConnectionString(string database)
        => new NpgsqlConnectionStringBuilder(connectionString) { Database = database, Username = ServerRoleName, Password = password }.ConnectionString;

    public override async ValueTask DisposeAsync()
    {
        await RunAsync($"drop role if exists {ServerRoleName}");
        GC.SuppressFinalize(this);
    }
}

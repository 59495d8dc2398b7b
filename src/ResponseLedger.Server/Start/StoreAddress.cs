namespace ResponseLedger.Server.Start;

/// <summary>Where the store is and as whom the server connects.</summary>
/// <param name="ConnectionString">As the server's role.</param>
/// <param name="OwnerConnectionString">As the owner of the tables.</param>
/// <param name="ServerRoleName">The server's role, or null where it is the owner itself.</param>
internal sealed record StoreAddress(string ConnectionString, string OwnerConnectionString, string? ServerRoleName);

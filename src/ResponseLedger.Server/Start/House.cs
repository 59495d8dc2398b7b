namespace ResponseLedger.Server.Start;

/// <summary>Puts the server together: store, people, features, in this order.</summary>
internal sealed class House : IAsyncDisposable
{
    public static Task<House> OpenAsync(WebApplicationBuilder builder) => throw new NotImplementedException();

    public void Use(WebApplication app) => throw new NotImplementedException();

    public ValueTask DisposeAsync() => throw new NotImplementedException();
}

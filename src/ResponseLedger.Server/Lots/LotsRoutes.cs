namespace ResponseLedger.Server.Lots;

/// <summary>The routes of this feature and the services that they need.</summary>
internal static class LotsRoutes
{
    public static void AddServices(IServiceCollection services)
    {
    }

    public static void Map(IEndpointRouteBuilder api)
    {
    }
}

using System.Reflection;
using ResponseLedger.Engine;

namespace ResponseLedger.Server.Start;

/// <summary>What this server is.</summary>
internal static class AboutRoutes
{
    private static readonly string Version = typeof(AboutRoutes).Assembly
        .GetCustomAttribute<AssemblyInformationalVersionAttribute>()!.InformationalVersion.Split('+')[0];

    public static void Map(IEndpointRouteBuilder api)
        => api.MapGet("/about", (StartSettings settings, Readiness readiness) =>
                TypedResults.Ok(new About("ResponseLedger", Version, EngineVersion.Current, settings.Demo, readiness.IsReady)))
            .AllowAnonymous().WithTags("About").WithName("About")
            .WithSummary("Product, version, version of the numbers, and whether the invented demo lab runs here.");

    /// <summary>What this server is.</summary>
    /// <param name="Product">The product's name.</param>
    /// <param name="Version">Its version.</param>
    /// <param name="Engine">The version of the numbers.</param>
    /// <param name="Demo">Whether everything here is invented.</param>
    /// <param name="Ready">Whether the start is done.</param>
    internal sealed record About(string Product, string Version, int Engine, bool Demo, bool Ready);
}

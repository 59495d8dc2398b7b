using Npgsql;

namespace ResponseLedger.Server.Start;

/// <summary>Whether the process lives, and whether it can do its work.</summary>
internal static class HealthRoutes
{
    private static readonly TimeSpan LongestProbe = TimeSpan.FromSeconds(2);

    public static void MapHealth(this IEndpointRouteBuilder app)
    {
        var health = app.MapGroup("/health").AllowAnonymous().WithTags("Health");
        health.MapGet("/live", () => TypedResults.Ok(new Health("live", null)))
            .WithName("Live").WithSummary("Whether the process answers.");
        health.MapGet("/ready", ReadyAsync)
            .WithName("Ready").WithSummary("Whether the start is done and the database answers; says what it waits for.")
            .Produces<Health>().Produces<Health>(StatusCodes.Status503ServiceUnavailable);
    }

    private static async Task<IResult> ReadyAsync(Readiness readiness, NpgsqlDataSource dataSource, HttpContext http)
    {
        http.Response.Headers.CacheControl = "no-store";
        if (readiness.WaitingFor is { } waiting)
            return TypedResults.Json(new Health("starting", waiting), statusCode: StatusCodes.Status503ServiceUnavailable);

        using var timeout = CancellationTokenSource.CreateLinkedTokenSource(http.RequestAborted);
        timeout.CancelAfter(LongestProbe);
        try
        {
            await using var probe = dataSource.CreateCommand("select 1");
            await probe.ExecuteScalarAsync(timeout.Token);
            return TypedResults.Ok(new Health("ready", null));
        }
        catch (Exception failure) when (failure is NpgsqlException or OperationCanceledException && !http.RequestAborted.IsCancellationRequested)
        {
            return TypedResults.Json(new Health("unavailable", "the database"), statusCode: StatusCodes.Status503ServiceUnavailable);
        }
    }

    /// <summary>How the server is.</summary>
    internal sealed record Health(string Status, string? WaitsFor);
}

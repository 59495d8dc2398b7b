using ResponseLedger.Server.Start;

namespace ResponseLedger.Server.Http;

/// <summary>While the server starts, the API says so instead of failing on half a store.</summary>
internal sealed class WaitUntilReady(RequestDelegate next, Readiness readiness)
{
    public Task InvokeAsync(HttpContext context)
    {
        var path = context.Request.Path;
        if (readiness.IsReady || !path.StartsWithSegments("/api") || path == "/api/about")
            return next(context);

        context.Response.Headers.RetryAfter = "2";
        return new Answer(503, "starting", $"The server is starting and waits for {readiness.WaitingFor ?? "the last step"}. Try again in a moment.").WriteAsync(context);
    }
}

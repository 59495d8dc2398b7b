namespace ResponseLedger.Server.Http;

/// <summary>
/// Answers every address of a page with the shell, so that a page can be loaded again, kept and sent to somebody: the router
/// in the browser finds the page. Only a browser that asks for a page gets it; a program that misspells an address still
/// learns that there is nothing.
/// </summary>
internal sealed class ShellAddresses(RequestDelegate next)
{
    private static readonly PathString[] others = ["/api", "/a", "/health", "/openapi"];

    public Task InvokeAsync(HttpContext context)
    {
        var request = context.Request;
        if (HttpMethods.IsGet(request.Method)
            && !Array.Exists(others, other => request.Path.StartsWithSegments(other))
            && request.Headers.Accept.ToString().Contains("text/html", StringComparison.OrdinalIgnoreCase))
            request.Path = "/";
        return next(context);
    }
}

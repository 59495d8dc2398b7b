using Microsoft.Net.Http.Headers;

namespace ResponseLedger.Server.Http;

/// <summary>The address of the shell page.</summary>
internal static class ShellRoute
{
    public static void MapShell(this IEndpointRouteBuilder app)
        => app.MapGet("/", (WebRoot web, HttpContext http) =>
        {
            var shell = web.Shell;
            http.Response.Headers.CacheControl = "no-cache";
            return Results.Bytes(shell.Html, "text/html; charset=utf-8", entityTag: EntityTagHeaderValue.Parse(shell.ETag));
        }).AllowAnonymous().ExcludeFromDescription();
}

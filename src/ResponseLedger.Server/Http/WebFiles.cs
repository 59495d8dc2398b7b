using Microsoft.AspNetCore.StaticFiles;
using Microsoft.Extensions.FileProviders;
using Microsoft.Extensions.Options;

namespace ResponseLedger.Server.Http;

/// <summary>Serves the pages' files under /a/{version}/, so that a browser may keep them for ever and never mixes two versions.</summary>
internal sealed class WebFiles
{
    private readonly RequestDelegate next;
    private readonly StaticFileMiddleware? files;
    private readonly WebRoot web;

    public WebFiles(RequestDelegate next, WebRoot web, IWebHostEnvironment environment, ILoggerFactory loggers)
    {
        this.next = next;
        this.web = web;
        if (Directory.Exists(web.Folder))
        {
            var options = new StaticFileOptions { FileProvider = new PhysicalFileProvider(web.Folder), OnPrepareResponse = Cache };
            files = new StaticFileMiddleware(NotFound, environment, Options.Create(options), loggers);
        }
    }

    public Task InvokeAsync(HttpContext context)
    {
        var path = context.Request.Path.Value ?? "";
        if (files is null || !path.StartsWith("/a/", StringComparison.Ordinal) || path.IndexOf('/', 3) is not (> 3 and var end))
            return next(context);

        context.Items[typeof(WebFiles)] = path[3..end];
        context.Request.Path = path[end..];
        return files.Invoke(context);
    }

    private void Cache(StaticFileResponseContext prepared)
    {
        var current = prepared.Context.Items[typeof(WebFiles)] as string == web.Shell.Version;
        prepared.Context.Response.Headers.CacheControl = web.IsImmutable && current ? "public, max-age=31536000, immutable" : "no-cache";
    }

    private static Task NotFound(HttpContext context)
    {
        context.Response.StatusCode = StatusCodes.Status404NotFound;
        return Task.CompletedTask;
    }
}

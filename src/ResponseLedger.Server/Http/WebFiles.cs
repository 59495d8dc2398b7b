using Microsoft.AspNetCore.ResponseCompression;
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

    /// <summary>Whether the request is for one of the pages' files or for the shell: what holds no secret and may be compressed. An answer of the API never is, for its length would tell of what it holds.</summary>
    public static bool AreAskedFor(HttpContext context)
        => !context.Request.Path.StartsWithSegments("/api") && !context.Request.Path.StartsWithSegments("/openapi") && !context.Request.Path.StartsWithSegments("/health");

    /// <summary>Sets what is compressed and how.</summary>
    public static void Compress(ResponseCompressionOptions options)
    {
        options.EnableForHttps = true;
        options.MimeTypes = ["text/html", "text/css", "text/javascript", "image/svg+xml", "application/json"];
        options.Providers.Add<BrotliCompressionProvider>();
        options.Providers.Add<GzipCompressionProvider>();
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

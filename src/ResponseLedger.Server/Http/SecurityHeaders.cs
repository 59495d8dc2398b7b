using Microsoft.Net.Http.Headers;

namespace ResponseLedger.Server.Http;

/// <summary>Sets the headers that keep a browser strict (OWASP ASVS 5.0.0, 3.4) on every answer.</summary>
internal sealed class SecurityHeaders(RequestDelegate next, WebRoot web)
{
    public Task InvokeAsync(HttpContext context)
    {
        context.Response.OnStarting(
            static state =>
            {
                var (http, root) = ((HttpContext, WebRoot))state;
                Set(http, root);
                return Task.CompletedTask;
            },
            (context, web));
        return next(context);
    }

    private static void Set(HttpContext context, WebRoot web)
    {
        var headers = context.Response.Headers;
        headers.ContentSecurityPolicy = web.Policy;
        headers.XContentTypeOptions = "nosniff";
        headers["Referrer-Policy"] = "same-origin";
        headers["Cross-Origin-Opener-Policy"] = "same-origin";
        headers["Cross-Origin-Resource-Policy"] = "same-origin";
        headers["Permissions-Policy"] = "accelerometer=(), camera=(), geolocation=(), gyroscope=(), magnetometer=(), microphone=(), payment=(), usb=()";

        // A browser would carry the rule over to every port of localhost, where other programs serve plain http.
        if (context.Request.IsHttps && context.Request.Host.Host != "localhost")
            headers.StrictTransportSecurity = "max-age=31536000";
        if (context.Request.Path.StartsWithSegments("/api") && !headers.ContainsKey(HeaderNames.CacheControl))
            headers.CacheControl = "no-store";
    }
}

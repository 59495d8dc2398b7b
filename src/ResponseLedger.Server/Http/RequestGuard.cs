using Microsoft.AspNetCore.Http.Features;

namespace ResponseLedger.Server.Http;

/// <summary>
/// Keeps other sites from acting through a signed-in browser (OWASP ASVS 5.0.0, 3.5.1): an unsafe request that is not by
/// bearer needs a header that no form can send and no foreign script may, and a foreign origin is refused. Runs before
/// authentication. Also sets how large a body may be.
/// </summary>
internal sealed class RequestGuard(RequestDelegate next)
{
    /// <summary>The header that every unsafe request by cookie carries.</summary>
    public const string Header = "X-ResponseLedger";

    /// <summary>Bytes of body that a request may have, uploads aside.</summary>
    public const long UsualBodyBytes = 1 << 20;

    /// <summary>Bytes of body that an upload or a preview may have.</summary>
    public const long UploadBodyBytes = 256 << 20;

    public Task InvokeAsync(HttpContext context)
    {
        var request = context.Request;
        if (HttpMethods.IsGet(request.Method) || HttpMethods.IsHead(request.Method) || HttpMethods.IsOptions(request.Method))
            return next(context);

        if (IsForeign(request))
            return new Answer(403, "foreignOrigin", "The request comes from another site. Send it from this server's own pages, or by a program.").WriteAsync(context);
        if (!IsByBearer(request) && request.Headers[Header] != "1")
            return new Answer(400, "headerMissing", $"A request that changes something needs the header {Header}: 1.").WriteAsync(context);

        if (TakesFiles(request)
            && context.Features.Get<IHttpMaxRequestBodySizeFeature>() is { IsReadOnly: false } limit)
            limit.MaxRequestBodySize = UploadBodyBytes;
        return next(context);
    }

    /// <summary>Whether files are sent to this address.</summary>
    public static bool TakesFiles(HttpRequest request)
        => HttpMethods.IsPost(request.Method) && (request.Path == "/api/runs" || request.Path == "/api/runs/preview");

    /// <summary>Whether the request names itself by a bearer token; then its cookie counts for nothing.</summary>
    public static bool IsByBearer(HttpRequest request)
        => request.Headers.Authorization.ToString().StartsWith("Bearer ", StringComparison.OrdinalIgnoreCase);

    // The scheme is left aside: behind a proxy that ends TLS the server may see http where the browser sees https.
    private static bool IsForeign(HttpRequest request)
    {
        if (request.Headers["Sec-Fetch-Site"].ToString() is not ("" or "same-origin" or "none"))
            return true;

        var origin = request.Headers.Origin.ToString();
        return origin.Length > 0
            && !(Uri.TryCreate(origin, UriKind.Absolute, out var from) && string.Equals(from.Authority, request.Host.Value, StringComparison.OrdinalIgnoreCase));
    }
}

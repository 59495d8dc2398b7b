using Microsoft.AspNetCore.Diagnostics;

namespace ResponseLedger.Server.Http;

/// <summary>Gives errors that the framework answers without a body (no route, wrong method, wrong media type) their problem details.</summary>
internal static class EmptyAnswers
{
    public static Task FillAsync(StatusCodeContext context)
    {
        var http = context.HttpContext;
        var refusal = http.Response.StatusCode switch
        {
            StatusCodes.Status404NotFound => new Answer(404, "notFound", "There is nothing at this address."),
            StatusCodes.Status405MethodNotAllowed => new Answer(405, "methodNotAllowed", $"This address does not take {http.Request.Method}; the header Allow names what it takes."),
            StatusCodes.Status413PayloadTooLarge => new Answer(413, "tooLarge", "The request is larger than this server takes. Send fewer files at once."),
            StatusCodes.Status415UnsupportedMediaType => new Answer(415, "unsupportedMediaType", "This address does not take a body of this media type."),
            StatusCodes.Status500InternalServerError => new Answer(500, "fault", "The server failed. Nothing of the request was kept; try it again."),
            var status => new Answer(status, "refused", "The request was refused."),
        };
        return refusal.WriteAsync(http);
    }
}

/// <summary>A refusal that a middleware answers, before any route.</summary>
internal sealed record Answer(int Status, string Code, string Sentence) : Refusal(Status, Code, Sentence)
{
    /// <summary>Writes it.</summary>
    public async Task WriteAsync(HttpContext http)
    {
        http.Response.StatusCode = Status;
        await http.RequestServices.GetRequiredService<IProblemDetailsService>()
            .WriteAsync(new ProblemDetailsContext { HttpContext = http, ProblemDetails = RefusalMapping.Describe(this) });
    }
}

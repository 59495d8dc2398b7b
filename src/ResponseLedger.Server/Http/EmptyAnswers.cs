using Microsoft.AspNetCore.Diagnostics;

namespace ResponseLedger.Server.Http;

/// <summary>Gives errors that the framework answers without a body (no route, wrong method, wrong media type) their problem details.</summary>
internal static class EmptyAnswers
{
    public static Task FillAsync(StatusCodeContext context)
    {
        var http = context.HttpContext;
        Refusal refusal = http.Response.StatusCode switch
        {
            StatusCodes.Status404NotFound => new Answer(404, "notFound", "There is nothing at this address."),
            StatusCodes.Status405MethodNotAllowed => new Answer(405, "methodNotAllowed", $"This address does not take {http.Request.Method}; the header Allow names what it takes."),
            StatusCodes.Status413PayloadTooLarge => new TooLarge(RequestGuard.TakesFiles(http.Request)),
            StatusCodes.Status415UnsupportedMediaType => new Answer(415, "unsupportedMediaType", "This address does not take a body of this media type."),
            StatusCodes.Status500InternalServerError => new Fault(),
            var status => new Answer(status, "refused", "The request was refused."),
        };
        return Answer.WriteAsync(refusal, http);
    }
}

/// <summary>A refusal that a middleware answers, before any route.</summary>
internal sealed record Answer(int Status, string Code, string Sentence) : Refusal(Status, Code, Sentence)
{
    /// <summary>Writes it.</summary>
    public Task WriteAsync(HttpContext http) => WriteAsync(this, http);

    /// <summary>Writes a refusal.</summary>
    public static async Task WriteAsync(Refusal refusal, HttpContext http)
    {
        http.Response.StatusCode = refusal.Status;
        await http.RequestServices.GetRequiredService<IProblemDetailsService>()
            .WriteAsync(new ProblemDetailsContext { HttpContext = http, ProblemDetails = RefusalMapping.Describe(refusal) });
    }
}

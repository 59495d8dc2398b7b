using System.Text.Json;
using Microsoft.AspNetCore.Diagnostics;
using Microsoft.AspNetCore.Mvc;

namespace ResponseLedger.Server.Http;

/// <summary>The one place where refusals, broken requests and a store that is away become problem details (RFC 9457).</summary>
internal sealed class RefusalMapping(IProblemDetailsService problems) : IExceptionHandler
{
    /// <summary>The problem document of a refusal.</summary>
    public static ProblemDetails Describe(Refusal refusal)
    {
        var problem = Problem(refusal.Status, refusal.Code, refusal.Sentence);
        if (refusal.Errors.Count > 0)
            problem.Extensions["errors"] = refusal.Errors;
        if (refusal.Reason is { } reason)
            problem.Extensions["reason"] = reason;
        return problem;
    }

    public async ValueTask<bool> TryHandleAsync(HttpContext httpContext, Exception exception, CancellationToken cancellationToken)
    {
        var problem = exception switch
        {
            RefusedException refused => Describe(refused.Refusal),

            // An inner one is of the reader, which met no JSON at all: then no member is to blame, wherever the reading stopped.
            BadHttpRequestException { InnerException: JsonException { InnerException: not JsonException, Path: { Length: > 1 } path } } =>
                Describe(new FieldRefused(path.TrimStart('$', '.'), "This member has another type or form than the one expected here.")),
            BadHttpRequestException { StatusCode: StatusCodes.Status413PayloadTooLarge } => Describe(new TooLarge(RequestGuard.TakesFiles(httpContext.Request))),
            BadHttpRequestException bad => Problem(bad.StatusCode, "badRequest", BadRequestSentence(bad)),
            _ when StoreAway.Caused(exception) => Describe(new StoreAway()),
            _ => null,
        };
        if (problem is null)
            return false;
        if (problem.Status == StatusCodes.Status503ServiceUnavailable)
            httpContext.Response.Headers.RetryAfter = StoreAway.RetryAfterSeconds;

        httpContext.Response.StatusCode = problem.Status ?? StatusCodes.Status500InternalServerError;
        return await problems.TryWriteAsync(new ProblemDetailsContext { HttpContext = httpContext, ProblemDetails = problem });
    }

    private static ProblemDetails Problem(int status, string code, string sentence) => new()
    {
        Status = status,
        Detail = sentence,
        Extensions = { ["code"] = code },
    };

    private static string BadRequestSentence(BadHttpRequestException bad) => bad switch
    {
        { StatusCode: StatusCodes.Status415UnsupportedMediaType } => "The body must be JSON, sent as application/json.",
        { InnerException: JsonException } => "The body is not well-formed JSON, is cut short, or is no object.",
        _ => "The request could not be read: a parameter or the body is missing or malformed.",
    };
}

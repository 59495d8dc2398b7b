using Microsoft.AspNetCore.Http.Json;
using Microsoft.AspNetCore.WebUtilities;
using Microsoft.Extensions.Options;

namespace ResponseLedger.Server.Http;

/// <summary>Writes problem details whatever the request accepts: an error must be readable to whoever asked for CSV or an Arrow stream too.</summary>
internal sealed class ProblemWriter(IOptions<JsonOptions> json) : IProblemDetailsWriter
{
    private static readonly Refusal Fault = new Fault();

    public bool CanWrite(ProblemDetailsContext context) => true;

    public async ValueTask WriteAsync(ProblemDetailsContext context)
    {
        var response = context.HttpContext.Response;
        var problem = context.ProblemDetails;
        problem.Status ??= response.StatusCode;

        // A code says more than the framework's addresses of the RFC's sections; RFC 9457 leaves the type blank where the status says it all.
        problem.Type = "about:blank";
        if (problem.Status == StatusCodes.Status500InternalServerError && problem.Extensions.TryAdd("code", Fault.Code))
            problem.Detail = Fault.Sentence;
        problem.Title ??= ReasonPhrases.GetReasonPhrase(problem.Status.Value);
        problem.Extensions.TryAdd("traceId", context.HttpContext.TraceIdentifier);
        await response.WriteAsJsonAsync(problem, problem.GetType(), json.Value.SerializerOptions, "application/problem+json", context.HttpContext.RequestAborted);
    }
}

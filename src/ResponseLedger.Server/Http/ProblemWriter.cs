using Microsoft.AspNetCore.Http.Json;
using Microsoft.AspNetCore.WebUtilities;
using Microsoft.Extensions.Options;

namespace ResponseLedger.Server.Http;

/// <summary>Writes problem details whatever the request accepts: an error must be readable to whoever asked for CSV or an Arrow stream too.</summary>
internal sealed class ProblemWriter(IOptions<JsonOptions> json) : IProblemDetailsWriter
{
    public bool CanWrite(ProblemDetailsContext context) => true;

    public async ValueTask WriteAsync(ProblemDetailsContext context)
    {
        var response = context.HttpContext.Response;
        var problem = context.ProblemDetails;
        problem.Status ??= response.StatusCode;
        problem.Type ??= "about:blank";
        problem.Title ??= ReasonPhrases.GetReasonPhrase(problem.Status.Value);
        problem.Extensions.TryAdd("traceId", context.HttpContext.TraceIdentifier);
        await response.WriteAsJsonAsync(problem, problem.GetType(), json.Value.SerializerOptions, "application/problem+json", context.HttpContext.RequestAborted);
    }
}

using Microsoft.AspNetCore.Authorization;
using Microsoft.AspNetCore.OpenApi;
using Microsoft.OpenApi;
using ResponseLedger.Server.Devices;
using ResponseLedger.Server.Http;
using ResponseLedger.Server.People;

namespace ResponseLedger.Server.Start;

/// <summary>The OpenAPI document: who may call a route, by which scheme, and how it refuses. It is open to all, for it tells nothing that the source does not.</summary>
internal static class Description
{
    private const string Cookie = "session";
    private const string Bearer = "benchToken";

    public static void Add(IServiceCollection services) => services.AddOpenApi("v1", options =>
    {
        options.AddDocumentTransformer((document, _, _) =>
        {
            document.Info = new OpenApiInfo
            {
                Title = "ResponseLedger",
                Version = "v1",
                Description = "Sweep files in, a signed decision on a lot out. Errors are problem details (RFC 9457) with a stable code.",
            };
            document.Components ??= new OpenApiComponents();
            document.Components.SecuritySchemes = new Dictionary<string, IOpenApiSecurityScheme>
            {
                [Cookie] = new OpenApiSecurityScheme
                {
                    Type = SecuritySchemeType.ApiKey,
                    In = ParameterLocation.Cookie,
                    Name = PeopleServices.CookieName,
                    Description = $"A signed-in person (POST /api/session). Unsafe requests also carry {RequestGuard.Header}: 1.",
                },
                [Bearer] = new OpenApiSecurityScheme
                {
                    Type = SecuritySchemeType.Http,
                    Scheme = "bearer",
                    Description = "A bench by its token (POST /api/tokens), as far as its scopes reach.",
                },
            };
            return Task.CompletedTask;
        });
        options.AddOperationTransformer(Describe);
        options.AddSchemaTransformer(DescribeGivenAsync);
    });

    private static Task Describe(OpenApiOperation operation, OpenApiOperationTransformerContext context, CancellationToken cancellationToken)
    {
        var metadata = context.Description.ActionDescriptor.EndpointMetadata;
        operation.Responses ??= [];
        if (!(context.Description.RelativePath ?? "").StartsWith("api/", StringComparison.Ordinal))
            return Task.CompletedTask;

        if (!metadata.OfType<IAllowAnonymous>().Any())
        {
            var policy = metadata.OfType<IAuthorizeData>().Select(data => data.Policy).OfType<string>().First();
            operation.Description = $"{operation.Description} Policy: {policy}.".TrimStart();
            operation.Security = [Requirement(Cookie, context)];
            if (policy is Policies.Read or Policies.SendRuns)
                operation.Security.Add(Requirement(Bearer, context));
            Problem(operation, 401, "Nobody is signed in.");
            Problem(operation, 403, "The roles or scopes do not reach, or the request comes from another site.");
        }

        if (context.Description.HttpMethod is not ("GET" or "HEAD"))
            Problem(operation, 400, $"The header {RequestGuard.Header} is missing, or the body cannot be read.");
        Problem(operation, 429, "Too many requests; Retry-After says when to go on.");
        Problem(operation, 503, "The server is starting; Retry-After says when to go on.");
        return Task.CompletedTask;
    }

    // A member that may be left out or set to null is described as the value that it takes, or null.
    private static async Task DescribeGivenAsync(OpenApiSchema schema, OpenApiSchemaTransformerContext context, CancellationToken cancellationToken)
    {
        var type = context.JsonTypeInfo.Type;
        if (!type.IsGenericType || type.GetGenericTypeDefinition() != typeof(Given<>))
            return;

        var value = type.GetGenericArguments()[0];
        var described = await context.GetOrCreateSchemaAsync(Nullable.GetUnderlyingType(value) ?? value, null, cancellationToken);
        schema.Type = described.Type | JsonSchemaType.Null;
        schema.Format = described.Format;
        schema.Properties = null;
        schema.Required = null;
    }

    private static OpenApiSecurityRequirement Requirement(string scheme, OpenApiOperationTransformerContext context)
        => new() { [new OpenApiSecuritySchemeReference(scheme, context.Document)] = [] };

    private static void Problem(OpenApiOperation operation, int status, string sentence)
        => operation.Responses!.TryAdd(status.ToString(System.Globalization.CultureInfo.InvariantCulture), new OpenApiResponse
        {
            Description = sentence,
            Content = new Dictionary<string, OpenApiMediaType> { ["application/problem+json"] = new() },
        });
}

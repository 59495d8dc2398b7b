using Microsoft.OpenApi;

namespace ResponseLedger.Server.Runs.Upload;

/// <summary>Describes a multipart form that a handler reads by itself.</summary>
internal static class FormBody
{
    private const string Multipart = "multipart/form-data";

    /// <summary>
    /// Tells the description of the API what the form holds. It does so without the metadata that routing acts on, for that would
    /// answer 415 to a body of another type before anybody asked who sent it.
    /// </summary>
    public static RouteHandlerBuilder TakesForm<TForm>(this RouteHandlerBuilder route)
        => route.AddOpenApiOperationTransformer(async (operation, context, cancellationToken) => operation.RequestBody = new OpenApiRequestBody
        {
            Required = true,
            Content = new Dictionary<string, OpenApiMediaType>
            {
                [Multipart] = new() { Schema = await context.GetOrCreateSchemaAsync(typeof(TForm), null, cancellationToken) },
            },
        });
}

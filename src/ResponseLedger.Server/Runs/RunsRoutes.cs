using Microsoft.AspNetCore.Mvc;
using ResponseLedger.Server.People;
using ResponseLedger.Server.Runs.Upload;

namespace ResponseLedger.Server.Runs;

/// <summary>The routes of this feature and the services that they need.</summary>
internal static class RunsRoutes
{
    // The parts' heads and boundaries come on top of what the form counts.
    private const long LargestBodyBytes = UploadForm.LargestRequestBytes + (4L << 20);

    public static void AddServices(IServiceCollection services)
    {
        services.AddScoped<UploadBenches>();
        services.AddScoped<UploadRoute>();
    }

    public static void Map(IEndpointRouteBuilder api)
    {
        api.MapPost("/runs", UploadRoute.HandleAsync)
            .RequireAuthorization(Policies.SendRuns)
            .WithMetadata(new RequestSizeLimitAttribute(LargestBodyBytes))
            .Accepts<UploadDocument>("multipart/form-data")
            .Produces<UploadAnswer>()
            .Produces<UploadAnswer>(StatusCodes.Status201Created)
            .ProducesProblem(StatusCodes.Status403Forbidden)
            .ProducesProblem(StatusCodes.Status413PayloadTooLarge)
            .ProducesProblem(StatusCodes.Status415UnsupportedMediaType)
            .ProducesValidationProblem(StatusCodes.Status422UnprocessableEntity)
            .WithName("sendRuns")
            .WithSummary("Sends sweep files: each is taken or refused whole, and answered with its verdict.");
    }
}

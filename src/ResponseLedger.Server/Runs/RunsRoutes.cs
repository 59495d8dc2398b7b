using System.Text.Json.Nodes;
using ResponseLedger.Server.Http;
using ResponseLedger.Server.Lots;
using ResponseLedger.Server.People;
using ResponseLedger.Server.Runs.Upload;

namespace ResponseLedger.Server.Runs;

/// <summary>The routes of this feature and the services that they need.</summary>
internal static class RunsRoutes
{
    private const string Bytes = "application/octet-stream";

    public static void AddServices(IServiceCollection services)
    {
        services.AddScoped<UploadBenches>();
        services.AddScoped<UploadRoute>();
        services.AddScoped<RunViews>();
        services.AddScoped<ReassignRun>();
    }

    public static void Map(IEndpointRouteBuilder api)
    {
        var runs = api.MapGroup("/runs").WithTags("Runs");
        MapSending(runs);
        MapReading(runs);
        MapChanging(runs);
        api.MapGet("/measures", RunMeasures.Catalogue).WithTags("Runs").RequireAuthorization(Policies.Read)
            .WithName("listMeasures").WithSummary("Every measure with its parameters and outputs: what masks can require and runs can be asked for.");
    }

    private static void MapSending(RouteGroupBuilder runs)
    {
        runs.MapPost("", UploadRoute.HandleAsync).RequireAuthorization(Policies.SendRuns)
            .TakesForm<UploadDocument>()
            .Produces<UploadAnswer>().Produces<UploadAnswer>(StatusCodes.Status201Created)
            .ProducesProblem(StatusCodes.Status403Forbidden).ProducesProblem(StatusCodes.Status413PayloadTooLarge)
            .ProducesProblem(StatusCodes.Status415UnsupportedMediaType).ProducesValidationProblem(StatusCodes.Status422UnprocessableEntity)
            .WithName("sendRuns").WithSummary("Sends sweep files: each is taken or refused whole, and answered with its verdict.");
        runs.MapPost("/preview", PreviewRoute.HandleAsync).RequireAuthorization(Policies.Operate)
            .TakesForm<PreviewDocument>()
            .ProducesProblem(StatusCodes.Status413PayloadTooLarge).ProducesProblem(StatusCodes.Status415UnsupportedMediaType)
            .ProducesValidationProblem(StatusCodes.Status422UnprocessableEntity)
            .WithName("previewFile").WithSummary("Reads a file and stores nothing: what each column was taken for, what is wrong, and the curve.");
    }

    private static void MapReading(RouteGroupBuilder runs)
    {
        runs.MapGet("", ReadRuns.ListAsync).RequireAuthorization(Policies.Read)
            .ProducesValidationProblem(StatusCodes.Status422UnprocessableEntity)
            .WithName("listRuns").WithSummary("Runs, the newest received first; `from` and `to` are times of measuring.");
        runs.MapGet("/{id:guid}", ReadRuns.GetAsync).RequireAuthorization(Policies.Read)
            .ProducesProblem(StatusCodes.Status404NotFound)
            .WithName("getRun").WithSummary("One run: where it belongs, how it was read, whether it counts, what it came to.");
        runs.MapGet("/{id:guid}/trace", RunTraces.GetAsync).RequireAuthorization(Policies.Read)
            .ProducesProblem(StatusCodes.Status404NotFound).ProducesValidationProblem(StatusCodes.Status422UnprocessableEntity)
            .WithName("getTrace").WithSummary("The curve, all points or reduced to `points` without losing a peak or a notch.");
        runs.MapGet("/{id:guid}/overlay", RunOverlay.GetAsync).RequireAuthorization(Policies.Read)
            .Produces<OverlayShape>().ProducesProblem(StatusCodes.Status404NotFound).ProducesProblem(StatusCodes.Status409Conflict)
            .ProducesValidationProblem(StatusCodes.Status422UnprocessableEntity)
            .WithName("getRunOverlay").WithSummary("The run with its golden run and its limits, as the overlay of a lot draws them.");
        runs.MapGet("/{id:guid}/file", RunFileRoutes.OriginalAsync).RequireAuthorization(Policies.Read)
            .Produces<byte[]>(contentType: Bytes).ProducesProblem(StatusCodes.Status404NotFound)
            .WithName("getFile").WithSummary("The bytes as they came; `index` picks a file of several.");
        runs.MapGet("/{id:guid}/export", RunFileRoutes.ExportAsync).RequireAuthorization(Policies.Read)
            .Produces<byte[]>(contentType: Bytes).ProducesProblem(StatusCodes.Status404NotFound).ProducesProblem(StatusCodes.Status409Conflict)
            .ProducesValidationProblem(StatusCodes.Status422UnprocessableEntity)
            .WithName("exportRun").WithSummary("The curve as CSV or Touchstone.");
        runs.MapGet("/{id:guid}/verdict", RunVerdictRoute.GetAsync).RequireAuthorization(Policies.Read)
            .ProducesProblem(StatusCodes.Status404NotFound)
            .WithName("getVerdict").WithSummary("The verdict in full, on the basis that holds for the run.");
        runs.MapPost("/{id:guid}/measures", RunMeasures.EvaluateAsync).Validated<MeasuresAsked>().RequireAuthorization(Policies.Read)
            .Produces<JsonObject>().ProducesProblem(StatusCodes.Status404NotFound)
            .WithName("measureRun").WithSummary("Any measures of the run, on demand; nothing is stored.");
    }

    private static void MapChanging(RouteGroupBuilder runs)
    {
        runs.MapPost("/{id:guid}/invalidation", InvalidateRun.HandleAsync).Validated<InvalidationAsked>().RequireAuthorization(Policies.Engineer)
            .ProducesProblem(StatusCodes.Status404NotFound).ProducesProblem(StatusCodes.Status409Conflict)
            .WithName("invalidateRun").WithSummary("Takes a run out of what counts, with its assignable cause; everything is kept.");
        runs.MapPost("/{id:guid}/reassignment", ReassignRun.HandleAsync).Validated<ReassignmentAsked>().RequireAuthorization(Policies.Engineer)
            .ProducesProblem(StatusCodes.Status404NotFound).ProducesProblem(StatusCodes.Status409Conflict)
            .WithName("reassignRun").WithSummary("Moves a run that was sent for the wrong unit, lot or condition.");
    }
}

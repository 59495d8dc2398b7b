using ResponseLedger.Server.Http;
using ResponseLedger.Server.People;
using ResponseLedger.Store.Reevaluation;

namespace ResponseLedger.Server.Masks;

/// <summary>The routes of masks and of re-evaluation, and the services that they need.</summary>
internal static class MasksRoutes
{
    public static void AddServices(IServiceCollection services)
    {
        services.AddSingleton<Reevaluator>();
        services.AddSingleton<ReevaluationService>();
        services.AddHostedService(provider => provider.GetRequiredService<ReevaluationService>());
        services.AddSingleton<ReevaluationAfterChange>();
    }

    public static void Map(IEndpointRouteBuilder api)
    {
        var ofDevice = api.MapGroup("/devices/{id:guid}/masks").WithTags("Masks").RequireAuthorization(Policies.Read);
        ofDevice.MapGet("", ReadMasks.ListAsync)
            .WithName("listMasks").WithSummary("Drafts and released masks of a device, newest first; `condition` takes a name or an id.")
            .ProducesProblem(StatusCodes.Status404NotFound).ProducesValidationProblem(StatusCodes.Status422UnprocessableEntity);
        ofDevice.MapPost("", DraftMasks.CreateAsync).Validated<NewMask>().RequireAuthorization(Policies.Engineer)
            .WithName("createMask").WithSummary("A new draft; `from` copies another mask of the device into it.")
            .ProducesProblem(StatusCodes.Status404NotFound).ProducesProblem(StatusCodes.Status409Conflict);

        var masks = api.MapGroup("/masks/{id:guid}").WithTags("Masks").RequireAuthorization(Policies.Read);
        masks.MapGet("", ReadMasks.GetAsync)
            .WithName("getMask").WithSummary("One mask; a draft carries an ETag and what keeps it from being released.")
            .ProducesProblem(StatusCodes.Status404NotFound);
        masks.MapPut("", DraftMasks.ReplaceAsync).Validated<MaskContent>().RequireAuthorization(Policies.Engineer)
            .WithName("replaceMask").WithSummary("Saves a draft; If-Match names the state that was changed.")
            .ProducesProblem(StatusCodes.Status404NotFound).ProducesProblem(StatusCodes.Status409Conflict)
            .ProducesProblem(StatusCodes.Status412PreconditionFailed).ProducesProblem(StatusCodes.Status428PreconditionRequired);
        masks.MapDelete("", DraftMasks.DiscardAsync).RequireAuthorization(Policies.Engineer)
            .WithName("discardMask").WithSummary("Discards a draft; a released mask stays for good.")
            .ProducesProblem(StatusCodes.Status404NotFound).ProducesProblem(StatusCodes.Status409Conflict)
            .ProducesProblem(StatusCodes.Status412PreconditionFailed);
        masks.MapPost("/release", ReleaseMask.ReleaseAsync).Validated<MaskRelease>().RequireAuthorization(Policies.Engineer)
            .WithName("releaseMask").WithSummary("Releases a draft as the next revision; runs of open lots are evaluated again.")
            .ProducesProblem(StatusCodes.Status404NotFound).ProducesProblem(StatusCodes.Status409Conflict)
            .ProducesProblem(StatusCodes.Status412PreconditionFailed);

        api.MapGet("/reevaluation", ReevaluationReport.GetAsync).WithTags("Masks").RequireAuthorization(Policies.Read)
            .WithName("getReevaluation").WithSummary("Conditions with runs of open lots that wait for their verdict on the basis in force.");
    }
}

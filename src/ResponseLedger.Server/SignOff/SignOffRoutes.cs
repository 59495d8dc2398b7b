using ResponseLedger.Server.Http;
using ResponseLedger.Server.People;

namespace ResponseLedger.Server.SignOff;

/// <summary>The routes of sign-off: dispositions, decisions, reopenings, and the signed records.</summary>
internal static class SignOffRoutes
{
    public static void AddServices(IServiceCollection services)
    {
    }

    public static void Map(IEndpointRouteBuilder api)
    {
        var lots = api.MapGroup("/lots/{id:guid}").WithTags("Sign-off").RequireAuthorization(Policies.Read)
            .ProducesProblem(StatusCodes.Status404NotFound);
        lots.MapPost("/units/{unitId:guid}/disposition", DispositionUnit.HandleAsync).Validated<NewDisposition>().RequireAuthorization(Policies.Sign)
            .WithName("dispositionUnit").WithSummary("Says what becomes of a unit that does not pass: rework, scrap, return or concession.")
            .ProducesProblem(StatusCodes.Status409Conflict);
        lots.MapPost("/decisions", DecideLot.HandleAsync).Validated<NewDecision>().RequireAuthorization(Policies.Sign)
            .WithName("decideLot").WithSummary("Signs a decision on a lot; the record pins everything that it rests on.")
            .ProducesProblem(StatusCodes.Status403Forbidden).ProducesProblem(StatusCodes.Status409Conflict);
        lots.MapGet("/signing", ReadSigning.GetAsync).RequireAuthorization(Policies.Sign)
            .WithName("getSigning").WithSummary("What a decision signed now would pin and mean, what stands against each, and the digest `seen` that a decision may send back.")
            .ProducesProblem(StatusCodes.Status409Conflict);
        lots.MapGet("/decisions", ReadDecisions.ListAsync)
            .WithName("listDecisions").WithSummary("The decisions on a lot, newest first, with the reopening that undid each.")
            .ProducesValidationProblem(StatusCodes.Status422UnprocessableEntity);
        lots.MapPost("/reopenings", ReopenLot.HandleAsync).Validated<NewReopening>().RequireAuthorization(Policies.Quality)
            .WithName("reopenLot").WithSummary("Opens a decided lot again; the decision and its record stay.")
            .ProducesProblem(StatusCodes.Status409Conflict);

        var decisions = api.MapGroup("/decisions/{id:guid}").WithTags("Sign-off").RequireAuthorization(Policies.Read)
            .ProducesProblem(StatusCodes.Status404NotFound);
        decisions.MapGet("", ReadDecisions.GetAsync)
            .WithName("getDecision").WithSummary("A signed decision with its record.");
        decisions.MapGet("/record", ReadDecisions.RecordAsync)
            .WithName("getDecisionRecord").WithSummary("The exact bytes that were signed; the ETag is their SHA-256.")
            .Produces<byte[]>(StatusCodes.Status200OK, "application/json");
    }
}

using ResponseLedger.Server.Http;
using ResponseLedger.Server.People;

namespace ResponseLedger.Server.Lots;

/// <summary>The routes of lots, their units, statistics and overlays.</summary>
internal static class LotsRoutes
{
    public static void AddServices(IServiceCollection services)
    {
    }

    public static void Map(IEndpointRouteBuilder api)
    {
        var lots = api.MapGroup("/lots").WithTags("Lots").RequireAuthorization(Policies.Read);

        lots.MapGet("", ReadLots.ListAsync)
            .WithName("listLots")
            .WithSummary("Lots, newest first. `state` is open, approved, approvedWithConcession or rejected, or decided for any of the last three; `device` an id, a part number or PART/REV; `search` looks in lot numbers and part numbers, and for a whole serial number.")
            .ProducesValidationProblem(StatusCodes.Status422UnprocessableEntity);
        lots.MapPost("", WriteLots.CreateAsync).Validated<NewLot>().RequireAuthorization(Policies.Operate)
            .WithName("createLot").WithSummary("Opens a lot; the serial numbers of its units may be declared.")
            .ProducesProblem(StatusCodes.Status409Conflict);
        lots.MapGet("/{id:guid}", ReadLots.GetAsync)
            .WithName("getLot").WithSummary("One lot with its counts and what stands against its approval.")
            .ProducesProblem(StatusCodes.Status404NotFound);
        lots.MapGet("/{id:guid}/units", LotUnits.ListAsync)
            .WithName("listLotUnits").WithSummary("The units of a lot: `sort=margin` (the default) puts the worst first, `sort=serial` goes by serial number.")
            .ProducesProblem(StatusCodes.Status404NotFound).ProducesValidationProblem(StatusCodes.Status422UnprocessableEntity);
        lots.MapGet("/{id:guid}/statistics", ReadLotStatistics.GetAsync)
            .WithName("getLotStatistics").WithSummary("First-pass and final yield, and the margins of every criterion.")
            .ProducesProblem(StatusCodes.Status404NotFound);
        lots.MapGet("/{id:guid}/overlay", ReadOverlay.GetAsync)
            .WithName("getLotOverlay")
            .WithSummary("The curves of all counting runs of a condition on one frequency axis, as JSON or, by Accept, as an Arrow stream. `quantity` is gain, phase or delay; `basis` asMeasured or minusGolden; `points` is at most how many frequencies.")
            .Produces<OverlayShape>(StatusCodes.Status200OK, "application/json", OverlayArrow.MediaType)
            .ProducesProblem(StatusCodes.Status404NotFound).ProducesProblem(StatusCodes.Status409Conflict)
            .ProducesValidationProblem(StatusCodes.Status422UnprocessableEntity);
    }
}

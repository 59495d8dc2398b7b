using ResponseLedger.Server.Http;
using ResponseLedger.Server.People;

namespace ResponseLedger.Server.Benches;

/// <summary>The routes of benches.</summary>
internal static class BenchesRoutes
{
    public static void AddServices(IServiceCollection services)
    {
    }

    public static void Map(IEndpointRouteBuilder api)
    {
        var benches = api.MapGroup("/benches").WithTags("Benches").RequireAuthorization(Policies.Read);

        benches.MapGet("", ReadBenches.ListAsync)
            .WithName("listBenches").WithSummary("Benches by name, with when each was last heard of.")
            .ProducesValidationProblem(StatusCodes.Status422UnprocessableEntity);
        benches.MapPost("", WriteBenches.CreateAsync).Validated<NewBench>().RequireAuthorization(Policies.Manage)
            .WithName("createBench").WithSummary("A new bench.")
            .ProducesProblem(StatusCodes.Status409Conflict);
        benches.MapGet("/{id:guid}", ReadBenches.GetAsync)
            .WithName("getBench").WithSummary("One bench with its settings and the columns that it remembers.")
            .ProducesProblem(StatusCodes.Status404NotFound);

        benches.MapPost("/{id:guid}/serials", SerialsInNames.FindAsync).Validated<NamesAsked>().RequireAuthorization(Policies.Operate)
            .WithName("findSerials").WithSummary("The serial numbers that uploads from this bench would take these file names for; stores nothing.")
            .ProducesProblem(StatusCodes.Status404NotFound);

        // The handler asks for a manager where anything but the serial pattern is to change.
        benches.MapPatch("/{id:guid}", WriteBenches.ChangeAsync).Validated<BenchChange>().RequireAuthorization(Policies.Engineer)
            .WithName("changeBench").WithSummary("Changes a bench's settings; an engineer may change the serial pattern, a manager all of them.")
            .ProducesProblem(StatusCodes.Status403Forbidden).ProducesProblem(StatusCodes.Status404NotFound).ProducesProblem(StatusCodes.Status409Conflict);
    }
}

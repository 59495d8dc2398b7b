using ResponseLedger.Server.Http;
using ResponseLedger.Server.People;

namespace ResponseLedger.Server.Devices;

/// <summary>The routes of devices, their conditions and their golden unit.</summary>
internal static class DevicesRoutes
{
    public static void AddServices(IServiceCollection services)
    {
    }

    public static void Map(IEndpointRouteBuilder api)
    {
        var devices = api.MapGroup("/devices").WithTags("Devices").RequireAuthorization(Policies.Read);

        devices.MapGet("", ReadDevices.ListAsync)
            .WithName("listDevices").WithSummary("Devices by part number and revision; `search` looks in part number, revision and title.")
            .ProducesValidationProblem(StatusCodes.Status422UnprocessableEntity);
        devices.MapPost("", WriteDevices.CreateAsync).Validated<NewDevice>().RequireAuthorization(Policies.Engineer)
            .WithName("createDevice").WithSummary("A new device, with the condition \"standard\".")
            .ProducesProblem(StatusCodes.Status409Conflict);
        devices.MapGet("/{id:guid}", ReadDevices.GetAsync)
            .WithName("getDevice").WithSummary("One device with its conditions, their masks and golden runs, and its settings.")
            .ProducesProblem(StatusCodes.Status404NotFound);

        // The handler asks for quality where a rule of signing is to change, and for an engineer where anything else is.
        devices.MapPatch("/{id:guid}", WriteDevices.ChangeAsync).Validated<DeviceChange>().RequireAuthorization(Policies.Sign)
            .WithName("changeDevice").WithSummary("Changes the title or the rules of a device; members left out stay as they are. The rules of signing are the role quality's, the others an engineer's.")
            .ProducesProblem(StatusCodes.Status403Forbidden).ProducesProblem(StatusCodes.Status404NotFound).ProducesProblem(StatusCodes.Status409Conflict);

        devices.MapGet("/{id:guid}/conditions", ReadDevices.ConditionsAsync)
            .WithName("listConditions").WithSummary("The sweeps that the device's test requires, in their order.")
            .ProducesProblem(StatusCodes.Status404NotFound);
        devices.MapPost("/{id:guid}/conditions", WriteDevices.AddConditionAsync).Validated<NewCondition>().RequireAuthorization(Policies.Engineer)
            .WithName("addCondition").WithSummary("A further sweep that the device's test requires from now on.")
            .ProducesProblem(StatusCodes.Status404NotFound).ProducesProblem(StatusCodes.Status409Conflict);

        devices.MapGet("/{id:guid}/golden", GoldenRuns.ListAsync)
            .WithName("listGolden").WithSummary("The golden run of each condition, and those before it.")
            .ProducesProblem(StatusCodes.Status404NotFound);
        devices.MapPut("/{id:guid}/golden", GoldenRuns.SetAsync).Validated<NewGolden>().RequireAuthorization(Policies.Engineer)
            .WithName("setGolden").WithSummary("Makes a run the golden run of its condition; runs of open lots are evaluated again.")
            .ProducesProblem(StatusCodes.Status404NotFound).ProducesProblem(StatusCodes.Status409Conflict);
    }
}

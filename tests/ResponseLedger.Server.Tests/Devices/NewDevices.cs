using System.Net;
using System.Net.Http.Json;
using System.Text.Json;

namespace ResponseLedger.Server.Tests.Devices;

/// <summary>Devices of a test's own.</summary>
internal static class NewDevices
{
    /// <summary>Makes a device through the API, as the engineer.</summary>
    public static async Task<NewDevice> NewDeviceAsync(this Lab lab, string kind = "transfer")
    {
        var engineer = await lab.SignInAsync("engineer");
        var body = await (await engineer.PostAsJsonAsync("/api/devices", new { partNumber = Lab.Unique("BUOY"), revision = "A", title = "Anti-alias board", kind }))
            .ShouldBeAsync(HttpStatusCode.Created);
        return new NewDevice(body.GetProperty("id").GetGuid(), body.GetProperty("conditions")[0].GetProperty("id").GetGuid(), body);
    }
}

/// <summary>A device with its first condition.</summary>
internal sealed record NewDevice(Guid Id, Guid ConditionId, JsonElement Body)
{
    public string PartNumber => Body.GetProperty("partNumber").GetString()!;
}

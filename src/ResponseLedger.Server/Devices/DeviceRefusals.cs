using ResponseLedger.Server.Http;

namespace ResponseLedger.Server.Devices;

internal sealed record DeviceExists(string PartNumber, string Revision)
    : Refusal(StatusCodes.Status409Conflict, "deviceExists", $"The device {PartNumber}/{Revision} is there already.");

internal sealed record ConditionExists(string Name)
    : Refusal(StatusCodes.Status409Conflict, "conditionExists", $"The device has a condition \"{Name}\" already.");

internal sealed record SettingsChanged()
    : Refusal(StatusCodes.Status409Conflict, "changedMeanwhile", "Somebody else changed these settings at the same moment. Look at them and send the change again.");

internal sealed record GoldenRunInvalidated()
    : Refusal(StatusCodes.Status409Conflict, "runInvalidated", "This run was invalidated; a golden run is a valid one. Choose another run.");

using ResponseLedger.Server.Devices;
using ResponseLedger.Server.Http;

namespace ResponseLedger.Server.Benches;

/// <summary>A bench to be made.</summary>
/// <param name="Name">1 to 100 characters, trimmed; unique.</param>
internal sealed record NewBench(string? Name);

/// <summary>What is to change of a bench; members left out stay, null clears.</summary>
/// <param name="SerialPattern">Regular expression that finds the serial in a file's name: its group "serial", or the whole match.</param>
/// <param name="NoiseFloorDb">Level in dB under which phase is not to be believed.</param>
/// <param name="Remark">Place, instruments, calibration; at most 2,000 characters.</param>
internal sealed record BenchChange(
    Given<string?> SerialPattern = default,
    Given<double?> NoiseFloorDb = default,
    Given<string?> Remark = default);

internal sealed record BenchExists(string Name)
    : Refusal(StatusCodes.Status409Conflict, "benchExists", $"There is a bench \"{Name}\" already.");

internal sealed record BenchChanged()
    : Refusal(StatusCodes.Status409Conflict, "changedMeanwhile", "Somebody else changed this bench at the same moment. Look at it and send the change again.");

using ResponseLedger.Server.Devices;
using ResponseLedger.Server.Http;

namespace ResponseLedger.Server.Benches;

/// <summary>A bench to be made.</summary>
/// <param name="Name">1 to 100 characters, trimmed; unique.</param>
internal sealed record NewBench(string? Name);

/// <summary>What is to change of a bench; members left out stay, null clears.</summary>
internal sealed record BenchChange
{
    /// <summary>Regular expression that finds the serial in a file's name: its group "serial", or the whole match.</summary>
    public Given<string?> SerialPattern { get; init; }

    /// <summary>Level in dB under which phase is not to be believed.</summary>
    public Given<double?> NoiseFloorDb { get; init; }

    /// <summary>Place, instruments, calibration; at most 2,000 characters.</summary>
    public Given<string?> Remark { get; init; }
}

internal sealed record BenchExists(string Name)
    : Refusal(StatusCodes.Status409Conflict, "benchExists", $"There is a bench \"{Name}\" already.");

internal sealed record BenchChanged()
    : Refusal(StatusCodes.Status409Conflict, "changedMeanwhile", "Somebody else changed this bench at the same moment. Look at it and send the change again.");

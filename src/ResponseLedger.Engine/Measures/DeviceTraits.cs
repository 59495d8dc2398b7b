namespace ResponseLedger.Engine.Measures;

/// <summary>What measures need to know of the device.</summary>
/// <param name="IsLoop">Whether the sweep is an open-loop gain.</param>
/// <param name="CriticalPhaseDeg">-180 or 0 degrees, as the bench measures the loop.</param>
public sealed record DeviceTraits(bool IsLoop, double CriticalPhaseDeg)
{
    /// <summary>A device measured from input to output.</summary>
    public static DeviceTraits Transfer { get; } = new(false, -180);
}

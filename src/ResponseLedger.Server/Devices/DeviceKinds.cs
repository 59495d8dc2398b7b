namespace ResponseLedger.Server.Devices;

/// <summary>The words that a device is described by.</summary>
internal static class DeviceKinds
{
    /// <summary>Measured from input to output.</summary>
    public const string Transfer = "transfer";

    /// <summary>Measured as an open-loop gain.</summary>
    public const string Loop = "loop";

    /// <summary>The unit of a gain that has none of its own.</summary>
    public const string UsualGainUnit = "V/V";

    /// <summary>Critical phase of a loop, degrees, unless stated.</summary>
    public const short UsualCriticalPhaseDeg = -180;

    /// <summary>Simple acceptance: the measured value alone decides.</summary>
    public const string SimpleRule = "simple";

    /// <summary>The condition that every new device has.</summary>
    public const string FirstCondition = "standard";
}

namespace ResponseLedger.Server.Devices;

/// <summary>A device to be made. Texts are trimmed.</summary>
/// <param name="PartNumber">1 to 100 characters without a slash, because PART/REV names a device.</param>
/// <param name="Revision">1 to 100 characters.</param>
/// <param name="Title">1 to 100 characters.</param>
/// <param name="Kind">"transfer" or "loop".</param>
/// <param name="GainUnit">Unit of the gain, such as V/Pa; V/V where left out.</param>
/// <param name="CriticalPhaseDeg">-180 or 0 degrees, for loops; -180 where left out.</param>
internal sealed record NewDevice(string? PartNumber, string? Revision, string? Title, string? Kind, string? GainUnit = null, double? CriticalPhaseDeg = null);

/// <summary>What is to change of a device; members left out stay as they are.</summary>
/// <param name="Title">1 to 100 characters.</param>
/// <param name="SigningNeedsQuality">Whether only the role quality may sign.</param>
/// <param name="SigningNeedsTwo">Whether a lot needs two signers; not offered by this version.</param>
/// <param name="SigningExcludesOwnRuns">Whether nobody may sign for a lot with runs that they sent themselves.</param>
/// <param name="DecisionRule">Only "simple" is offered by this version.</param>
/// <param name="Inverting">Whether the device is meant to invert.</param>
internal sealed record DeviceChange(
    string? Title = null,
    bool? SigningNeedsQuality = null,
    bool? SigningNeedsTwo = null,
    bool? SigningExcludesOwnRuns = null,
    string? DecisionRule = null,
    bool? Inverting = null)
{
    /// <summary>How many retests of a unit in a condition may come to count; null for any number.</summary>
    public Given<int?> RetestsAllowed { get; init; }
}

/// <summary>A condition to be added.</summary>
/// <param name="Name">1 to 100 characters, trimmed; unique within the device.</param>
internal sealed record NewCondition(string? Name);

/// <summary>The run to compare others of its condition with.</summary>
/// <param name="RunId">A valid run of this device, of any purpose.</param>
/// <param name="Reason">Why this one; 1 to 1,000 characters.</param>
internal sealed record NewGolden(Guid? RunId, string? Reason);

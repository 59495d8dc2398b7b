namespace ResponseLedger.Store.Intake;

/// <summary>What a run is for.</summary>
public static class RunPurposes
{
    /// <summary>A run of a lot's unit, on which the lot is decided; the only purpose that needs a lot.</summary>
    public const string Production = "production";

    /// <summary>A run of a unit that others may be compared with.</summary>
    public const string Golden = "golden";

    /// <summary>A run of the bench without a unit, to normalise by.</summary>
    public const string Through = "through";

    /// <summary>A run of the bench's check standard.</summary>
    public const string Check = "check";

    /// <summary>Any other run.</summary>
    public const string Study = "study";

    /// <summary>All of them.</summary>
    public static IReadOnlyList<string> All { get; } = [Production, Golden, Through, Check, Study];
}

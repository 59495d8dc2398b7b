using ResponseLedger.Engine.Masks;
using ResponseLedger.Server.Http;

namespace ResponseLedger.Server.Lots;

/// <summary>What an overlay is asked for.</summary>
/// <param name="Quantity">The curve that is drawn.</param>
/// <param name="MinusGolden">Whether it is drawn as the difference from the golden run.</param>
/// <param name="Points">At most how many frequencies.</param>
/// <param name="Condition">Id or name of the condition; null for the first.</param>
internal sealed record OverlayQuestion(CurveQuantity Quantity, bool MinusGolden, int Points, string? Condition)
{
    public const int UsualPoints = 800;

    /// <summary>Whether one run is drawn alone, so that limits can stand where they hold for it.</summary>
    public bool OneRun { get; init; }

    private const int FewestPoints = 2;
    private const int MostPoints = 20_000;

    /// <summary>The word for the quantity in the API.</summary>
    public string QuantityWord => Quantity switch
    {
        CurveQuantity.GainDb => "gain",
        CurveQuantity.PhaseDeg => "phase",
        _ => "delay",
    };

    /// <summary>The word for the basis in the API.</summary>
    public string BasisWord => MinusGolden ? "minusGolden" : "asMeasured";

    /// <summary>Reads the parameters of a request.</summary>
    /// <exception cref="RefusedException">A parameter is not one of its words, or out of its range.</exception>
    public static OverlayQuestion Parse(string? quantity, string? basis, int? points, string? condition) => new(
        quantity switch
        {
            null or "" or "gain" => CurveQuantity.GainDb,
            "phase" => CurveQuantity.PhaseDeg,
            "delay" => CurveQuantity.DelaySeconds,
            _ => throw new RefusedException(new FieldRefused("quantity", "The quantity is gain, phase or delay.")),
        },
        basis switch
        {
            null or "" or "asMeasured" => false,
            "minusGolden" => true,
            _ => throw new RefusedException(new FieldRefused("basis", "The basis is asMeasured or minusGolden.")),
        },
        points switch
        {
            null => UsualPoints,
            >= FewestPoints and <= MostPoints => points.Value,
            _ => throw new RefusedException(new FieldRefused("points", $"An overlay has {FewestPoints} to {MostPoints} points.")),
        },
        condition switch
        {
            null or "" => null,
            _ when condition.Contains('\0', StringComparison.Ordinal) => throw new RefusedException(new FieldRefused("condition", "The lot's device has no such condition.")),
            _ => condition,
        });

    /// <summary>The unit of the values.</summary>
    /// <param name="gainUnit">Unit of the device's gain.</param>
    public string UnitOf(string gainUnit) => Quantity switch
    {
        CurveQuantity.PhaseDeg => "deg",
        CurveQuantity.DelaySeconds => "s",
        _ when MinusGolden || gainUnit == "V/V" => "dB",
        _ => $"dB re 1 {gainUnit}",
    };
}

using ResponseLedger.Engine;
using ResponseLedger.Engine.Masks;
using ResponseLedger.Engine.Measures;
using ResponseLedger.Records.Masks;

namespace ResponseLedger.Records.Tests.Verdicts;

/// <summary>A mask of two limits and one requirement, and an evaluation as the engine would give it.</summary>
internal static class Samples
{
    private static readonly MeasureCall Level = new("level", new Dictionary<string, double> { ["frequencyHz"] = 1000 });

    public static MaskDocument Mask { get; } = new(
        "Pass band",
        new Mask(
            [
                new("top", CurveQuantity.GainDb, LimitSide.Upper, LimitBasis.Absolute, null, null, null, null, [new(100, 0.5), new(1000, 0.5)]),
                new("delay", CurveQuantity.DelaySeconds, LimitSide.Lower, LimitBasis.Absolute, null, null, null, null, [new(100, 0), new(1000, 0)]),
            ],
            [new("level at 1 kHz", Level, "gainDb", -0.5, null, null)]));

    public static Evaluation Evaluation { get; } = new(
        Outcome.Fail,
        0,
        [
            new("top", Outcome.Fail, -0.25, "dB", 500, null),
            new("delay", Outcome.Inconclusive, null, "s", null, new Absence("phaseAbsent", "The run has no phase; sweep with phase.")),
            new("level at 1 kHz", Outcome.Pass, 0.75, "dB", null, null),
        ],
        [new(new MeasureCall("level", new SortedDictionary<string, double> { ["frequencyHz"] = 1000 }), [new("gainDb", 0.25, "dB")], null, [], [], [])]);
}

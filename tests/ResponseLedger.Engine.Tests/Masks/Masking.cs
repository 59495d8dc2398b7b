using ResponseLedger.Engine.Masks;
using ResponseLedger.Engine.Measures;
using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Engine.Tests.Masks;

/// <summary>Short ways to write masks and judge runs.</summary>
internal static class Masking
{
    internal static CurveLimit Upper(params (double Hz, double Value)[] corners) => Limit(LimitSide.Upper, corners);

    internal static CurveLimit Lower(params (double Hz, double Value)[] corners) => Limit(LimitSide.Lower, corners);

    internal static CurveLimit Limit(LimitSide side, params (double Hz, double Value)[] corners)
        => new(side.ToString(), CurveQuantity.GainDb, side, LimitBasis.Absolute, null, null, null, null, [.. corners.Select(c => new LimitCorner(c.Hz, c.Value))]);

    internal static CurveLimit Of(this CurveLimit limit, CurveQuantity quantity) => limit with { Quantity = quantity };

    internal static CurveLimit AgainstGolden(this CurveLimit limit) => limit with { Basis = LimitBasis.Golden };

    internal static CriterionResult Judge(this Sweep run, CurveLimit limit, Sweep? golden = null)
    {
        var mask = new Mask([limit], []);
        Assert.Empty(MaskEvaluator.ProblemsOf(mask));
        return Assert.Single(MaskEvaluator.Evaluate(run, golden, mask, DeviceTraits.Transfer).Criteria);
    }

    internal static CriterionResult Judge(this Sweep run, Requirement requirement)
    {
        var mask = new Mask([], [requirement]);
        Assert.Empty(MaskEvaluator.ProblemsOf(mask));
        return Assert.Single(MaskEvaluator.Evaluate(run, null, mask, DeviceTraits.Transfer).Criteria);
    }

    internal static Requirement Require(string measure, string output, double? min, double? max, ReferenceLevel? reference, params (string Name, double Value)[] parameters)
        => new(measure + "." + output, new MeasureCall(measure, parameters.ToDictionary(p => p.Name, p => p.Value), reference), output, min, max, null);

    internal static void Is(this CriterionResult result, Outcome outcome, double? margin, double? frequencyHz, string? reason = null)
    {
        Assert.True(result.Outcome == outcome, $"{result.Outcome}, not {outcome}: margin {result.Margin}, {result.Reason?.Sentence}");
        if (margin is { } m)
            Measuring.Close(m, result.Margin, 1e-9, "margin");
        else
            Assert.Null(result.Margin);
        if (frequencyHz is { } f)
            Measuring.Close(f, result.FrequencyHz, 1e-12 * f, "frequency");
        else
            Assert.Null(result.FrequencyHz);
        Assert.Equal(reason, result.Reason?.Code);
    }
}

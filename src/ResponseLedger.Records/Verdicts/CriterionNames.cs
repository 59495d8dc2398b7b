using ResponseLedger.Engine.Masks;
using ResponseLedger.Engine.Measures;

namespace ResponseLedger.Records.Verdicts;

/// <summary>Name and unit of a mask's criterion by its place in verdicts: limits first, then requirements.</summary>
public static class CriterionNames
{
    /// <summary>Name and unit (dB, deg, s, Hz, dB/decade or 1) of a criterion.</summary>
    /// <exception cref="ArgumentException">The requirement names a measure or an output that is not known.</exception>
    public static (string Name, string Unit) At(Mask mask, int index)
    {
        ArgumentNullException.ThrowIfNull(mask);
        if (index < mask.Limits.Count)
        {
            var limit = mask.Limits[index];
            return (limit.Name, UnitOf(limit.Quantity));
        }

        var requirement = mask.Requirements[index - mask.Limits.Count];
        return (requirement.Name, UnitOf(requirement));
    }

    private static string UnitOf(CurveQuantity quantity) => quantity switch
    {
        CurveQuantity.GainDb => "dB",
        CurveQuantity.PhaseDeg => "deg",
        CurveQuantity.DelaySeconds => "s",
        _ => throw new ArgumentOutOfRangeException(nameof(quantity), quantity, "There is no such quantity."),
    };

    private static string UnitOf(Requirement requirement)
    {
        var definition = MeasureCatalogue.All.FirstOrDefault(d => d.Name == requirement.Call.Measure);
        var output = definition?.Outputs.FirstOrDefault(o => o.Name == requirement.Output);
        return output?.Unit
            ?? throw new ArgumentException($"No measure {requirement.Call.Measure} with an output {requirement.Output} is known.", nameof(requirement));
    }
}

namespace ResponseLedger.Engine.Measures;

/// <summary>What is wrong with a call of a measure before any run is seen.</summary>
internal static class MeasureCallCheck
{
    internal static List<MeasureProblem> ProblemsOf(MeasureCall call)
    {
        ArgumentNullException.ThrowIfNull(call);
        var problems = new List<MeasureProblem>();
        if (call.Measure is null || MeasureCatalogue.Find(call.Measure) is not { } definition)
        {
            string known = string.Join(", ", MeasureCatalogue.All.Select(m => m.Name));
            problems.Add(new("measure", $"There is no measure '{call.Measure}'; there are {known}."));
            return problems;
        }

        foreach (var parameter in definition.Parameters)
        {
            if (!call.Parameters.TryGetValue(parameter.Name, out double value))
            {
                if (parameter.Required)
                    problems.Add(new($"parameters.{parameter.Name}", $"{definition.Name} needs {parameter.Name}."));
                continue;
            }

            if (RangeProblem(parameter, value) is { } sentence)
                problems.Add(new($"parameters.{parameter.Name}", sentence));
        }

        foreach (string name in call.Parameters.Keys.Order(StringComparer.Ordinal))
        {
            if (!definition.Parameters.Any(p => p.Name == name))
                problems.Add(new($"parameters.{name}", $"{definition.Name} takes no {name}; it takes {Listed(definition)}."));
        }

        CheckOrder(call, "fromHz", "toHz", "The band's upper edge toHz must lie above fromHz.", problems);
        CheckOrder(call, "innerDropDb", "outerDropDb", "outerDropDb must be more than innerDropDb.", problems);
        CheckReference(call, definition, problems);
        return problems;
    }

    /// <summary>What is wrong with a reference level by itself; null when nothing is.</summary>
    internal static string? ReferenceProblem(ReferenceLevel reference) => reference switch
    {
        ReferenceLevel.AtFrequency at when !IsPositive(at.FrequencyHz) => "The reference's frequencyHz must be finite and above 0.",
        ReferenceLevel.Band band when !IsPositive(band.FromHz) || !IsPositive(band.ToHz) => "The reference band's edges must be finite and above 0.",
        ReferenceLevel.Band band when band.ToHz <= band.FromHz => "The reference band's toHz must lie above its fromHz.",
        _ => null,
    };

    private static bool IsPositive(double value) => double.IsFinite(value) && value > 0;

    private static string? RangeProblem(MeasureParameter parameter, double value)
    {
        if (!double.IsFinite(value))
            return $"{parameter.Name} must be finite.";
        return parameter.Range switch
        {
            ParameterRange.Positive when value <= 0 => $"{parameter.Name} must be above 0.",
            ParameterRange.AboveOne when value <= 1 => $"{parameter.Name} must be above 1.",
            ParameterRange.CriticalPhase when value is not (-180 or 0) => $"{parameter.Name} must be -180 or 0.",
            _ => null,
        };
    }

    private static void CheckOrder(MeasureCall call, string lower, string upper, string sentence, List<MeasureProblem> problems)
    {
        if (call.Parameters.TryGetValue(lower, out double low) && call.Parameters.TryGetValue(upper, out double high)
            && double.IsFinite(low) && double.IsFinite(high) && high <= low)
            problems.Add(new($"parameters.{upper}", sentence));
    }

    private static void CheckReference(MeasureCall call, MeasureDefinition definition, List<MeasureProblem> problems)
    {
        if (call.Reference is null)
        {
            if (definition.TakesReference)
                problems.Add(new("reference", $"{definition.Name} needs a reference: peak, frequency or band."));
        }
        else if (!definition.TakesReference)
        {
            problems.Add(new("reference", $"{definition.Name} takes no reference."));
        }
        else if (ReferenceProblem(call.Reference) is { } sentence)
        {
            problems.Add(new("reference", sentence));
        }
    }

    private static string Listed(MeasureDefinition definition)
        => definition.Parameters.Count == 0 ? "none" : string.Join(", ", definition.Parameters.Select(p => p.Name));
}

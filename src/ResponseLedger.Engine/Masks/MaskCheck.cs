using ResponseLedger.Engine.Measures;

namespace ResponseLedger.Engine.Masks;

/// <summary>What is wrong with a mask before any run is seen.</summary>
internal static class MaskCheck
{
    // A thousand turns, and an hour: beyond them a limit is in the wrong unit.
    private const double LargestPhaseDeg = 360_000;
    private const double LargestDelaySeconds = 3_600;
    private const double LargestLevelDb = 10_000;

    internal static IReadOnlyList<MaskProblem> ProblemsOf(Mask mask)
    {
        ArgumentNullException.ThrowIfNull(mask);
        var problems = new List<MaskProblem>();
        if (mask.Limits.Count + mask.Requirements.Count == 0)
            problems.Add(new("limits", "A mask needs at least one limit or requirement; without any, every run would pass."));
        CheckNames(mask, problems);
        for (int i = 0; i < mask.Limits.Count; i++)
            CheckLimit(mask.Limits[i], $"limits[{i}]", problems);
        for (int i = 0; i < mask.Requirements.Count; i++)
            CheckRequirement(mask.Requirements[i], $"requirements[{i}]", problems);
        if (problems.Count == 0)
            CrossedLimits.Check(mask.Limits, problems);
        return problems;
    }

    private static void CheckNames(Mask mask, List<MaskProblem> problems)
    {
        var seen = new HashSet<string>(StringComparer.Ordinal);
        for (int i = 0; i < mask.Limits.Count; i++)
            Check(mask.Limits[i].Name, $"limits[{i}].name");
        for (int i = 0; i < mask.Requirements.Count; i++)
            Check(mask.Requirements[i].Name, $"requirements[{i}].name");

        void Check(string name, string path)
        {
            if (string.IsNullOrWhiteSpace(name))
                problems.Add(new(path, "Give it a name; verdicts list criteria by name."));
            else if (!seen.Add(name))
                problems.Add(new(path, $"'{name}' stands twice in the mask; names are unique."));
        }
    }

    private static void CheckLimit(CurveLimit limit, string path, List<MaskProblem> problems)
    {
        if (!Enum.IsDefined(limit.Quantity))
            problems.Add(new($"{path}.quantity", "The quantity is gainDb, phaseDeg or delaySeconds."));
        if (!Enum.IsDefined(limit.Side))
            problems.Add(new($"{path}.side", "The side is upper or lower."));
        if (!Enum.IsDefined(limit.Basis))
            problems.Add(new($"{path}.basis", "The basis is absolute, reference or golden."));
        CheckReference(limit, path, problems);
        if (limit.MinPointsPerDecade is { } density && !(double.IsFinite(density) && density > 0))
            problems.Add(new($"{path}.minPointsPerDecade", "minPointsPerDecade must be finite and above 0."));
        if (limit.EndRatio is { } ratio && !(double.IsFinite(ratio) && ratio >= 1))
            problems.Add(new($"{path}.endRatio", "endRatio must be finite and 1 or more."));
        CheckScale(limit.Scale, path, problems);
        CheckCorners(limit, $"{path}.corners", problems);
    }

    private static void CheckReference(CurveLimit limit, string path, List<MaskProblem> problems)
    {
        if (limit.Basis != LimitBasis.Reference)
        {
            if (limit.Reference is not null)
                problems.Add(new($"{path}.reference", "Only a limit with basis reference takes a reference."));
            return;
        }

        if (limit.Quantity != CurveQuantity.GainDb)
            problems.Add(new($"{path}.basis", "A reference is a level: only a limit on gainDb can be relative to it."));
        if (limit.Reference is null)
            problems.Add(new($"{path}.reference", "Say what the limit is relative to: peak, frequency or band."));
        else if (MeasureCallCheck.ReferenceProblem(limit.Reference) is { } sentence)
            problems.Add(new($"{path}.reference", sentence));
    }

    private static void CheckCorners(CurveLimit limit, string path, List<MaskProblem> problems)
    {
        var corners = limit.Corners;
        if (corners.Count < 2)
        {
            problems.Add(new(path, "A limit needs 2 or more corners."));
            return;
        }

        double largest = limit.Quantity switch
        {
            CurveQuantity.PhaseDeg => LargestPhaseDeg,
            CurveQuantity.DelaySeconds => LargestDelaySeconds,
            _ => LargestLevelDb,
        };
        for (int i = 0; i < corners.Count; i++)
        {
            var (frequencyHz, value) = corners[i];
            if (!double.IsFinite(frequencyHz) || frequencyHz <= 0)
                problems.Add(new($"{path}[{i}].frequencyHz", "A corner's frequency must be finite and above 0 Hz."));
            else if (i > 0 && frequencyHz < corners[i - 1].FrequencyHz)
                problems.Add(new($"{path}[{i}].frequencyHz", $"Corners ascend: {Wording.Hz(frequencyHz)} comes after {Wording.Hz(corners[i - 1].FrequencyHz)}."));
            else if (i > 1 && frequencyHz == corners[i - 1].FrequencyHz && frequencyHz == corners[i - 2].FrequencyHz)
                problems.Add(new($"{path}[{i}].frequencyHz", $"More than two corners stand at {Wording.Hz(frequencyHz)}; a step is an equal pair."));
            if (!double.IsFinite(value))
                problems.Add(new($"{path}[{i}].value", "A corner's value must be finite; end the limit where it stops."));
            else if (Math.Abs(value) > largest)
                problems.Add(new($"{path}[{i}].value", $"{Wording.Number(value)} is beyond {Wording.Number(largest)} {LimitEvaluator.UnitOf(limit.Quantity)}; is it in the right unit?"));
        }

        if (corners[0].FrequencyHz == corners[^1].FrequencyHz)
            problems.Add(new(path, "A limit spans two different frequencies or more."));
    }

    private static void CheckRequirement(Requirement requirement, string path, List<MaskProblem> problems)
    {
        foreach (var problem in MeasureCatalogue.LocatedProblemsOf(requirement.Call))
            problems.Add(new($"{path}.{problem.Path}", problem.Sentence));
        if (requirement.Call.Measure is { } name && MeasureCatalogue.Find(name) is { } definition)
        {
            if (!definition.Outputs.Any(o => o.Name == requirement.Output))
                problems.Add(new($"{path}.output", $"{definition.Name} gives no '{requirement.Output}'; it gives {string.Join(", ", definition.Outputs.Select(o => o.Name))}."));
            if (requirement.AcceptNoCrossover && definition.Name != "loopMargins")
                problems.Add(new($"{path}.acceptNoCrossover", "Only loopMargins has crossovers to do without."));
        }

        if (requirement.Min is null && requirement.Max is null)
            problems.Add(new($"{path}.min", "A requirement needs min, max or both."));
        if (requirement.Min is { } min && !double.IsFinite(min))
            problems.Add(new($"{path}.min", "min must be finite; leave it out for none."));
        if (requirement.Max is { } max && !double.IsFinite(max))
            problems.Add(new($"{path}.max", "max must be finite; leave it out for none."));
        if (requirement.Min > requirement.Max)
            problems.Add(new($"{path}.min", $"min {Wording.Number(requirement.Min.Value)} is above max {Wording.Number(requirement.Max.Value)}; nothing could pass."));
        CheckScale(requirement.Scale, path, problems);
    }

    private static void CheckScale(double? scale, string path, List<MaskProblem> problems)
    {
        if (scale is { } value && !(double.IsFinite(value) && value > 0))
            problems.Add(new($"{path}.scale", "scale must be finite and above 0."));
    }
}

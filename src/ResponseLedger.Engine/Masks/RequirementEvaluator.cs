using System.Globalization;
using ResponseLedger.Engine.Measures;

namespace ResponseLedger.Engine.Masks;

/// <summary>Judges one scalar requirement on what its measure found. Of loop margins every crossover is tested.</summary>
internal static class RequirementEvaluator
{
    /// <summary>The same for calls that ask the same: measure, parameters by name, reference.</summary>
    internal static string KeyOf(MeasureCall call)
    {
        var parameters = call.Parameters
            .OrderBy(p => p.Key, StringComparer.Ordinal)
            .Select(p => string.Create(CultureInfo.InvariantCulture, $"{p.Key}={p.Value:R}"));
        return $"{call.Measure}({string.Join(",", parameters)}){call.Reference}";
    }

    internal static CriterionResult Evaluate(Requirement requirement, MeasureResult result, bool hasPhase)
    {
        var output = result.Outputs.First(o => o.Name == requirement.Output);
        var notes = result.Notes.Where(n => n.Code == AbsenceCode.SuspectPhase).ToArray();
        var crossovers = CrossoversOf(requirement.Output, result);
        var candidates = crossovers ?? [(output.Value, FrequencyOf(output.Name, result))];
        double least = double.PositiveInfinity;
        double? leastHz = null;
        bool absent = false;
        foreach (var (value, frequencyHz) in candidates)
        {
            if (value is not { } known)
            {
                absent = true;
                continue;
            }

            double margin = Math.Min(known - requirement.Min ?? double.PositiveInfinity, requirement.Max - known ?? double.PositiveInfinity);
            if (margin < least)
                (least, leastHz) = (margin, frequencyHz);
        }

        least = MaskEvaluator.Snap(least, requirement.Scale ?? MaskEvaluator.UsualScale(output.Unit, Math.Max(Math.Abs(requirement.Min ?? 0), Math.Abs(requirement.Max ?? 0))));
        if (least < 0)
            return new(requirement.Name, Outcome.Fail, least, output.Unit, leastHz, absent ? result.Reason : null, notes);
        if (Undecided(requirement.Output, result, crossovers, absent, hasPhase) is { } reason)
        {
            // A phase crossover above 0 dB is one: a loop that may be beyond the critical point is not accepted for want of others.
            bool none = requirement.Output != "gainMarginDb" || result.PhaseCrossovers.Count == 0;
            bool accepted = none && reason.Code == AbsenceCode.NoCrossover && requirement.AcceptNoCrossover;
            return new(requirement.Name, accepted ? Outcome.Pass : Outcome.Inconclusive, null, output.Unit, null, reason, notes);
        }

        return new(requirement.Name, Outcome.Pass, least, output.Unit, leastHz, null, notes);
    }

    /// <summary>The values that a loop requirement tests, each with its frequency; null for a plain scalar.</summary>
    private static IReadOnlyList<(double? Value, double? FrequencyHz)>? CrossoversOf(string output, MeasureResult result)
    {
        if (result.Call.Measure != "loopMargins")
            return null;
        return output switch
        {
            "phaseMarginDeg" => [.. result.GainCrossovers.Select(c => (c.PhaseMarginDeg, (double?)c.FrequencyHz))],
            "gainCrossoverHz" => [.. result.GainCrossovers.Select(c => ((double?)c.FrequencyHz, (double?)c.FrequencyHz))],
            "gainMarginDb" => [.. result.PhaseCrossovers.Where(c => c.GainMarginDb >= 0).Select(c => ((double?)c.GainMarginDb, (double?)c.FrequencyHz))],
            "gainReductionDb" => [.. result.PhaseCrossovers.Where(c => c.GainMarginDb < 0).Select(c => ((double?)c.GainMarginDb, (double?)c.FrequencyHz))],
            "phaseCrossoverHz" => [.. result.PhaseCrossovers.Select(c => ((double?)c.FrequencyHz, (double?)c.FrequencyHz))],
            _ => null,
        };
    }

    private static Absence? Undecided(
        string output, MeasureResult result, IReadOnlyList<(double? Value, double? FrequencyHz)>? crossovers, bool absent, bool hasPhase)
    {
        if (crossovers is null)
            return absent ? result.Reason : null;
        bool ofGain = output is "phaseMarginDeg" or "gainCrossoverHz";
        if (ofGain && result.Notes.FirstOrDefault(n => n.Code == AbsenceCode.ZeroGain) is { } unplaced)
            return unplaced;
        if (absent || !ofGain && !hasPhase)
            return result.Reason is { Code: AbsenceCode.PhaseAbsent } reason ? reason
                : new Absence(AbsenceCode.PhaseAbsent, "There is no phase at a gain crossover: the run carries none there.");
        if (crossovers.Count > 0)
            return null;
        string what = output switch
        {
            "phaseMarginDeg" or "gainCrossoverHz" => "no gain crossover",
            "gainMarginDb" => "no phase crossover below 0 dB, at which the gain may rise",
            "gainReductionDb" => "no phase crossover above 0 dB, at which the gain may fall",
            _ => "no phase crossover",
        };
        string remedy = result.PhaseCrossovers.Count > 0 && output == "gainMarginDb"
            ? "those that it holds lie above 0 dB, and the run's loop margins list them"
            : "sweep further, or let the requirement accept it";
        return new Absence(AbsenceCode.NoCrossover, $"The sweep holds {what}; {remedy}.");
    }

    /// <summary>Where a scalar belongs: beside it in the result, or the frequency that was asked for.</summary>
    private static double? FrequencyOf(string output, MeasureResult result)
    {
        string? beside = (result.Call.Measure, output) switch
        {
            ("peak", _) => "frequencyHz",
            ("loopMargins", "leastDistance" or "leastDistanceHz") => "leastDistanceHz",
            ("bandwidth", "lowerHz" or "upperHz" or "centreHz") => output,
            _ => null,
        };
        if (beside is not null)
            return result.Outputs.First(o => o.Name == beside).Value;
        return result.Call.Parameters.TryGetValue("frequencyHz", out double asked) ? asked : null;
    }
}

namespace ResponseLedger.Engine.Lots;

/// <summary>Margins of one criterion over the counting runs of a lot.</summary>
/// <param name="Name">Name of the criterion.</param>
/// <param name="Unit">Unit of its margins.</param>
/// <param name="Count">How many runs have a finite margin.</param>
/// <param name="Without">How many have none.</param>
/// <param name="Least">Least margin; null without any.</param>
/// <param name="Median">Median; the mean of the middle two for an even count.</param>
/// <param name="Mean">Arithmetic mean.</param>
/// <param name="StandardDeviation">Of the sample, with n - 1; null under 2 margins.</param>
public sealed record MarginStatistics(
    string Name, string Unit, int Count, int Without, double? Least, double? Median, double? Mean, double? StandardDeviation);

/// <summary>The yield of a lot as a count, and what it says of the process behind it.</summary>
/// <param name="Tested">Units tested, 0 or more.</param>
/// <param name="Passed">Units that passed.</param>
/// <param name="Yield">Passed over tested; null when none is tested.</param>
/// <param name="Confidence">Confidence of the bounds.</param>
/// <param name="ProcessLower">Lower Clopper-Pearson bound of the process yield, two-sided; null when none is tested.</param>
/// <param name="ProcessUpper">Upper bound; null when none is tested.</param>
public sealed record YieldStatistics(
    int Tested, int Passed, double? Yield, double Confidence, double? ProcessLower, double? ProcessUpper);

/// <summary>Plain statistics of a lot.</summary>
public static class LotStatistics
{
    /// <summary>Describes the margins of one criterion.</summary>
    /// <param name="name">Name of the criterion.</param>
    /// <param name="unit">Unit of the margins.</param>
    /// <param name="margins">One a run; null where a run has none.</param>
    /// <exception cref="ArgumentException">A margin is not finite.</exception>
    public static MarginStatistics OfMargins(string name, string unit, IEnumerable<double?> margins)
    {
        ArgumentNullException.ThrowIfNull(margins);
        var known = new List<double>();
        int without = 0;
        foreach (double? margin in margins)
        {
            if (margin is { } value)
                known.Add(value);
            else
                without++;
        }

        double[] sorted = [.. known];
        Preconditions.RequireFinite(sorted, nameof(margins));
        if (sorted.Length == 0)
            return new MarginStatistics(name, unit, 0, without, null, null, null, null);
        Array.Sort(sorted);
        int n = sorted.Length;
        double median = n % 2 == 1 ? sorted[n / 2] : sorted[n / 2 - 1] / 2 + sorted[n / 2] / 2;
        double mean = 0;
        double squares = 0;
        for (int i = 0; i < n; i++)
        {
            // Welford's update: no cancellation between the mean and the spread.
            double before = sorted[i] - mean;
            mean += before / (i + 1);
            squares += before * (sorted[i] - mean);
        }

        return new MarginStatistics(name, unit, n, without, sorted[0], median, mean, n > 1 ? Math.Sqrt(squares / (n - 1)) : null);
    }

    /// <summary>Yield of a lot.</summary>
    /// <param name="passed">Units that passed.</param>
    /// <param name="tested">Units tested.</param>
    /// <param name="confidence">Confidence of the process bounds.</param>
    /// <exception cref="ArgumentException">Passed is not between 0 and tested, or the confidence not between 0 and 1.</exception>
    public static YieldStatistics OfYield(int passed, int tested, double confidence = 0.95)
    {
        Preconditions.Require(tested >= 0 && passed >= 0 && passed <= tested, nameof(passed), "Passed lies between 0 and tested.");
        Preconditions.Require(confidence > 0 && confidence < 1, nameof(confidence), "The confidence lies above 0 and below 1.");
        if (tested == 0)
            return new YieldStatistics(0, 0, null, confidence, null, null);
        var (lower, upper) = ClopperPearson.TwoSided(passed, tested, confidence);
        return new YieldStatistics(tested, passed, (double)passed / tested, confidence, lower, upper);
    }
}

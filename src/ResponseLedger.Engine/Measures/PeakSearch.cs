namespace ResponseLedger.Engine.Measures;

/// <summary>
/// The highest level of a curve. It lies at a point, for pieces are straight. Levels within 1e-9 dB of the highest tie, and the
/// lowest frequency of them is the peak's, so that rounding does not move a flat top about.
/// </summary>
internal static class PeakSearch
{
    internal const double TieDb = 1e-9;

    /// <summary>Highest level and the index of its point; the level is NaN or negative infinity where no point has a finite one.</summary>
    internal static (double GainDb, int Index) Highest(ReadOnlySpan<double> gainDb)
    {
        double highest = double.NegativeInfinity;
        foreach (double level in gainDb)
        {
            if (level > highest)
                highest = level;
        }

        for (int i = 0; i < gainDb.Length; i++)
        {
            if (gainDb[i] >= highest - TieDb)
                return (highest, i);
        }

        return (double.NaN, -1);
    }
}

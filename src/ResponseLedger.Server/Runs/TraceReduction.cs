using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Server.Runs;

/// <summary>
/// Picks the points of a sweep that a plot of so many points needs: the first, the last, and of each of equal stretches of
/// log f the least and the greatest level, so that no peak and no notch is lost.
/// </summary>
internal static class TraceReduction
{
    /// <summary>The indices kept, ascending; all of them when the sweep has no more than <paramref name="points"/>.</summary>
    /// <param name="sweep">The sweep.</param>
    /// <param name="points">The most indices to keep, 2 or more.</param>
    public static int[] Keep(Sweep sweep, int points)
    {
        ArgumentOutOfRangeException.ThrowIfLessThan(points, 2);
        if (sweep.Count <= points)
            return [.. Enumerable.Range(0, sweep.Count)];

        var kept = new List<int>(points) { 0 };
        var stretches = (points - 2) / 2;
        var frequencyHz = sweep.FrequencyHz;
        var gainDb = sweep.GainDb;
        var start = Math.Log(frequencyHz[0]);
        var perStretch = (Math.Log(frequencyHz[^1]) - start) / Math.Max(stretches, 1);
        var i = 1;
        for (var stretch = 0; stretch < stretches && i < sweep.Count - 1; stretch++)
        {
            var end = start + ((stretch + 1) * perStretch);
            int least = i, greatest = i;
            var from = i;
            while (i < sweep.Count - 1 && (stretch == stretches - 1 || Math.Log(frequencyHz[i]) < end))
            {
                if (gainDb[i] < gainDb[least])
                    least = i;
                if (gainDb[i] > gainDb[greatest])
                    greatest = i;
                i++;
            }

            if (i == from)
                continue;
            kept.Add(Math.Min(least, greatest));
            if (least != greatest)
                kept.Add(Math.Max(least, greatest));
        }

        kept.Add(sweep.Count - 1);
        return [.. kept];
    }
}

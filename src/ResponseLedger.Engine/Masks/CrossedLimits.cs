namespace ResponseLedger.Engine.Masks;

/// <summary>Finds an upper limit that runs under a lower one of the same quantity, basis and reference over an interval: no run could meet both.</summary>
internal static class CrossedLimits
{
    private const double Rounding = 1e-12;

    internal static void Check(IReadOnlyList<CurveLimit> limits, List<MaskProblem> problems)
    {
        for (int i = 0; i < limits.Count; i++)
        {
            for (int j = 0; j < limits.Count; j++)
            {
                var (upper, lower) = (limits[i], limits[j]);
                if (upper.Side != LimitSide.Upper || lower.Side != LimitSide.Lower || upper.Quantity != lower.Quantity
                    || upper.Basis != lower.Basis || upper.Reference != lower.Reference)
                    continue;
                if (CrossingHz(upper.Corners, lower.Corners) is { } atHz)
                    problems.Add(new($"limits[{Math.Max(i, j)}].corners", $"The upper limit '{upper.Name}' runs under the lower limit '{lower.Name}' near {Wording.Hz(atHz)}; no run could meet both."));
            }
        }
    }

    /// <summary>
    /// A frequency at the edge of an interval on which upper is under lower, or null. On each stretch between neighbouring corners of
    /// either both are straight, so such an interval shows at an end of a stretch, taken from inside it.
    /// </summary>
    private static double? CrossingHz(IReadOnlyList<LimitCorner> upper, IReadOnlyList<LimitCorner> lower)
    {
        double fromHz = Math.Max(upper[0].FrequencyHz, lower[0].FrequencyHz);
        double toHz = Math.Min(upper[^1].FrequencyHz, lower[^1].FrequencyHz);
        int u = 0;
        int l = 0;
        while (fromHz < toHz)
        {
            u = PieceAbove(upper, u, fromHz);
            l = PieceAbove(lower, l, fromHz);
            double nextHz = Math.Min(toHz, Math.Min(upper[u + 1].FrequencyHz, lower[l + 1].FrequencyHz));
            foreach (double atHz in (ReadOnlySpan<double>)[fromHz, nextHz])
            {
                double above = MarginSearch.LimitOnPiece(upper, u, atHz);
                double below = MarginSearch.LimitOnPiece(lower, l, atHz);
                if (above - below < -Rounding * (Math.Abs(above) + Math.Abs(below)))
                    return atHz;
            }

            fromHz = nextHz;
        }

        return null;
    }

    /// <summary>The piece that runs upward from a frequency.</summary>
    private static int PieceAbove(IReadOnlyList<LimitCorner> corners, int piece, double frequencyHz)
    {
        while (corners[piece + 1].FrequencyHz <= frequencyHz)
            piece++;
        return piece;
    }
}

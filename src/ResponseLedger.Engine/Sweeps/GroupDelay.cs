namespace ResponseLedger.Engine.Sweeps;

/// <summary>
/// Group delay -(1/360) d(phase in degrees)/df at the points of a sweep, in seconds, by the derivative of the parabola
/// through three neighbouring points of an uneven grid (one-sided at the ends; with two points the one slope there is).
/// </summary>
internal static class GroupDelay
{
    /// <summary>Delay at each point; NaN where one of the three phases is absent.</summary>
    internal static double[] AtPoints(ReadOnlySpan<double> frequencyHz, ReadOnlySpan<double> phaseDeg)
    {
        int n = frequencyHz.Length;
        var delay = new double[n];
        if (n == 2)
        {
            delay[0] = delay[1] = Slope(frequencyHz, phaseDeg, 0) / -360;
            return delay;
        }

        for (int i = 1; i < n - 1; i++)
        {
            var (before, after) = (frequencyHz[i] - frequencyHz[i - 1], frequencyHz[i + 1] - frequencyHz[i]);
            var (s1, s2) = (Slope(frequencyHz, phaseDeg, i - 1), Slope(frequencyHz, phaseDeg, i));
            double share = after / (before + after);
            delay[i] = (share * s1 + (1 - share) * s2) / -360;
        }

        delay[0] = EndSlope(Slope(frequencyHz, phaseDeg, 0), Slope(frequencyHz, phaseDeg, 1),
            frequencyHz[1] - frequencyHz[0], frequencyHz[2] - frequencyHz[1]) / -360;
        delay[n - 1] = EndSlope(Slope(frequencyHz, phaseDeg, n - 2), Slope(frequencyHz, phaseDeg, n - 3),
            frequencyHz[n - 1] - frequencyHz[n - 2], frequencyHz[n - 2] - frequencyHz[n - 3]) / -360;
        return delay;
    }

    private static double Slope(ReadOnlySpan<double> f, ReadOnlySpan<double> phaseDeg, int i)
        => (phaseDeg[i + 1] - phaseDeg[i]) / (f[i + 1] - f[i]);

    private static double EndSlope(double near, double far, double nearWidth, double farWidth)
        => near + (near - far) * (nearWidth / (nearWidth + farWidth));
}

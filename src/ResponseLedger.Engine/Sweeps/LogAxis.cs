namespace ResponseLedger.Engine.Sweeps;

/// <summary>
/// The logarithmic frequency axis on which every curve runs straight. Ratios of near neighbours keep their full relative
/// precision (ln(1 + d) after Kahan), so that results do not depend on how far from 1 Hz a sweep lies.
/// </summary>
internal static class LogAxis
{
    /// <summary>ln(toHz / fromHz) for positive frequencies.</summary>
    internal static double Width(double fromHz, double toHz)
    {
        double d = (toHz - fromHz) / fromHz;
        if (!(Math.Abs(d) < 0.5))
            return Math.Log(toHz) - Math.Log(fromHz);
        double u = 1 + d;
        double um1 = u - 1;
        return um1 == 0 ? d : Math.Log(u) * (d / um1);
    }

    /// <summary>log10(toHz / fromHz).</summary>
    internal static double Decades(double fromHz, double toHz) => Width(fromHz, toHz) / Math.Log(10);

    /// <summary>Where <paramref name="frequencyHz"/> stands on the piece, from 0 at its start to 1 at its end.</summary>
    internal static double Fraction(double fromHz, double toHz, double frequencyHz)
    {
        if (frequencyHz <= fromHz)
            return 0;
        if (frequencyHz >= toHz)
            return 1;
        return Math.Clamp(Width(fromHz, frequencyHz) / Width(fromHz, toHz), 0, 1);
    }

    /// <summary>The frequency at a fraction of the piece; the inverse of <see cref="Fraction"/>.</summary>
    internal static double FrequencyHzAt(double fromHz, double toHz, double fraction)
    {
        if (fraction <= 0)
            return fromHz;
        if (fraction >= 1)
            return toHz;
        return Math.Clamp(fromHz * Math.Exp(fraction * Width(fromHz, toHz)), fromHz, toHz);
    }

    /// <summary>The value at a fraction of a straight piece. NaN inside a piece that has a non-finite end: such a piece has no interior value.</summary>
    internal static double Lerp(double start, double end, double fraction)
    {
        if (fraction <= 0)
            return start;
        if (fraction >= 1)
            return end;
        double value = start + fraction * (end - start);
        return double.IsFinite(value) ? value : double.NaN;
    }
}

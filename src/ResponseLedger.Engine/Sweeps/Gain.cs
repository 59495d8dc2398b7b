namespace ResponseLedger.Engine.Sweeps;

/// <summary>Conversions between a complex gain, its level and its phase.</summary>
internal static class Gain
{
    private static readonly double DbPerBinade = 20 * Math.Log10(2);

    /// <summary>20 log10 |re + j im| in dB without overflow or underflow on the way; negative infinity for an exact zero.</summary>
    internal static double LevelDb(double re, double im)
    {
        double magnitude = double.Hypot(re, im);
        if (double.IsFinite(magnitude) && double.IsNormal(magnitude))
            return 20 * Math.Log10(magnitude);
        double largest = Math.Max(Math.Abs(re), Math.Abs(im));
        if (largest == 0)
            return double.NegativeInfinity;
        int binade = Math.ILogB(largest);
        double scaled = double.Hypot(Math.ScaleB(re, -binade), Math.ScaleB(im, -binade));
        return 20 * Math.Log10(scaled) + binade * DbPerBinade;
    }

    /// <summary>20 log10 of a ratio of zero or more.</summary>
    internal static double LevelDb(double ratio) => ratio == 0 ? double.NegativeInfinity : 20 * Math.Log10(ratio);

    /// <summary>10^(L/20).</summary>
    internal static double Ratio(double levelDb) => Math.Pow(10, levelDb / 20);

    /// <summary>Phase in degrees in [-180, 180]; NaN for an exact zero, which has none.</summary>
    internal static double PhaseDeg(double re, double im)
        => re == 0 && im == 0 ? double.NaN : Math.Atan2(im, re) * (180 / Math.PI);

    /// <summary>Real and imaginary part, exact at multiples of 90 degrees.</summary>
    internal static (double Re, double Im) Complex(double ratio, double phaseDeg)
    {
        if (ratio == 0)
            return (0, 0);
        var (sin, cos) = double.SinCosPi(Math.IEEERemainder(phaseDeg, 360) / 180);
        return (ratio * cos, ratio * sin);
    }
}

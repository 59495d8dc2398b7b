using System.Globalization;
using System.Text;

namespace ResponseLedger.Benchmarks.Lab;

/// <summary>
/// Sweeps of an invented filter board: a second-order low-pass at 1 kHz, 10 Hz to 100 kHz, each unit with its own corner and noise.
/// </summary>
internal static class SweepFile
{
    public const double FirstHz = 10;
    public const double LastHz = 100_000;

    /// <summary>The curve of a unit: Hz, dB, degrees.</summary>
    public static (double[] FrequencyHz, double[] GainDb, double[] PhaseDeg) Curve(int points, int unit)
    {
        var random = new Random(unit);
        var cornerHz = 1_000 * (1 + 0.02 * (random.NextDouble() - 0.5));
        var (frequencyHz, gainDb, phaseDeg) = (new double[points], new double[points], new double[points]);
        for (var i = 0; i < points; i++)
        {
            frequencyHz[i] = Math.Round(FirstHz * Math.Pow(LastHz / FirstHz, i / (points - 1.0)), 6);
            var x = frequencyHz[i] / cornerHz;
            var (re, im) = (1 - x * x, Math.Sqrt(2) * x);
            gainDb[i] = Math.Round(-10 * Math.Log10(re * re + im * im) + 0.002 * (random.NextDouble() - 0.5), 9);
            phaseDeg[i] = Math.Round(-180 / Math.PI * Math.Atan2(im, re) + 0.02 * (random.NextDouble() - 0.5), 8);
        }

        return (frequencyHz, gainDb, phaseDeg);
    }

    /// <summary>The same as a file of three columns, about 38 bytes a point.</summary>
    public static byte[] Csv(int points, int unit)
    {
        var (frequencyHz, gainDb, phaseDeg) = Curve(points, unit);
        var text = new StringBuilder("Frequency (Hz),Gain (dB),Phase (deg)\n", 40 * points);
        for (var i = 0; i < points; i++)
            text.Append(CultureInfo.InvariantCulture, $"{frequencyHz[i]:F6},{gainDb[i]:F9},{phaseDeg[i]:F8}\n");
        return Encoding.ASCII.GetBytes(text.ToString());
    }
}

using System.Globalization;
using System.Numerics;
using System.Text;
using ResponseLedger.Server.Demo.Circuits;

namespace ResponseLedger.Server.Demo;

/// <summary>
/// A bench of the demo lab: how it writes its files, how noisy it is, and how far its gain has drifted. Each writes another
/// dialect, so that the lab shows what the readers take.
/// </summary>
/// <param name="Name">Name of the bench.</param>
/// <param name="Dialect">How it writes.</param>
/// <param name="NoiseDb">Standard deviation of its level reading in dB; that of its phase in degrees is 6.6 times as much (one radian is 8.7 dB).</param>
internal sealed record DemoBench(string Name, FileDialect Dialect, double NoiseDb)
{
    private static readonly CultureInfo german = Decimals(',');
    private static readonly CultureInfo plain = Decimals('.');

    /// <summary>Sweeps a circuit and writes the file that the bench would send.</summary>
    /// <param name="circuit">The unit on the bench.</param>
    /// <param name="frequencyHz">The sweep's frequencies in Hz.</param>
    /// <param name="noise">Where the reading noise comes from.</param>
    /// <param name="driftDb">How much too high the bench reads, in dB.</param>
    public byte[] Sweep(Circuit circuit, IReadOnlyList<double> frequencyHz, Parts noise, double driftDb = 0)
    {
        var text = new StringBuilder();
        WriteHead(text);
        foreach (var frequency in frequencyHz)
        {
            var readingError = Complex.Exp(new Complex(noise.Normal(), noise.Normal()) * NoiseDb * Math.Log(10) / 20);
            WriteRow(text, frequency, circuit(frequency) * readingError * Math.Pow(10, driftDb / 20));
        }

        return Encoding.UTF8.GetBytes(text.ToString());
    }

    /// <summary>Frequencies that ascend by one ratio, rounded to six digits as a bench states them.</summary>
    public static IReadOnlyList<double> Grid(double fromHz, double toHz, int points)
        => [.. Enumerable.Range(0, points).Select(i => double.Parse(
            (fromHz * Math.Pow(toHz / fromHz, (double)i / (points - 1))).ToString("G6", CultureInfo.InvariantCulture), CultureInfo.InvariantCulture))];

    private void WriteHead(StringBuilder text)
    {
        text.Append(Dialect switch
        {
            FileDialect.CommaDecibels => "# invented data of the demo lab\nFrequency (Hz),Gain (dB),Phase (deg)\n",
            FileDialect.SemicolonGerman => "Frequenz/Hz;Betrag/dB;Phase/Grad\r\n",
            FileDialect.TabComplex => "f (Hz)\tRe\tIm\n",
            FileDialect.TwoChannels => "Frequency (Hz),Channel 1 (mV),Channel 2 (mV),Phase (deg)\n",
            _ => throw new InvalidOperationException($"The dialect {Dialect} has no head."),
        });
    }

    private void WriteRow(StringBuilder text, double frequencyHz, Complex gain)
    {
        var levelDb = 20 * Math.Log10(gain.Magnitude);
        var phaseDeg = gain.Phase * 180 / Math.PI;
        switch (Dialect)
        {
            case FileDialect.CommaDecibels:
                text.Append(plain, $"{frequencyHz},{levelDb:F4},{phaseDeg:F3}\n");
                break;
            case FileDialect.SemicolonGerman:
                text.Append(german, $"{frequencyHz};{levelDb:F4};{phaseDeg:F3}\r\n");
                break;
            case FileDialect.TabComplex:
                text.Append(plain, $"{frequencyHz}\t{gain.Real:G9}\t{gain.Imaginary:G9}\n");
                break;
            default:
                const double driveMillivolt = 10;
                text.Append(plain, $"{frequencyHz},{driveMillivolt},{driveMillivolt * gain.Magnitude:G7},{phaseDeg:F3}\n");
                break;
        }
    }

    private static CultureInfo Decimals(char separator)
    {
        var culture = (CultureInfo)CultureInfo.InvariantCulture.Clone();
        culture.NumberFormat.NumberDecimalSeparator = separator.ToString();
        return culture;
    }
}

/// <summary>How a bench of the demo lab writes its files.</summary>
internal enum FileDialect
{
    /// <summary>Comma, decimal point, dB and degrees, a comment line.</summary>
    CommaDecibels,

    /// <summary>Semicolon, decimal comma, German heads, CRLF.</summary>
    SemicolonGerman,

    /// <summary>Tab, real and imaginary part.</summary>
    TabComplex,

    /// <summary>Input and output amplitudes of two channels, and their phase.</summary>
    TwoChannels,
}

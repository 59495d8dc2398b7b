using System.Numerics;
using System.Text;

namespace ResponseLedger.Server.Tests.MainJob;

/// <summary>A first-order low pass as a bench measures it, and the files that benches of different make write of it.</summary>
/// <param name="CornerHz">Its half-power frequency in Hz.</param>
/// <param name="OffsetDb">What the whole level is off, in dB.</param>
internal sealed record LowPass(double CornerHz, double OffsetDb = 0)
{
    private const int Points = 121;

    /// <summary>The frequencies of every sweep: 100 Hz to 100 kHz.</summary>
    public static double[] GridHz { get; } = [.. Enumerable.Range(0, Points).Select(i => 100 * Math.Pow(1000, i / (Points - 1.0)))];

    /// <summary>The level in dB at a frequency.</summary>
    public double GainDb(double frequencyHz) => OffsetDb - 10 * Math.Log10(1 + frequencyHz / CornerHz * (frequencyHz / CornerHz));

    /// <summary>The phase in degrees at a frequency.</summary>
    public double PhaseDeg(double frequencyHz) => -Math.Atan(frequencyHz / CornerHz) * (180 / Math.PI);

    /// <summary>Commas and decimal points, a comment, three columns.</summary>
    public byte[] CommaCsv(string remark = "") => Lines(
        [$"# swept by bay 3 {remark}", "frequency_hz,gain_db,phase_deg"],
        f => Invariant($"{f:R},{GainDb(f):R},{PhaseDeg(f):R}"));

    /// <summary>Semicolons and decimal commas under German heads.</summary>
    public byte[] SemicolonCsv(string remark = "") => Lines(
        [$"# Messplatz 2 {remark}", "Frequenz [Hz];Betrag [dB];Phase [Grad]"],
        f => Invariant($"{f:R};{GainDb(f):R};{PhaseDeg(f):R}").Replace('.', ','));

    /// <summary>Tabs, kilohertz, real and imaginary part.</summary>
    public byte[] ComplexTabs(string remark = "") => Lines(
        [$"# {remark}", "Frequency (kHz)\tRe\tIm"],
        f => Invariant($"{f / 1000:R}\t{Gain(f).Real:R}\t{Gain(f).Imaginary:R}"));

    /// <summary>A two-port Touchstone file whose S21 is the gain.</summary>
    public byte[] TwoPort(string remark = "") => Lines(
        [$"! {remark}", "# Hz S RI R 50"],
        f => Invariant($"{f:R} 0.01 0 {Gain(f).Real:R} {Gain(f).Imaginary:R} 0 0 0.02 0"));

    /// <summary>The comma file with a letter in the level of one point.</summary>
    /// <param name="line">The line that is spoilt, from 1.</param>
    public byte[] Spoilt(int line)
    {
        var lines = Encoding.UTF8.GetString(CommaCsv()).Split('\n');
        var fields = lines[line - 1].Split(',');
        lines[line - 1] = $"{fields[0]},-O.5,{fields[2]}";
        return Encoding.UTF8.GetBytes(string.Join('\n', lines));
    }

    private Complex Gain(double frequencyHz)
        => Complex.FromPolarCoordinates(Math.Pow(10, GainDb(frequencyHz) / 20), PhaseDeg(frequencyHz) * (Math.PI / 180));

    private static string Invariant(FormattableString text) => FormattableString.Invariant(text);

    private static byte[] Lines(string[] head, Func<double, string> row)
        => Encoding.UTF8.GetBytes(string.Join('\n', [.. head, .. GridHz.Select(row)]) + "\n");
}

using System.Globalization;
using System.Security.Cryptography;
using System.Text;

namespace ResponseLedger.Formats.Tests;

/// <summary>
/// The reader's version stands with every reading, so the same bytes must not read otherwise under it. What a fixed set of files reads as,
/// to twelve significant digits (platforms differ in the last bits of powers), is digested and compared with the digest of this version.
/// </summary>
public sealed class ReaderVersionTests
{
    private const int Version = 2;
    private const string Digest = "1441656d41be8ae32ff94df9e9d2d0ae7078027460e8a8a289ad27ea5abaf8f1";

    // Heads of all kinds over the same rows; the first column is the frequency.
    private static readonly string[] Heads =
    [
        "Frequency;Gain (dB)", "f/kHz;Betrag in dB", "Freq.;|H|", "omega;Magnitude", "krad/s;mag(dB)", "Frequency (THz);Gain (V/V)", "Frequency (mHz);Gain (dB)",
        "Frequency (rpm);Gain (dB)", "log10(Frequency);Gain (dB)", "Frequency (k);Gain (dB)", "Normalised frequency;Gain (dB)", "Frequency;Gain", "Frequency;Log Mag",
        "f;20log|H|", "f;10log|H|", "f;ln|H|", "f;Gain (Np)", "f;Gain (dBr)", "f;Gain (%)", "f;Magnitude (ppm)", "f;Gain (W/W)", "f;|H|^2", "f;Power gain",
        "f;|Z| (kohm)", "f;|Z| (MOhm)", "f;|Y| (mS)", "f;Gain (mV/Pa)", "f;Gain (MV/V)", "f;Gain (V)", "f;Gain (counts)", "f;Level (dBV)", "f;Attenuation (dB)", "f;Loss",
        "f;Vout/Vin", "f;Vin/Vout", "f;Vin/Vout (dB)", "f;CH1-CH2 (dB)", "f;1/|H|", "f;-Gain (dB)", "f;Delay (s)",
        "f;Real;Imag", "f;Re (mS);Im (mS)", "f;Re x1000;Im x1000", "f;|H|;Phase", "f;|H|;Phase (deg)", "f;|H|;Phase [rad]", "f;|H|;Phase (mrad)", "f;|H|;-Phase (deg)",
        "f;|H|;Phase CH2-CH1 (deg)", "f;|H|;Phase CH1-CH2 (deg)", "f;|H|;Phase lag (deg)", "f;|H|;ang:Trc1_S21", "f;|H|;Phase CH2 (deg)", "f;Vin;Vout", "f;Vin (V);Vout (nV)",
        "f;CH1 (mV);CH2 (V)", "f;Input (V rms);Output (Vpp)", "f;Vin rms;Vout peak", "f;Input (V);Output (V rms)", "f;Input (dBu);Output (dBV)", "f;Input (mA);Output (V)", "f;Uin (V);Uout (MV)",
        "f;Ch1 (V);Ch2 (V);Phase (deg)", "f;Ch1 (V);Ch1 Phase (deg);Ch2 (V);Ch2 Phase (deg)", "first;second", "Frequency;Gain\nHz;dB", "Frequency;Magnitude\nkHz;counts",
    ];

    private static readonly (string Name, string Text)[] Files =
    [
        ("no heads", "10;1\n20;2\n"),
        ("comma", "Frequenz (Hz)\tPegel [dB]\n20,5\t-0,25\n10,5\t-1,125\n"),
        ("quoted", "\"f\",\"Gain (dB)\"\n\"10\",\"-1e-1\"\n\"20\",\"\u22122\"\n"),
        ("blanks", "# title\nfreq_hz gain_db\n10 -1\n# half way\n20 -2\n"),
        ("late heads", "201,3\nFrequency (Hz),Gain (dB)\n10,-1\n20,-2\n"),
        ("negative attenuation", "f;Attenuation (dB)\n10;-1\n20;-2\n"),
        ("mixed attenuation", "f;Attenuation (dB)\n10;-1\n20;2\n"),
        ("ripple", "f;Attenuation (dB)\n10;-0.25\n20;2\n"),
        ("sentinels", "f;|H|\n10;9.9E37\n20;-9.9000003E37\n30;9.91E37\n"),
        ("faults", "f;Gain (dB)\n10;NaN\n20\n0;1\n30;x\n40;1;2\n"),
        ("twice", "f;Gain (dB)\n10;1\n10;2\n"),
        ("units in a comment", "# Hz dB\n10,1\n20,2\n"),
        ("one port", "# kHz S DB R 50\n1 -1 10\n2 -2 20\n"),
        ("two ports", "! note\n# MHz S RI R 75\n1 1 0 2 0 3 0 4 0\n2 1 0 2.5 0.5 3 0 4 0\n"),
        ("noise", "# GHz S MA R 50\n1 1 0 2 0 3 0 4 0\n2 1 0 2.5 30 3 0 4 0\n1 1 0.5 30 0.2\n"),
        ("impedance", "# Hz Z RI R 50\n1 1 0\n2 1 0\n"),
        ("version 2", "[Version] 2.0\n# Hz S RI R 50\n[Number of Ports] 1\n[Number of Frequencies] 2\n[Network Data]\n1 1 0\n2 0.5 0.5\n[End]\n"),
    ];

    [Fact]
    public void The_readings_are_those_of_the_stated_version()
    {
        string table = Table();
        string digest = Convert.ToHexStringLower(SHA256.HashData(Encoding.UTF8.GetBytes(table)));
        Assert.True(
            SweepFileReader.Version == Version && digest == Digest,
            "What files read as, or the reader's version, changed. If the same bytes may give other numbers on purpose, raise SweepFileReader.Version, then set Version and Digest here to "
            + $"{SweepFileReader.Version} and {digest}. If files were only added to the list here, set the digest alone. If neither, the reader is broken. The table is now:\n{table}");
    }

    private static string Table()
    {
        var table = new StringBuilder();
        foreach (string head in Heads)
        {
            int columns = head.Split('\n')[0].Split(';').Length;
            string rows = string.Concat(Enumerable.Range(1, 2).Select(i => string.Join(';', Enumerable.Range(1, columns).Select(k => (100 * i / k + k).ToString(CultureInfo.InvariantCulture))) + "\n"));
            Write(table, head.Replace('\n', '|'), Reading.Of(head + "\n" + rows));
        }

        foreach ((string name, string text) in Files)
            Write(table, name, Reading.Of(text, name: "unit_1"));
        return table.ToString();
    }

    private static void Write(StringBuilder table, string name, FileReading reading)
    {
        table.Append(CultureInfo.InvariantCulture, $"{name}: {reading.Reader} ");
        if (reading.Sweep is { } sweep)
            table.Append(CultureInfo.InvariantCulture, $"{sweep.Form} {Say(sweep.FrequencyHz)} / {Say(sweep.FirstPlane)} / {Say(sweep.SecondPlane)} by {reading.Choices!.ToJson()}");
        table.AppendJoin(' ', reading.Issues.Select(i => $"{i.Line}:{i.Column} {i.Code}"));
        table.Append(' ').AppendJoin(' ', reading.Candidates.Select(c => c.ToJson())).Append('\n');
    }

    private static string Say(ReadOnlySpan<double> values)
    {
        var text = new StringBuilder();
        foreach (double value in values)
            text.Append(value.ToString("E11", CultureInfo.InvariantCulture)).Append(' ');
        return text.ToString().TrimEnd();
    }
}

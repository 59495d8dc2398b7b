using System.Diagnostics;
using System.Text;

namespace ResponseLedger.Formats.Tests;

public sealed class FuzzTests
{
    private const int Mutants = 20_000;

    // Pieces that turn up in real files and upset readers.
    private static readonly string[] Pieces =
    [
        ",", ";", "\t", " ", "\n", "\r", "\"", "'", "#", "!", "[", "]", "(", "|", "NaN", "inf", "9.9E37", "-", "+", ".", "1e999", "1e-999", "0", "1,000",
        "1.000,5", "Hz", "dB", "(kHz)", "Phase", "Gain", "\u00B0", "\u00B5V", "\u2212", "\uFEFF", "\0", "[Version] 2.0\n", "[Network Data]\n", "# GHz S MA R 50\n", "99999999999999999999",
    ];

    private static IEnumerable<(string Name, byte[] Content)> Seeds()
    {
        foreach (string file in Directory.GetFiles(Path.Combine(Reading.ReferenceFolder, "touchstone")).Where(f => !f.EndsWith(".json", StringComparison.Ordinal)).Order(StringComparer.Ordinal))
            yield return (Path.GetFileName(file), File.ReadAllBytes(file));
        const string rows = "10.5,-1.25,3\n20.5,-2.5,4\n40,-3,5e1\n80,-4.75,-6\n";
        yield return ("a.csv", Encoding.UTF8.GetBytes("Frequency (Hz),Gain (dB),Phase (deg)\n" + rows));
        yield return ("b.csv", Encoding.UTF8.GetBytes("Frequenz;Betrag;Phase\nkHz;dB;Grad\n" + rows.Replace(',', ';').Replace('.', ',')));
        yield return ("c.txt", Encoding.Unicode.GetBytes("f/Hz\tCh1 (V)\tCh2 (mV)\n" + rows.Replace(',', '\t').Replace("-", "", StringComparison.Ordinal)));
        yield return ("d.txt", Encoding.Latin1.GetBytes("Frequenz (Hz)  Pegel [dB]  Phase [\u00B0]\n" + rows.Replace(',', ' ')));
        yield return ("e.csv", Encoding.UTF8.GetBytes(rows));
    }

    [Fact]
    public void Twenty_thousand_mutated_files_never_throw_never_hang_and_are_either_taken_or_explained()
    {
        var random = new Random(20240601);
        (string Name, byte[] Content)[] seeds = [.. Seeds()];
        int taken = 0, refused = 0, asked = 0;
        var slowest = TimeSpan.Zero;
        for (int i = 0; i < Mutants; i++)
        {
            (string name, byte[] content) = seeds[i % seeds.Length];
            byte[] mutant = Mutate(content, random);
            long start = Stopwatch.GetTimestamp();
            FileReading reading = SweepFileReader.Read(mutant, name, null, TestContext.Current.CancellationToken);
            TimeSpan took = Stopwatch.GetElapsedTime(start);
            slowest = took > slowest ? took : slowest;
            Assert.True(reading.Sweep is null == reading.Issues.Count > 0, $"Mutant {i}: " + reading.Words());
            Assert.Equal(reading.Issues.Count > 0, reading.IssueCount > 0);
            Assert.True(reading.IssueCount >= reading.Issues.Count);
            Assert.True(reading.Issues.Count <= SweepFileReader.MostIssuesListed);
            if (reading.Sweep is { } sweep)
            {
                taken++;
                Assert.True(sweep.Count >= 2);
                for (int k = 0; k < sweep.Count; k++)
                    Assert.True(double.IsFinite(sweep.FirstPlane[k]) && sweep.FrequencyHz[k] > 0 && (k == 0 || sweep.FrequencyHz[k] > sweep.FrequencyHz[k - 1]), $"Mutant {i}, point {k}");
            }
            else
            {
                refused++;
            }

            foreach (ColumnChoices candidate in reading.Candidates)
            {
                asked++;
                FileReading again = SweepFileReader.Read(mutant, name, candidate, TestContext.Current.CancellationToken);
                Assert.DoesNotContain(again.Issues, issue => issue.Code is "columnsOpen" or "badChoice");
            }
        }

        TestContext.Current.TestOutputHelper?.WriteLine($"{Mutants} mutants: {taken} taken, {refused} refused, {asked} candidates tried; slowest {slowest.TotalMilliseconds:F1} ms");
        Assert.True(taken > Mutants / 50 && refused > Mutants / 4, $"The mutants are lopsided: {taken} taken, {refused} refused.");
        Assert.True(slowest < TimeSpan.FromSeconds(5), $"The slowest mutant took {slowest}.");
    }

    [Fact]
    public void Random_bytes_never_throw()
    {
        var random = new Random(7);
        for (int i = 0; i < 5_000; i++)
        {
            var content = new byte[random.Next(0, 400)];
            random.NextBytes(content);
            FileReading reading = SweepFileReader.Read(content, i % 2 == 0 ? "x.csv" : "x.s2p", null, TestContext.Current.CancellationToken);
            Assert.True(reading.Sweep is null == reading.Issues.Count > 0);
        }
    }

    private static byte[] Mutate(byte[] content, Random random)
    {
        var bytes = new List<byte>(content);
        int changes = random.Next(1, 5);
        for (int c = 0; c < changes && bytes.Count > 0; c++)
        {
            int at = random.Next(bytes.Count);
            switch (random.Next(6))
            {
                case 0:
                    bytes[at] = (byte)random.Next(256);
                    break;
                case 1:
                    bytes.RemoveRange(at, Math.Min(random.Next(1, 20), bytes.Count - at));
                    break;
                case 2:
                    bytes.InsertRange(at, Encoding.UTF8.GetBytes(Pieces[random.Next(Pieces.Length)]));
                    break;
                case 3:
                    int length = Math.Min(random.Next(1, 60), bytes.Count - at);
                    bytes.InsertRange(random.Next(bytes.Count), bytes.GetRange(at, length));
                    break;
                case 4:
                    bytes.RemoveRange(at, bytes.Count - at);
                    break;
                default:
                    bytes[at] = (byte)(bytes[at] ^ (1 << random.Next(8)));
                    break;
            }
        }

        return [.. bytes];
    }
}

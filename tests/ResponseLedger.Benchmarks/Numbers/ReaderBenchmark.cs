using System.Globalization;
using System.Text;
using ResponseLedger.Benchmarks.Lab;
using ResponseLedger.Benchmarks.Measuring;
using ResponseLedger.Formats;

namespace ResponseLedger.Benchmarks.Numbers;

/// <summary>
/// The reader against the plainest loop that gives the same three columns: split into lines, split at commas, double.Parse. The
/// loop knows the dialect beforehand, looks for no fault, and would throw at the first one.
/// </summary>
internal static class ReaderBenchmark
{
    public static void Run(Report report, Effort effort)
    {
        var rows = new List<string[]>();
        Measure(report, rows, 1_601, effort.Of(500, 150), effort.Of(1_500, 150));
        Measure(report, rows, 200_000, effort.Of(5, 1), effort.Of(25, 3));
        report.Table(["reading a CSV of three columns", "median ms", "p95 ms", "MB/s", "ratio to the loop"], rows);
    }

    private static void Measure(Report report, List<string[]> rows, int points, int warmUp, int rounds)
    {
        var content = SweepFile.Csv(points, 3);
        var sweep = SweepFileReader.Read(content, "unit.csv").Sweep;
        var (frequencyHz, gainDb, phaseDeg) = Loop(content);
        if (sweep is null || !sweep.FrequencyHz.SequenceEqual(frequencyHz) || !sweep.FirstPlane.SequenceEqual(gainDb) || !sweep.SecondPlane.SequenceEqual(phaseDeg))
            report.Fail($"Reader and loop do not read the same numbers out of {points} rows.");

        // In turn, so that a disturbance meets both alike.
        var (reader, loop) = (new Samples(), new Samples());
        for (var i = -warmUp; i < rounds; i++)
        {
            var ours = Samples.Of(0, 1, _ => SweepFileReader.Read(content, "unit.csv"));
            var plain = Samples.Of(0, 1, _ => Loop(content));
            if (i < 0)
                continue;
            reader.Add(ours.Median);
            loop.Add(plain.Median);
        }

        string[] Row(string what, Samples samples) =>
        [
            $"{Report.Number(points)} rows: {what}", Report.Ms(samples.Median), Report.Ms(samples.P95),
            Report.Number(content.Length / samples.Median / 1e3), Report.Ratio(samples.Median / loop.Median),
        ];
        rows.Add(Row("reader", reader));
        rows.Add(Row("plain loop", loop));
    }

    private static (double[] FrequencyHz, double[] GainDb, double[] PhaseDeg) Loop(byte[] content)
    {
        var lines = Encoding.UTF8.GetString(content).Split('\n', StringSplitOptions.RemoveEmptyEntries);
        var (frequencyHz, gainDb, phaseDeg) = (new double[lines.Length - 1], new double[lines.Length - 1], new double[lines.Length - 1]);
        for (var i = 1; i < lines.Length; i++)
        {
            var fields = lines[i].Split(',');
            frequencyHz[i - 1] = double.Parse(fields[0], CultureInfo.InvariantCulture);
            gainDb[i - 1] = double.Parse(fields[1], CultureInfo.InvariantCulture);
            phaseDeg[i - 1] = double.Parse(fields[2], CultureInfo.InvariantCulture);
        }

        return (frequencyHz, gainDb, phaseDeg);
    }
}

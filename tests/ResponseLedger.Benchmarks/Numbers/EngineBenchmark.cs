using System.Text;
using ResponseLedger.Benchmarks.Lab;
using ResponseLedger.Benchmarks.Measuring;
using ResponseLedger.Engine.Masks;
using ResponseLedger.Engine.Measures;
using ResponseLedger.Engine.Sweeps;
using ResponseLedger.Records.Masks;

namespace ResponseLedger.Benchmarks.Numbers;

/// <summary>A full evaluation of one sweep by four limits and two requirements; and the same arithmetic in numpy on the same arrays.</summary>
internal static class EngineBenchmark
{
    private const int Points = 1_601;

    // Both take the logarithm of each frequency once; their last digits may differ.
    private const double Agreement = 1e-9;

    public static void Run(Report report, Effort effort)
    {
        if (!MaskDocument.TryParse(Encoding.UTF8.GetBytes(BenchDevice.Mask), out var document, out var problems))
            throw new InvalidOperationException(problems[0].Sentence);
        var mask = document.Mask;
        var (warmUp, rounds) = (effort.Of(2_000, 300), effort.Of(5_000, 300));
        var (frequencyHz, gainDb, phaseDeg) = SweepFile.Curve(Points, 1);

        // A sweep keeps its unwrapped phase once it is asked for, so each round has one that was never asked.
        var sweeps = Enumerable.Range(0, warmUp + rounds).Select(_ => Sweep.Create(SweepForm.LevelPhase, frequencyHz, gainDb, phaseDeg)).ToArray();
        var full = Samples.Of(warmUp, rounds, i => MaskEvaluator.Evaluate(sweeps[i], null, mask, DeviceTraits.Transfer));
        var making = Samples.Of(warmUp, rounds, _ => Sweep.Create(SweepForm.LevelPhase, frequencyHz, gainDb, phaseDeg));
        var evaluation = MaskEvaluator.Evaluate(sweeps[0], null, mask, DeviceTraits.Transfer);
        if (evaluation.Criteria.Any(c => c.Margin is null))
            report.Fail("A criterion of the engine's benchmark has no margin.");

        var peer = NumpyPeer.Run(frequencyHz, gainDb, phaseDeg, effort.Of(2_000, 200));
        var rows = new List<string[]>
        {
            Row("engine: 4 limits and 2 requirements, exact between points", full, peer),
            Row("engine: making the sweep of three planes, with its checks", making, null),
        };
        if (peer is null)
        {
            report.Say("numpy was not found (python3 with numpy): the engine stands without its peer in this run.");
        }
        else
        {
            rows.Add(["numpy: the same six margins", Report.Ms(peer.MedianMs), Report.Ms(peer.P95Ms), "1.00"]);
            for (var i = 0; i < peer.Margins.Length; i++)
            {
                var own = evaluation.Criteria[i].Margin!.Value;
                if (!(Math.Abs(own - peer.Margins[i]) <= Agreement * Math.Max(1, Math.Abs(own))))
                    report.Fail($"The margin of {evaluation.Criteria[i].Name} is {own:R} in the engine and {peer.Margins[i]:R} in numpy.");
            }
        }

        report.Table([$"evaluation of {Points} points", "median ms", "p95 ms", "ratio to numpy"], rows);
    }

    private static string[] Row(string what, Samples samples, NumpyPeer? peer)
        => [what, Report.Ms(samples.Median), Report.Ms(samples.P95), peer is null ? "" : Report.Ratio(samples.Median / peer.MedianMs)];
}

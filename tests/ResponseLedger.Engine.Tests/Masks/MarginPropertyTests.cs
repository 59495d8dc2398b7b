using CsCheck;
using ResponseLedger.Engine.Masks;
using ResponseLedger.Engine.Sweeps;
using static ResponseLedger.Engine.Tests.Masks.Masking;

namespace ResponseLedger.Engine.Tests.Masks;

/// <summary>Laws of the least margin over random runs and limits, by routes that do not share the engine's search.</summary>
public sealed class MarginPropertyTests
{
    private static readonly Gen<(double[] F, double[] V)> Curves =
        Gen.Int[2, 12].SelectMany(n => Gen.Select(Gen.Double[0.05, 1].Array[n], Gen.Double[-30, 30].Array[n]).Select((widths, values) =>
        {
            // Frequencies from 10 Hz up to exactly 1000 Hz, unevenly spaced in log f.
            double total = widths.Skip(1).Sum();
            double at = 0;
            var f = new double[n];
            for (int i = 0; i < n; i++)
            {
                at += i == 0 ? 0 : widths[i] / total;
                f[i] = i == 0 ? 10 : i == n - 1 ? 1000 : 10 * Math.Pow(100, at);
            }

            return (f, values);
        }));

    private static CurveLimit LimitOf((double[] F, double[] V) corners, LimitSide side)
        => Limit(side, [.. corners.F.Zip(corners.V)]);

    private static double MarginOf(Sweep run, CurveLimit limit, Sweep? golden = null) => run.Judge(limit, golden).Margin!.Value;

    [Fact]
    public void A_dense_scan_never_finds_a_smaller_margin_and_comes_close_to_it()
        => Gen.Select(Curves, Curves, Gen.Bool).Sample((run, corners, upper) =>
        {
            var limit = LimitOf(corners, upper ? LimitSide.Upper : LimitSide.Lower);
            double exact = MarginOf(Measuring.Levels(run.F, run.V), limit);
            double scanned = double.PositiveInfinity;
            foreach (double f in Measuring.LogGrid(10, 1000, 4001))
            {
                double distance = At(corners, f) - At(run, f);
                scanned = Math.Min(scanned, upper ? distance : -distance);
            }

            Assert.True(exact <= scanned + 1e-9, $"{exact:R} against {scanned:R}");
            // Run and limit together change by at most 120 dB over the narrowest piece, 1/200 of the span; half a scan step is 1/8000 of it.
            Assert.True(scanned - exact < 4, $"{exact:R} is far under {scanned:R}");
        }, seed: "0000KOIPIEC2", iter: 200);

    [Fact]
    public void The_margin_is_that_of_a_point_or_a_corner()
        => Gen.Select(Curves, Curves).Sample((run, corners) =>
        {
            double exact = MarginOf(Measuring.Levels(run.F, run.V), LimitOf(corners, LimitSide.Upper));
            double brute = run.F.Concat(corners.F).Min(f => At(corners, f) - At(run, f));
            Measuring.Close(brute, exact, 1e-9, "margin");
        }, seed: "0000KOIPIEC3");

    [Fact]
    public void Inserting_collinear_points_or_corners_changes_no_margin()
        => Gen.Select(Curves, Curves, Gen.Double[10.01, 999.9]).Sample((run, corners, atHz) =>
        {
            if (run.F.Contains(atHz) || corners.F.Contains(atHz))
                return;
            double before = MarginOf(Measuring.Levels(run.F, run.V), LimitOf(corners, LimitSide.Lower));
            var moreRun = Insert(run, atHz);
            var moreCorners = Insert(corners, atHz);
            Measuring.Close(before, MarginOf(Measuring.Levels(moreRun.F, moreRun.V), LimitOf(corners, LimitSide.Lower)), 1e-9, "more points");
            Measuring.Close(before, MarginOf(Measuring.Levels(run.F, run.V), LimitOf(moreCorners, LimitSide.Lower)), 1e-9, "more corners");
        }, seed: "0000KOIPIEC4");

    [Fact]
    public void Raising_run_and_limit_alike_or_scaling_all_frequencies_changes_no_margin()
        => Gen.Select(Curves, Curves, Gen.Double[-100, 100], Gen.Double[0.001, 1000]).Sample((run, corners, raiseDb, factor) =>
        {
            double before = MarginOf(Measuring.Levels(run.F, run.V), LimitOf(corners, LimitSide.Upper));
            var raised = (corners.F, V: Array.ConvertAll(corners.V, v => v + raiseDb));
            Measuring.Close(before, MarginOf(Measuring.Levels(run.F, Array.ConvertAll(run.V, v => v + raiseDb)), LimitOf(raised, LimitSide.Upper)), 1e-9, "raised");
            var moved = (F: Array.ConvertAll(corners.F, f => f * factor), corners.V);
            Measuring.Close(before, MarginOf(Measuring.Levels(Array.ConvertAll(run.F, f => f * factor), run.V), LimitOf(moved, LimitSide.Upper)), 1e-8, "scaled");
        }, seed: "0000KOIPIEC5");

    [Fact]
    public void Against_a_golden_run_the_margin_is_that_of_the_difference_at_all_points_and_corners()
        => Gen.Select(Curves, Curves, Curves).Sample((run, golden, corners) =>
        {
            double exact = MarginOf(Measuring.Levels(run.F, run.V), LimitOf(corners, LimitSide.Upper).AgainstGolden(), Measuring.Levels(golden.F, golden.V));
            double brute = run.F.Concat(golden.F).Concat(corners.F).Min(f => At(corners, f) - (At(run, f) - At(golden, f)));
            Measuring.Close(brute, exact, 1e-9, "margin");
        }, seed: "0000KOIPIEC6");

    private static (double[] F, double[] V) Insert((double[] F, double[] V) curve, double atHz)
    {
        int index = Array.FindIndex(curve.F, f => f > atHz);
        return ([.. curve.F[..index], atHz, .. curve.F[index..]], [.. curve.V[..index], At(curve, atHz), .. curve.V[index..]]);
    }

    private static double At((double[] F, double[] V) curve, double f)
    {
        int i = Math.Max(1, Array.FindIndex(curve.F, x => x >= f));
        double t = Math.Log(f / curve.F[i - 1]) / Math.Log(curve.F[i] / curve.F[i - 1]);
        return curve.V[i - 1] * (1 - t) + curve.V[i] * t;
    }
}

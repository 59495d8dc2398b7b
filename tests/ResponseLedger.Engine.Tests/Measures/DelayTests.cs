using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Engine.Tests.Measures;

public sealed class DelayTests
{
    private static readonly double[] Uneven = [100, 130, 150, 210, 300, 330, 500];

    private static Sweep WithPhase(double[] f, Func<double, double> phaseDeg)
        => Measuring.LevelsAndPhases(f, new double[f.Length], Array.ConvertAll(f, x => phaseDeg(x)));

    [Fact]
    public void A_parabola_in_f_is_differentiated_exactly_at_every_point_of_an_uneven_grid()
    {
        // phase = 20 - 0.1 f - 0.0002 f^2: delay = (0.1 + 0.0004 f) / 360.
        var run = WithPhase(Uneven, f => 20 - 0.1 * f - 0.0002 * f * f);
        for (int i = 0; i < run.Count; i++)
            Measuring.Close((0.1 + 0.0004 * Uneven[i]) / 360, run.DelaySeconds[i], 1e-15, $"delay at {Uneven[i]} Hz");
        double halfway = Math.Sqrt(150 * 210);
        Measuring.Close((run.DelaySeconds[2] + run.DelaySeconds[3]) / 2, run.Measure("delay", ("frequencyHz", halfway)).Value("delaySeconds"), 1e-15, "between");
    }

    [Fact]
    public void Two_points_have_the_one_slope_there_is()
        => Assert.Equal([1e-3, 1e-3], WithPhase([100, 200], f => -0.36 * f).DelaySeconds.ToArray().Select(d => Math.Round(d, 15)));

    [Fact]
    public void An_aperture_fits_the_straight_phase_curve_by_least_squares_in_f()
    {
        // One piece, phase = -10 ln f degrees. Least squares in f over [lo, hi]: slope = 12/W^3 times the integral of (f - m) phase,
        // in closed form with the antiderivatives f^2/2 ln f - f^2/4 and f ln f - f.
        var run = WithPhase([10, 10_000], f => -10 * Math.Log(f));
        foreach (double ratio in (double[])[1.01, 1.5, 4, 100])
        {
            double lo = 300 / Math.Sqrt(ratio), hi = 300 * Math.Sqrt(ratio), m = (lo + hi) / 2, w = hi - lo;
            double integral = Anti(hi, m) - Anti(lo, m);
            double expected = 12 * -10 * integral / (w * w * w) / -360;
            var found = run.Measure("delay", ("frequencyHz", 300), ("apertureRatio", ratio));
            Measuring.Close(expected, found.Value("delaySeconds"), Math.Abs(expected) * (ratio < 1.1 ? 1e-6 : 1e-11), $"ratio {ratio}");
            Assert.Equal("aperture", Assert.Single(found.Notes).Code);
        }

        static double Anti(double f, double m) => f * f / 2 * Math.Log(f) - f * f / 4 - m * (f * Math.Log(f) - f);
    }

    [Fact]
    public void An_aperture_over_many_points_averages_a_pure_delay_to_itself()
    {
        var f = Measuring.LogGrid(100, 10_000, 2001);
        var run = WithPhase(f, x => -360 * x * 1e-4);
        Measuring.Close(1e-4, run.Measure("delay", ("frequencyHz", 1000), ("apertureRatio", 2)).Value("delaySeconds"), 1e-9, "delay");
        Measuring.Close(1e-4, run.Measure("delay", ("frequencyHz", 1000)).Value("delaySeconds"), 1e-12, "at the point");
    }

    [Fact]
    public void An_aperture_that_leaves_the_sweep_is_absent()
    {
        var run = WithPhase([100, 1000], f => -f / 100);
        var found = run.Measure("delay", ("frequencyHz", 120), ("apertureRatio", 1.5));
        Assert.Null(found.Value("delaySeconds"));
        Assert.Equal("outsideSweep", found.Reason!.Code);
        Assert.NotNull(run.Measure("delay", ("frequencyHz", 120), ("apertureRatio", 1.4)).Value("delaySeconds"));
    }

    [Fact]
    public void Without_phase_or_beside_a_point_without_phase_the_delay_is_absent()
    {
        Assert.Equal("phaseAbsent", Measuring.Levels([1, 2], [0, 0]).Measure("delay", ("frequencyHz", 1)).Reason!.Code);
        Assert.Equal("phaseAbsent", Measuring.Levels([1, 2], [0, 0]).Measure("phase", ("frequencyHz", 1)).Reason!.Code);
        var run = Measuring.LevelsAndPhases([1, 2, 3, 4, 5, 6, 7], [0, 0, double.NegativeInfinity, 0, 0, 0, 0], [0, 1, 2, 3, 4, 5, 6]);
        Assert.Equal("phaseAbsent", run.Measure("delay", ("frequencyHz", 2)).Reason!.Code);
        Assert.Equal("phaseAbsent", run.Measure("phase", ("frequencyHz", 2.5)).Reason!.Code);
        Assert.Equal("phaseAbsent", run.Measure("delay", ("frequencyHz", 3), ("apertureRatio", 1.1)).Reason!.Code);
        Measuring.Close(-1.0 / 360, run.Measure("delay", ("frequencyHz", 5)).Value("delaySeconds"), 1e-15, "further on");
    }

    [Fact]
    public void Results_that_span_a_suspect_step_carry_the_flag_and_others_do_not()
    {
        var run = Measuring.LevelsAndPhases([1, 2, 3, 4, 5, 6], new double[6], [0, 1, 2, 132, 133, 134]);
        Assert.DoesNotContain(run.Measure("phase", ("frequencyHz", 3)).Notes, n => n.Code == "suspectPhase");
        Assert.Contains(run.Measure("phase", ("frequencyHz", 6)).Notes, n => n.Code == "suspectPhase");
        Assert.DoesNotContain(run.Measure("delay", ("frequencyHz", 2)).Notes, n => n.Code == "suspectPhase");
        Assert.Contains(run.Measure("delay", ("frequencyHz", 2.5)).Notes, n => n.Code == "suspectPhase");
        Assert.DoesNotContain(run.Measure("delay", ("frequencyHz", 5.5)).Notes, n => n.Code == "suspectPhase");
        Assert.Contains(run.Measure("loopMargins").Notes, n => n.Code == "suspectPhase");
    }
}

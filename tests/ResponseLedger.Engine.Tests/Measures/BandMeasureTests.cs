using CsCheck;
using ResponseLedger.Engine.Measures;
using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Engine.Tests.Measures;

public sealed class BandMeasureTests
{
    private static readonly Sweep Hill = Measuring.Levels([10, 100, 1000], [0, 10, -10]);

    [Fact]
    public void Ripple_counts_the_band_edges()
    {
        // 3 dB at 10^1.3 Hz, 10 dB at 100 Hz, 0 dB at 10^2.5 Hz.
        Measuring.Close(10, Hill.Measure("ripple", ("fromHz", Math.Pow(10, 1.3)), ("toHz", Math.Pow(10, 2.5))).Value("rippleDb"), 1e-12, "ripple");
        Measuring.Close(4, Hill.Measure("ripple", ("fromHz", Math.Pow(10, 1.3)), ("toHz", Math.Pow(10, 1.7))).Value("rippleDb"), 1e-12, "ripple inside a piece");
        Measuring.Close(20, Hill.Measure("ripple", ("fromHz", 10), ("toHz", 1000)).Value("rippleDb"), 0, "whole sweep");
    }

    [Fact]
    public void Attenuation_is_the_reference_less_the_highest_level_of_the_band()
    {
        Measuring.Close(10, Hill.Measure("attenuation", Measuring.Peak, ("fromHz", Math.Pow(10, 2.5)), ("toHz", 1000)).Value("attenuationDb"), 1e-12, "from the peak");
        Measuring.Close(-10, Hill.Measure("attenuation", new ReferenceLevel.AtFrequency(10), ("fromHz", 50), ("toHz", 200)).Value("attenuationDb"), 1e-12, "above the reference");
        var notch = Measuring.Levels([10, 20, 40, 80], [0, -30, double.NegativeInfinity, -40]);
        Measuring.Close(30, notch.Measure("attenuation", Measuring.Peak, ("fromHz", 20), ("toHz", 80)).Value("attenuationDb"), 0, "over a zero");
        Assert.Equal("zeroGain", notch.Measure("attenuation", Measuring.Peak, ("fromHz", 30), ("toHz", 80)).Reason!.Code);
    }

    [Fact]
    public void Peak_in_a_band_counts_the_edges_and_says_so()
    {
        var inside = Hill.Measure("peak", ("fromHz", 50), ("toHz", 200));
        Assert.Equal((10, 100), (inside.Value("gainDb"), inside.Value("frequencyHz")));
        Assert.Empty(inside.Notes);
        var edge = Hill.Measure("peak", ("toHz", Math.Pow(10, 1.5)));
        Measuring.Close(5, edge.Value("gainDb"), 1e-12, "edge");
        Assert.Equal(Math.Pow(10, 1.5), edge.Value("frequencyHz"));
        Assert.Equal("peakAtEdge", Assert.Single(edge.Notes).Code);
        Assert.Equal("outsideSweep", Hill.Measure("peak", ("fromHz", 1000)).Reason!.Code);
        Assert.Equal("zeroGain", Measuring.Levels([1, 2], [double.NegativeInfinity, double.NegativeInfinity]).Measure("peak").Reason!.Code);
    }

    [Theory]
    [InlineData(1)]
    [InlineData(-2)]
    [InlineData(0.5)]
    [InlineData(-1.7)]
    public void A_gain_that_goes_as_f_to_the_p_runs_at_twenty_p_decibels_a_decade(double p)
    {
        // Common practice. The grid is uneven on purpose: the fit is by integrals, so the points have no weight.
        double[] f = [10, 11, 12, 13, 14, 15, 500, 10_000];
        var run = Sweep.Create(SweepForm.Ratio, f, Array.ConvertAll(f, x => Math.Pow(x, p)), []);
        var slope = run.Measure("slope", ("fromHz", 12.5), ("toHz", 9000));
        Measuring.Close(20 * p, slope.Value("dbPerDecade"), 1e-11, "a decade");
        Measuring.Close(20 * p * Math.Log10(2), slope.Value("dbPerOctave"), 1e-11, "an octave");
        Measuring.Close(p, slope.Value("power"), 1e-12, "power");
        Measuring.Close(0, slope.Value("residualDb"), 1e-11, "residual");
    }

    [Fact]
    public void Slope_and_residual_of_a_roof_are_those_of_calculus()
    {
        // L = 1 - |u| over u = -1..1: slope 0, mean 1/2, rms of (1/2 - |u|) = 1/sqrt 12.
        var slope = Measuring.Levels([0.1, 1, 10], [0, 1, 0]).Measure("slope", ("fromHz", 0.1), ("toHz", 10));
        Measuring.Close(0, slope.Value("dbPerDecade"), 1e-14, "slope");
        Measuring.Close(1 / Math.Sqrt(12), slope.Value("residualDb"), 1e-14, "residual");
    }

    [Theory]
    [InlineData("ripple")]
    [InlineData("slope")]
    [InlineData("attenuation")]
    [InlineData("peak")]
    public void A_band_outside_the_sweep_is_absent_and_nothing_is_extrapolated(string measure)
    {
        var reference = measure == "attenuation" ? Measuring.Peak : null;
        foreach (var (from, to) in (ReadOnlySpan<(double, double)>)[(9.99, 100), (100, 1000.1), (2000, 3000)])
        {
            var found = Hill.Measure(measure, reference, ("fromHz", from), ("toHz", to));
            Assert.All(found.Outputs, o => Assert.Null(o.Value));
            Assert.Equal("outsideSweep", found.Reason!.Code);
        }
    }

    [Fact]
    public void A_gain_of_zero_in_the_band_leaves_no_ripple_slope_or_mean()
    {
        var run = Measuring.Levels([1, 10, 100, 1000], [0, double.NegativeInfinity, 0, 0]);
        Assert.Equal("zeroGain", run.Measure("ripple", ("fromHz", 1), ("toHz", 100)).Reason!.Code);
        Assert.Equal("zeroGain", run.Measure("ripple", ("fromHz", 20), ("toHz", 1000)).Reason!.Code);
        Assert.Equal("zeroGain", run.Measure("slope", ("fromHz", 1), ("toHz", 100)).Reason!.Code);
        Assert.Equal(0, run.Measure("ripple", ("fromHz", 100), ("toHz", 1000)).Value("rippleDb"));
        Assert.Equal("zeroGain", ReferenceLevels.Resolve(run, new ReferenceLevel.Band(1, 100)).Reason!.Code);
        Assert.Equal("zeroGain", ReferenceLevels.Resolve(run, new ReferenceLevel.AtFrequency(5)).Reason!.Code);
        Assert.Equal("zeroGain", run.Measure("level", ("frequencyHz", 10)).Reason!.Code);
    }

    [Fact]
    public void Levels_that_are_referred_to_a_band_use_the_mean_over_log_f()
    {
        // 0 to 10 dB over one decade, then 10 to -10 over the next: means 5 and 0; over both 2.5.
        Measuring.Close(5, ReferenceLevels.Resolve(Hill, new ReferenceLevel.Band(10, 100)).GainDb, 1e-12, "first decade");
        Measuring.Close(2.5, ReferenceLevels.Resolve(Hill, new ReferenceLevel.Band(10, 1000)).GainDb, 1e-12, "both");
        Assert.Equal(10, ReferenceLevels.Resolve(Hill, Measuring.Peak).GainDb);
        Assert.Equal("outsideSweep", ReferenceLevels.Resolve(Hill, new ReferenceLevel.Band(5, 100)).Reason!.Code);
    }

    [Fact]
    public void Measures_do_not_depend_on_points_on_a_straight_piece()
        => Gen.Select(Gen.Double[-40, 40].Array[6], Gen.Double[11, 990]).Sample((levels, atHz) =>
        {
            double[] f = [10, 20, 60, 200, 700, 1000];
            if (f.Contains(atHz))
                return;
            var run = Measuring.Levels(f, levels);
            int index = Array.FindIndex(f, x => x > atHz);
            var more = Measuring.Levels([.. f[..index], atHz, .. f[index..]], [.. levels[..index], run.GainDbAt(atHz)!.Value, .. levels[index..]]);
            foreach (string measure in (string[])["ripple", "slope", "peak"])
            {
                var a = run.Measure(measure, ("fromHz", 15), ("toHz", 900));
                var b = more.Measure(measure, ("fromHz", 15), ("toHz", 900));
                foreach (var (x, y) in a.Outputs.Zip(b.Outputs).Where(p => p.First.Name != "frequencyHz"))
                    Measuring.Close(x.Value!.Value, y.Value, 1e-9, measure + " " + x.Name);
            }
        }, seed: "0000KOIPIEC7");
}

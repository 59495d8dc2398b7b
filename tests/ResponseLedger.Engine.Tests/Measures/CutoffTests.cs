using ResponseLedger.Engine.Measures;
using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Engine.Tests.Measures;

public sealed class CutoffTests
{
    // One decade up from -20 to 0 dB, one decade flat, one decade down to -20 dB.
    private static readonly Sweep Band = Measuring.Levels([10, 100, 1000, 10_000], [-20, 0, 0, -20]);

    private static MeasureResult Bandwidth(Sweep run, double dropDb, ReferenceLevel reference) => run.Measure("bandwidth", reference, ("dropDb", dropDb));

    [Fact]
    public void Cutoffs_and_what_follows_from_them_are_exact_on_straight_pieces()
    {
        var found = Bandwidth(Band, 10, Measuring.Peak);
        double lower = Math.Pow(10, 1.5);
        double upper = Math.Pow(10, 3.5);
        Measuring.Close(lower, found.Value("lowerHz"), 1e-11, "lower");
        Measuring.Close(upper, found.Value("upperHz"), 1e-9, "upper");
        Measuring.Close(upper - lower, found.Value("bandwidthHz"), 1e-9, "bandwidth");
        Measuring.Close(Math.Pow(10, 2.5), found.Value("centreHz"), 1e-10, "centre");
        Measuring.Close(Math.Pow(10, 2.5) / (upper - lower), found.Value("q"), 1e-12, "Q");
        Measuring.Close((upper - lower) / Math.Pow(10, 2.5), found.Value("fractional"), 1e-11, "fractional");
        Assert.Null(found.Reason);
        Assert.Empty(found.Notes);
    }

    [Fact]
    public void Half_power_and_three_decibels_move_a_first_order_corner_by_a_quarter_percent()
    {
        // design: 10 log10 2 = 3.0103 dB against 3 dB; f(3 dB)/f(half power) = sqrt(10^0.3 - 1).
        var f = Measuring.LogGrid(10, 100_000, 40_001);
        var run = Sweep.Create(SweepForm.Ratio, f, Array.ConvertAll(f, x => 1 / Math.Sqrt(1 + x * x / 1e6)), []);
        double? half = Bandwidth(run, Measuring.HalfPowerDb, new ReferenceLevel.AtFrequency(10)).Value("upperHz");
        double? three = Bandwidth(run, 3, new ReferenceLevel.AtFrequency(10)).Value("upperHz");
        Measuring.Close(Math.Sqrt(Math.Pow(10, 0.3) - 1), three / half, 1e-6, "ratio of the corners");
    }

    [Fact]
    public void A_cutoff_outside_the_sweep_is_not_reached_and_the_side_is_named()
    {
        var found = Bandwidth(Measuring.Levels([10, 100, 1000], [-2, 0, -10]), 5, Measuring.Peak);
        Assert.Null(found.Value("lowerHz"));
        Measuring.Close(Math.Pow(10, 2.5), found.Value("upperHz"), 1e-10, "upper");
        Assert.Null(found.Value("bandwidthHz"));
        Assert.Null(found.Value("q"));
        Assert.Equal("notReached", found.Reason!.Code);
        Assert.Contains("lower cutoff", found.Reason.Sentence, StringComparison.Ordinal);
        Assert.DoesNotContain("upper", found.Reason.Sentence, StringComparison.Ordinal);
        var flat = Bandwidth(Measuring.Levels([10, 100], [1, 1]), 3, Measuring.Peak);
        Assert.All(flat.Outputs, o => Assert.Null(o.Value));
        Assert.Contains("lower cutoff", flat.Reason!.Sentence, StringComparison.Ordinal);
        Assert.Contains("upper cutoff", flat.Reason.Sentence, StringComparison.Ordinal);
    }

    [Fact]
    public void The_walk_takes_the_first_crossing_on_each_side()
    {
        // Falls to -10, rises again, falls to -30: the first crossing of -6 dB counts.
        var run = Measuring.Levels([10, 100, 1000, 10_000], [0, -12, 0, -30]);
        Measuring.Close(Math.Sqrt(1000), Bandwidth(run, 6, Measuring.Peak).Value("upperHz"), 1e-11, "first");
        // A point that stands exactly on the level is the crossing.
        Assert.Equal(100, Bandwidth(run, 12, Measuring.Peak).Value("upperHz"));
    }

    [Fact]
    public void The_walk_starts_at_the_stated_frequency_or_the_bands_edges()
    {
        var run = Measuring.Levels([1, 10, 100, 1000, 10_000], [-20, 0, -20, -10, -30]);
        var at = Bandwidth(run, 5, new ReferenceLevel.AtFrequency(1000));
        Measuring.Close(Math.Pow(10, 2.5), at.Value("lowerHz"), 1e-10, "lower");
        Measuring.Close(Math.Pow(10, 3.25), at.Value("upperHz"), 1e-9, "upper");
        // Mean of 10 to 100 Hz is -10 dB: at 100 Hz the level is under it less 5 dB, the crossing lies inside, at 10^1.75 Hz.
        var band = Bandwidth(run, 5, new ReferenceLevel.Band(10, 100));
        Measuring.Close(Math.Pow(10, 0.25), band.Value("lowerHz"), 1e-12, "lower");
        Assert.Null(band.Value("upperHz"));
        Assert.Equal("crossingInsideBand", band.Reason!.Code);
        Assert.Contains("56.23413 Hz", Assert.Single(band.Notes).Sentence, StringComparison.Ordinal);
    }

    [Fact]
    public void A_crossing_into_a_gain_of_zero_cannot_be_placed()
    {
        var found = Bandwidth(Measuring.Levels([10, 100, 1000], [-9, 0, double.NegativeInfinity]), 3, Measuring.Peak);
        Measuring.Close(Math.Pow(10, 2 - 3.0 / 9), found.Value("lowerHz"), 1e-11, "lower");
        Assert.Null(found.Value("upperHz"));
        Assert.Equal("zeroGain", found.Reason!.Code);
    }

    [Fact]
    public void Of_equal_peaks_the_lowest_frequency_counts_whatever_the_rounding()
    {
        var run = Measuring.Levels([1, 10, 100, 1000, 10_000], [0, 5, 0, 5 + 4e-10, 0]);
        var peak = run.Measure("peak");
        Assert.Equal(10, peak.Value("frequencyHz"));
        Assert.Equal(5 + 4e-10, peak.Value("gainDb"));
        Measuring.Close(Math.Pow(10, 1.6), Bandwidth(run, 3, Measuring.Peak).Value("upperHz"), 1e-6, "upper");
    }

    [Fact]
    public void Shape_factor_is_the_ratio_of_two_bandwidths()
    {
        var found = Band.Measure("shapeFactor", Measuring.Peak, ("outerDropDb", 20), ("innerDropDb", 10));
        Measuring.Close(9990 / (Math.Pow(10, 3.5) - Math.Pow(10, 1.5)), found.Value("ratio"), 1e-11, "ratio");
        var open = Band.Measure("shapeFactor", Measuring.Peak, ("outerDropDb", 21), ("innerDropDb", 10));
        Assert.Equal("notReached", open.Reason!.Code);
        Assert.Null(open.Value("ratio"));
    }
}

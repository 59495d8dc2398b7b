using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Engine.Tests.Sweeps;

public sealed class GoldenRatioTests
{
    [Fact]
    public void The_ratio_stands_at_the_union_of_both_grids_in_the_common_span()
    {
        var ratio = GoldenRatio.Of(Measuring.Levels([1, 10, 100], [0, 2, 4]), Measuring.Levels([5, 10, 20, 500], [1, 1, 1, 1]))!;
        Assert.Equal([5, 10, 20, 100], ratio.FrequencyHz.ToArray());
        Measuring.Close(2 * Math.Log10(5) - 1, ratio.DifferenceDb[0], 1e-12, "at 5 Hz");
        Measuring.Close(1, ratio.DifferenceDb[1], 1e-12, "at 10 Hz");
        Measuring.Close(2 + 2 * Math.Log10(2) - 1, ratio.DifferenceDb[2], 1e-12, "at 20 Hz");
        Measuring.Close(3, ratio.DifferenceDb[3], 1e-12, "at 100 Hz");
        Assert.True(ratio.DifferenceDeg.IsEmpty);
        Assert.True(ratio.DelayDifferenceSeconds.IsEmpty);
    }

    [Fact]
    public void A_run_against_itself_is_nothing()
    {
        var run = Measuring.LevelsAndPhases([1, 10, 100], [0, 2, 4], [-170, 100, 20]);
        var ratio = GoldenRatio.Of(run, run)!;
        Assert.Equal([0, 0, 0], ratio.DifferenceDb.ToArray());
        Assert.Equal([0, 0, 0], ratio.DifferenceDeg.ToArray());
        Assert.Equal([0, 0, 0], ratio.DelayDifferenceSeconds.ToArray());
    }

    [Fact]
    public void The_phase_is_unwrapped_as_that_of_a_ratio()
    {
        // One curve steps by +170, the other by -170: their unwrapped difference of 340 is a step of -20 of the ratio.
        var ratio = GoldenRatio.Of(Measuring.LevelsAndPhases([1, 2], [0, 0], [0, 170]), Measuring.LevelsAndPhases([1, 2], [0, 0], [0, -170]))!;
        Assert.Equal([0, -20], ratio.DifferenceDeg.ToArray());
        Assert.True(ratio.SuspectSteps.IsEmpty);
    }

    [Fact]
    public void Delay_differs_by_the_extra_cable()
    {
        double[] f = [100, 200, 300];
        var golden = Measuring.LevelsAndPhases(f, new double[3], [0, -10, -25]);
        var run = Measuring.LevelsAndPhases(f, new double[3], [0 - 3.6, -10 - 7.2, -25 - 10.8]);
        foreach (double difference in GoldenRatio.Of(run, golden)!.DelayDifferenceSeconds)
            Measuring.Close(1e-4, difference, 1e-15, "0.1 ms of cable");
    }

    [Fact]
    public void Runs_without_a_common_span_have_no_ratio()
    {
        Assert.Null(GoldenRatio.Of(Measuring.Levels([1, 2], [0, 0]), Measuring.Levels([3, 4], [0, 0])));
        Assert.Null(GoldenRatio.Of(Measuring.Levels([1, 2], [0, 0]), Measuring.Levels([2, 4], [0, 0])));
    }

    [Fact]
    public void Zeros_are_minus_infinity_for_the_run_and_absent_for_the_golden_run()
    {
        var hole = Measuring.Levels([1, 4, 16], [0, double.NegativeInfinity, 0]);
        var flat = Measuring.Levels([1, 2, 16], [0, 0, 0]);
        Assert.Equal([0, double.NegativeInfinity, double.NegativeInfinity, 0], GoldenRatio.Of(hole, flat)!.DifferenceDb.ToArray());
        Assert.Equal([0, double.NaN, double.NaN, 0], GoldenRatio.Of(flat, hole)!.DifferenceDb.ToArray());
    }
}

using CsCheck;
using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Engine.Tests.Sweeps;

public sealed class UnwrappingTests
{
    private static double[] Unwrapped(params double[] phaseDeg)
        => Phases(phaseDeg).PhaseDeg.ToArray();

    private static Sweep Phases(double[] phaseDeg, double nominalDelaySeconds = 0)
    {
        var f = Enumerable.Range(1, phaseDeg.Length).Select(i => (double)i).ToArray();
        return Sweep.Create(SweepForm.LevelPhase, f, new double[phaseDeg.Length], phaseDeg, nominalDelaySeconds);
    }

    [Fact]
    public void No_step_exceeds_half_a_turn()
        => Assert.Equal([170, 190, 250, 370, 300], Unwrapped(170, -170, -110, 10, 300 - 360));

    [Theory]
    [InlineData(180, 180)]
    [InlineData(-180, 180)]
    [InlineData(181, -179)]
    [InlineData(540, 180)]
    [InlineData(-540, 180)]
    [InlineData(719, -1)]
    public void The_first_point_lands_above_minus_180_up_to_180(double given, double expected)
        => Assert.Equal(expected, Unwrapped(given, given)[0]);

    [Fact]
    public void A_step_of_exactly_half_a_turn_keeps_its_sign()
    {
        Assert.Equal([0, 180], Unwrapped(0, 180));
        Assert.Equal([0, -180], Unwrapped(0, -180));
        Assert.Equal([0, 180], Unwrapped(0, 540));
    }

    [Fact]
    public void A_step_of_300_reads_as_minus_60_and_only_steps_over_120_are_suspect()
    {
        var run = Phases([0, 300, 180, 301]);
        Assert.Equal([0, -60, -180, -59], run.PhaseDeg.ToArray());
        Assert.Equal([new SuspectStep(3, 4, 121)], run.SuspectSteps.ToArray());
        Assert.False(run.HasSuspectStep(1, 3));
        Assert.True(run.HasSuspectStep(1, 3.5));
        Assert.True(run.HasSuspectStep(3, 9));
        Assert.False(run.HasSuspectStep(4, 9));
    }

    [Fact]
    public void Turns_are_carried_over_points_without_phase()
    {
        var run = Sweep.Create(SweepForm.LevelPhase, [1, 2, 3, 4], [double.NegativeInfinity, 0, double.NegativeInfinity, 0], [77, 350, 5, 40]);
        Assert.True(double.IsNaN(run.PhaseDeg[0]));
        Assert.Equal(-10, run.PhaseDeg[1]);
        Assert.True(double.IsNaN(run.PhaseDeg[2]));
        Assert.Equal(40, run.PhaseDeg[3]);
    }

    [Fact]
    public void A_stated_delay_is_taken_out_before_counting_and_put_back_after()
    {
        // One second of delay turns by 360 degrees a hertz: the wrapped phase stands still.
        Assert.Equal([10, 10, 10], Phases([10, 10, 10]).PhaseDeg.ToArray());
        Assert.Equal([10, -350, -710], Phases([10, 10, 10], 1).PhaseDeg.ToArray());
        Assert.True(Phases([10, 10, 10], 1).SuspectSteps.IsEmpty);
    }

    [Fact]
    public void Unwrapping_adds_whole_turns_and_bounds_every_step()
        => Gen.Double[-2000, 2000].Array[2, 60].Sample(given =>
        {
            var found = Unwrapped(given);
            Assert.InRange(found[0], Math.BitIncrement(-180.0), 180);
            for (int i = 0; i < given.Length; i++)
            {
                double turns = (found[i] - given[i]) / 360;
                Measuring.Close(Math.Round(turns), turns, 1e-11, "whole turns");
                if (i > 0)
                    Assert.InRange(Math.Abs(found[i] - found[i - 1]), 0, 180 + 1e-9);
            }
        }, seed: "0000KOIPIEC0");

    [Fact]
    public void Unwrapping_does_not_depend_on_the_turns_that_the_file_had()
        => Gen.Select(Gen.Double[-179, 179], Gen.Double[-170, 170].Array[40], Gen.Int[-5, 5].Array[41]).Sample((start, steps, turns) =>
        {
            var smooth = new double[41];
            smooth[0] = start;
            for (int i = 1; i < 41; i++)
                smooth[i] = smooth[i - 1] + steps[i - 1];
            var found = Unwrapped([.. smooth.Zip(turns, (p, k) => p + 360 * k)]);
            for (int i = 0; i < 41; i++)
                Measuring.Close(smooth[i], found[i], 1e-9, "phase");
        }, seed: "0000KOIPIEC1");

    [Fact]
    public void Enormous_angles_neither_hang_nor_leave_the_first_interval()
        => Assert.InRange(Unwrapped(1e300, -1e300)[0], -180, 180);
}

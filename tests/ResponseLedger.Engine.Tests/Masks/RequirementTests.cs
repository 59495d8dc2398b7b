using ResponseLedger.Engine.Masks;
using ResponseLedger.Engine.Measures;
using ResponseLedger.Engine.Sweeps;
using static ResponseLedger.Engine.Tests.Masks.Masking;

namespace ResponseLedger.Engine.Tests.Masks;

public sealed class RequirementTests
{
    private static readonly Sweep Hill = Measuring.Levels([10, 100, 1000], [0, 10, -10]);

    // Crosses 0 dB at 10, 100 and 1000 Hz with phase margins of 60, 20 and 50 degrees; phase is -180 at 10^3.5 Hz, where the level is -10 dB.
    private static readonly Sweep Loop = Measuring.LevelsAndPhases(
        [1, 10, 31.622776601683793, 100, 300, 1000, 10_000], [20, 0, -5, 0, 8, 0, -20], [-100, -120, -140, -160, -150, -130, -230]);

    [Fact]
    public void Two_sided_and_one_sided_bounds_give_the_distance_to_the_nearer_one()
    {
        Hill.Judge(Require("peak", "gainDb", 9, 12, null)).Is(Outcome.Pass, 1, 100);
        Hill.Judge(Require("peak", "gainDb", null, 12, null)).Is(Outcome.Pass, 2, 100);
        Hill.Judge(Require("peak", "gainDb", 11, null, null)).Is(Outcome.Fail, -1, 100);
        Hill.Judge(Require("peak", "gainDb", 10, 10, null)).Is(Outcome.Pass, 0, 100);
        Hill.Judge(Require("level", "gainDb", 4, null, null, ("frequencyHz", 1000))).Is(Outcome.Fail, -14, 1000);
        Assert.Equal("dB/decade", Hill.Judge(Require("slope", "dbPerDecade", -25, null, null, ("fromHz", 100), ("toHz", 1000))).Unit);
    }

    [Fact]
    public void An_absent_output_is_inconclusive_with_the_measures_reason()
    {
        Hill.Judge(Require("bandwidth", "lowerHz", 1, 100, Measuring.Peak, ("dropDb", 12))).Is(Outcome.Inconclusive, null, null, "notReached");
        Hill.Judge(Require("bandwidth", "upperHz", 1, 1e6, Measuring.Peak, ("dropDb", 10))).Is(Outcome.Pass, Math.Sqrt(1e5) - 1, Math.Sqrt(1e5));
        Hill.Judge(Require("phase", "phaseDeg", 0, 1, null, ("frequencyHz", 100))).Is(Outcome.Inconclusive, null, null, "phaseAbsent");
        Hill.Judge(Require("level", "gainDb", 0, 1, null, ("frequencyHz", 1))).Is(Outcome.Inconclusive, null, null, "outsideSweep");
    }

    [Fact]
    public void A_phase_margin_is_required_of_every_gain_crossover()
    {
        Loop.Judge(Require("loopMargins", "phaseMarginDeg", 15, null, null)).Is(Outcome.Pass, 5, 100);
        Loop.Judge(Require("loopMargins", "phaseMarginDeg", 45, null, null)).Is(Outcome.Fail, -25, 100);
        Loop.Judge(Require("loopMargins", "phaseMarginDeg", 0, 55, null)).Is(Outcome.Fail, -5, 10);
        Loop.Judge(Require("loopMargins", "gainCrossoverHz", null, 900, null)).Is(Outcome.Fail, -100, 1000);
    }

    [Fact]
    public void Gain_margins_to_rise_and_to_fall_are_required_apart()
    {
        double crossoverHz = Math.Sqrt(1e7);
        Loop.Judge(Require("loopMargins", "gainMarginDb", 6, null, null)).Is(Outcome.Pass, 4, crossoverHz);
        Loop.Judge(Require("loopMargins", "gainMarginDb", 12, null, null)).Is(Outcome.Fail, -2, crossoverHz);
        Loop.Judge(Require("loopMargins", "phaseCrossoverHz", 3000, null, null)).Is(Outcome.Pass, crossoverHz - 3000, crossoverHz);
        var reduction = Require("loopMargins", "gainReductionDb", null, -6, null);
        Loop.Judge(reduction).Is(Outcome.Inconclusive, null, null, "noCrossover");
        Loop.Judge(reduction with { AcceptNoCrossover = true }).Is(Outcome.Pass, null, null, "noCrossover");
    }

    [Fact]
    public void A_loop_whose_phase_crossovers_all_lie_above_0_dB_is_not_accepted_for_want_of_a_gain_margin()
    {
        // -180 degrees is met at 14 dB; only the gain reduction is known.
        var beyond = Measuring.LevelsAndPhases([1, 10, 100], [20, 10, -20], [-150, -200, -260]);
        var margin = Require("loopMargins", "gainMarginDb", 6, null, null) with { AcceptNoCrossover = true };
        beyond.Judge(margin).Is(Outcome.Inconclusive, null, null, "noCrossover");
        beyond.Judge(Require("loopMargins", "gainReductionDb", null, -20, null)).Is(Outcome.Fail, -6, Math.Pow(10, 0.6));
    }

    [Fact]
    public void No_crossover_is_inconclusive_unless_accepted_and_no_phase_is_never_accepted()
    {
        var quiet = Measuring.LevelsAndPhases([1, 10], [-3, -30], [-10, -80]);
        var margin = Require("loopMargins", "phaseMarginDeg", 45, null, null);
        quiet.Judge(margin).Is(Outcome.Inconclusive, null, null, "noCrossover");
        quiet.Judge(margin with { AcceptNoCrossover = true }).Is(Outcome.Pass, null, null, "noCrossover");
        var levels = Measuring.Levels([1, 10], [3, -30]);
        levels.Judge(margin with { AcceptNoCrossover = true }).Is(Outcome.Inconclusive, null, null, "phaseAbsent");
        levels.Judge(Require("loopMargins", "gainMarginDb", 6, null, null) with { AcceptNoCrossover = true }).Is(Outcome.Inconclusive, null, null, "phaseAbsent");
        levels.Judge(Require("loopMargins", "gainCrossoverHz", 1.5, null, null)).Is(Outcome.Fail, Math.Pow(10, 3.0 / 33) - 1.5, Math.Pow(10, 3.0 / 33));
    }

    [Fact]
    public void A_bound_in_seconds_is_not_rounded_away_by_nanoseconds()
    {
        // A delay of 5 ns all along against 4.2 ns.
        double[] f = [1e6, 2e6, 3e6];
        var run = Measuring.LevelsAndPhases(f, [0, 0, 0], Array.ConvertAll(f, x => -360 * x * 5e-9));
        var found = run.Judge(Require("delay", "delaySeconds", null, 4.2e-9, null, ("frequencyHz", 2e6)));
        Assert.Equal(Outcome.Fail, found.Outcome);
        Measuring.Close(-0.8e-9, found.Margin, 1e-18, "margin");
        Assert.Equal(Outcome.Fail, run.Judge(Upper((1e6, 4.2e-9), (3e6, 4.2e-9)).Of(CurveQuantity.DelaySeconds)).Outcome);
    }

    [Fact]
    public void A_crossover_beside_a_zero_gain_cannot_be_placed_so_nothing_is_accepted()
    {
        var run = Measuring.LevelsAndPhases([1, 10, 100], [3, double.NegativeInfinity, -3], [-10, 0, -80]);
        run.Judge(Require("loopMargins", "phaseMarginDeg", 45, null, null) with { AcceptNoCrossover = true }).Is(Outcome.Inconclusive, null, null, "zeroGain");
    }

    [Fact]
    public void Each_distinct_call_is_measured_once_whatever_the_order_of_its_parameters()
    {
        var first = Require("ripple", "rippleDb", null, 30, null, ("fromHz", 10), ("toHz", 1000));
        var again = Require("ripple", "rippleDb", 15, null, null, ("toHz", 1000), ("fromHz", 10)) with { Name = "again" };
        var other = Require("ripple", "rippleDb", 5, null, null, ("fromHz", 10), ("toHz", 100)) with { Name = "other" };
        var evaluation = MaskEvaluator.Evaluate(Hill, null, new Mask([], [first, again, other]), DeviceTraits.Transfer);
        Assert.Equal([20, 10], evaluation.Measures.Select(m => m.Value("rippleDb")));
        Assert.Equal([10, 5, 5], evaluation.Criteria.Select(c => c.Margin));
    }
}

using ResponseLedger.Engine.Masks;
using ResponseLedger.Engine.Measures;
using ResponseLedger.Engine.Sweeps;
using static ResponseLedger.Engine.Tests.Masks.Masking;

namespace ResponseLedger.Engine.Tests.Masks;

public sealed class PhaseAndGoldenLimitTests
{
    private static readonly double[] F = [10, 100, 1000];

    private static Sweep Phases(params double[] phaseDeg) => Measuring.LevelsAndPhases(F, [0, 0, 0], phaseDeg);

    [Fact]
    public void Phase_limits_bring_the_run_nearest_by_whole_turns_at_their_lowest_common_frequency()
    {
        var limit = Upper((10, -340), (1000, -340)).Of(CurveQuantity.PhaseDeg);
        Phases(10, 0, 15).Judge(limit).Is(Outcome.Pass, 5, 1000);
        Phases(10, 0, 25).Judge(limit).Is(Outcome.Fail, -5, 1000);
        Assert.Equal("deg", Phases(10, 0, 25).Judge(limit).Unit);
        // The limit starts at 100 Hz: there the branch is chosen, not at the start of the sweep.
        Phases(170, 290, 400).Judge(Lower((100, -80), (1000, 30)).Of(CurveQuantity.PhaseDeg)).Is(Outcome.Pass, 10, 100);
    }

    [Fact]
    public void All_phase_limits_of_a_mask_meet_one_branch_of_the_run()
    {
        // Each limit alone would draw the run to itself: the upper one down by a turn, the lower one not.
        var run = Phases(-179, -150, -100);
        var mask = new Mask(
            [Upper((10, 10), (1000, 10)).Of(CurveQuantity.PhaseDeg), Lower((10, -190), (1000, -190)).Of(CurveQuantity.PhaseDeg)], []);
        var found = MaskEvaluator.Evaluate(run, null, mask, DeviceTraits.Transfer).Criteria;
        found[0].Is(Outcome.Pass, 110, 1000);
        found[1].Is(Outcome.Pass, 11, 10);
        var other = MaskEvaluator.Evaluate(Phases(181, 210, 260), null, mask, DeviceTraits.Transfer).Criteria;
        Assert.Equal(found.Select(c => (c.Outcome, c.Margin)), other.Select(c => (c.Outcome, c.Margin)));
    }

    [Fact]
    public void The_branch_is_chosen_where_an_upper_and_a_lower_limit_first_meet_the_run()
    {
        var mask = new Mask(
            [Upper((10, 300), (1000, 300)).Of(CurveQuantity.PhaseDeg), Lower((100, -100), (1000, -100)).Of(CurveQuantity.PhaseDeg)], []);
        var found = MaskEvaluator.Evaluate(Phases(0, 0, 0), null, mask, DeviceTraits.Transfer).Criteria;
        found[0].Is(Outcome.Pass, 300, 10);
        found[1].Is(Outcome.Pass, 100, 100);
    }

    [Fact]
    public void A_golden_delay_is_compared_on_the_branch_of_the_ratio()
    {
        // Steps of -179.5 degrees in one and -180.5, read as 179.5, in the other: by themselves the delays stand a millisecond apart.
        double[] f = [1000, 2000, 3000, 4000, 5000];
        var run = Measuring.LevelsAndPhases(f, new double[5], Array.ConvertAll(f, x => -360 * x * 0.4986111e-3));
        var golden = Measuring.LevelsAndPhases(f, new double[5], Array.ConvertAll(f, x => -360 * x * 0.5013889e-3));
        var found = run.Judge(Upper((1000, 10e-6), (5000, 10e-6)).Of(CurveQuantity.DelaySeconds).AgainstGolden(), golden);
        Assert.Equal(Outcome.Pass, found.Outcome);
        Measuring.Close(10e-6 + 2.7778e-6, found.Margin, 1e-15, "margin");
        Assert.Equal("suspectPhase", Assert.Single(found.Notes!).Code);
        var below = run.Judge(Lower((1000, -1e-6), (5000, -1e-6)).Of(CurveQuantity.DelaySeconds).AgainstGolden(), golden);
        Measuring.Close(1e-6 - 2.7778e-6, below.Margin, 1e-15, "lower margin");
    }

    [Fact]
    public void A_golden_delay_on_another_grid_with_points_a_rounding_apart_is_no_noise()
    {
        double[] f = Measuring.LogGrid(100, 1000, 40);
        double[] g = Array.ConvertAll(f, x => x * (1 + 3e-12));
        var run = Measuring.LevelsAndPhases(f, new double[40], Array.ConvertAll(f, x => -360 * x * 1.2e-3));
        var golden = Measuring.LevelsAndPhases(g, new double[40], Array.ConvertAll(g, x => -360 * x * 1e-3));
        var found = run.Judge(Upper((200, 0.3e-3), (900, 0.3e-3)).Of(CurveQuantity.DelaySeconds).AgainstGolden(), golden);
        Measuring.Close(0.1e-3, found.Margin, 1e-9, "margin");
    }

    [Fact]
    public void A_run_without_phase_is_inconclusive_against_phase_and_delay_limits()
    {
        var run = Measuring.Levels(F, [0, 0, 0]);
        run.Judge(Upper((10, 0), (100, 0)).Of(CurveQuantity.PhaseDeg)).Is(Outcome.Inconclusive, null, null, "phaseAbsent");
        run.Judge(Upper((10, 0), (100, 0)).Of(CurveQuantity.DelaySeconds)).Is(Outcome.Inconclusive, null, null, "phaseAbsent");
    }

    [Fact]
    public void A_phase_limit_over_a_point_without_phase_is_inconclusive_but_broken_elsewhere_fails()
    {
        var run = Measuring.LevelsAndPhases(F, [0, double.NegativeInfinity, 0], [0, 0, 40]);
        run.Judge(Upper((10, 50), (1000, 50)).Of(CurveQuantity.PhaseDeg)).Is(Outcome.Inconclusive, null, null, "phaseAbsent");
        run.Judge(Upper((10, 30), (1000, 30)).Of(CurveQuantity.PhaseDeg)).Is(Outcome.Fail, -10, 1000, "phaseAbsent");
    }

    [Fact]
    public void A_suspect_step_in_the_span_is_noted_and_others_are_not()
    {
        var run = Measuring.LevelsAndPhases([1, 10, 100, 1000], [0, 0, 0, 0], [0, 130, 140, 150]);
        var noted = run.Judge(Upper((1, 170), (1000, 170)).Of(CurveQuantity.PhaseDeg));
        Assert.Equal(Outcome.Pass, noted.Outcome);
        Assert.Equal("suspectPhase", Assert.Single(noted.Notes!).Code);
        Assert.Empty(run.Judge(Upper((10, 170), (1000, 170)).Of(CurveQuantity.PhaseDeg)).Notes!);
        Assert.Empty(run.Judge(Upper((1, 170), (1000, 170))).Notes!);
    }

    [Fact]
    public void Delay_limits_bound_the_three_point_derivative()
    {
        // Phase -360 f T with T = 1 ms on a linear grid: the delay is T everywhere.
        double[] f = [100, 150, 250, 300];
        var run = Measuring.LevelsAndPhases(f, new double[4], Array.ConvertAll(f, x => -360 * x * 1e-3));
        var limit = Upper((100, 1.25e-3), (300, 1.25e-3)).Of(CurveQuantity.DelaySeconds);
        var found = run.Judge(limit);
        Assert.Equal((Outcome.Pass, "s"), (found.Outcome, found.Unit));
        Measuring.Close(0.25e-3, found.Margin, 1e-15, "margin");
        Assert.Equal(Outcome.Fail, run.Judge(limit with { Side = LimitSide.Lower }).Outcome);
    }

    [Fact]
    public void Without_a_golden_run_what_is_relative_to_it_is_inconclusive()
        => Phases(0, 0, 0).Judge(Upper((10, 1), (100, 1)).AgainstGolden()).Is(Outcome.Inconclusive, null, null, "noGoldenRun");

    [Fact]
    public void The_margin_to_the_golden_run_may_lie_at_a_point_of_the_golden_run()
    {
        var run = Measuring.Levels([10, 1000], [0, 0]);
        var golden = Measuring.Levels([10, 50, 1000], [0, -3, 0]);
        run.Judge(Upper((10, 4), (1000, 4)).AgainstGolden(), golden).Is(Outcome.Pass, 1, 50);
        run.Judge(Upper((10, 2), (1000, 2)).AgainstGolden(), golden).Is(Outcome.Fail, -1, 50);
    }

    [Fact]
    public void A_golden_run_that_is_too_short_or_without_phase_leaves_the_limit_open()
    {
        var golden = Measuring.Levels([20, 2000], [0, 0]);
        Phases(0, 0, 0).Judge(Upper((10, 1), (1000, 1)).AgainstGolden(), golden).Is(Outcome.Inconclusive, null, null, "spanTooShort");
        Phases(0, 0, 0).Judge(Upper((20, 1), (1000, 1)).AgainstGolden().Of(CurveQuantity.PhaseDeg), golden).Is(Outcome.Inconclusive, null, null, "phaseAbsent");
        Phases(0, 0, 0).Judge(Upper((20, 1), (1000, 1)).AgainstGolden(), Measuring.Levels([2000, 3000], [0, 0])).Is(Outcome.Inconclusive, null, null, "spanTooShort");
    }

    [Fact]
    public void A_zero_of_the_golden_run_leaves_the_limit_open_and_one_of_the_run_fails_it()
    {
        var hole = Measuring.Levels(F, [0, double.NegativeInfinity, 0]);
        var flat = Measuring.Levels(F, [0, 0, 0]);
        flat.Judge(Lower((10, -1), (1000, -1)).AgainstGolden(), hole).Is(Outcome.Inconclusive, null, null, "zeroGain");
        hole.Judge(Lower((10, -1), (1000, -1)).AgainstGolden(), flat).Is(Outcome.Fail, null, 100, "zeroGain");
        hole.Judge(Lower((20, -1), (50, -1)).AgainstGolden(), flat).Is(Outcome.Fail, null, 20, "zeroGain");
    }

    [Fact]
    public void Phase_against_the_golden_run_counts_whole_turns_once_at_their_lowest_common_frequency()
    {
        // The run stands 350 degrees above the golden run everywhere: 10 degrees behind it.
        var golden = Phases(-170, -200, -300);
        var run = Phases(180, 150, 52);
        run.Judge(Upper((10, 0), (1000, 0)).AgainstGolden().Of(CurveQuantity.PhaseDeg), golden).Is(Outcome.Pass, 8, 1000);
        run.Judge(Lower((10, -9), (1000, -9)).AgainstGolden().Of(CurveQuantity.PhaseDeg), golden).Is(Outcome.Fail, -1, 10);
    }
}

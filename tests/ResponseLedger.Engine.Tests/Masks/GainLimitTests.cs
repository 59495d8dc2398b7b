using ResponseLedger.Engine.Masks;
using ResponseLedger.Engine.Measures;
using ResponseLedger.Engine.Sweeps;
using static ResponseLedger.Engine.Tests.Masks.Masking;

namespace ResponseLedger.Engine.Tests.Masks;

public sealed class GainLimitTests
{
    private static readonly Sweep Hill = Measuring.Levels([10, 100, 1000], [0, 10, -10]);

    [Fact]
    public void The_least_margin_lies_at_a_point_of_the_run()
    {
        Hill.Judge(Upper((10, 12), (1000, 12))).Is(Outcome.Pass, 2, 100);
        Hill.Judge(Upper((10, 9), (1000, 9))).Is(Outcome.Fail, -1, 100);
        Hill.Judge(Lower((10, -11), (1000, -11))).Is(Outcome.Pass, 1, 1000);
        Hill.Judge(Lower((10, -7), (1000, -7))).Is(Outcome.Fail, -3, 1000);
    }

    [Fact]
    public void The_least_margin_lies_at_a_corner_between_points()
    {
        // At sqrt(1000) Hz the run stands at 5 dB.
        double cornerHz = Math.Sqrt(1000);
        Hill.Judge(Upper((10, 20), (cornerHz, 5.5), (1000, 40))).Is(Outcome.Pass, 0.5, cornerHz);
        Hill.Judge(Upper((10, 20), (cornerHz, 4), (1000, 40))).Is(Outcome.Fail, -1, cornerHz);
    }

    [Fact]
    public void At_a_step_the_stricter_value_holds()
    {
        Hill.Judge(Upper((10, 20), (100, 20), (100, 11), (1000, 11))).Is(Outcome.Pass, 1, 100);
        Hill.Judge(Upper((10, 11), (100, 11), (100, 20), (1000, 20))).Is(Outcome.Pass, 1, 100);
        Hill.Judge(Lower((10, -20), (1000, -20), (1000, -9.5))).Is(Outcome.Fail, -0.5, 1000);
    }

    [Fact]
    public void A_margin_of_zero_passes_and_rounding_counts_as_zero()
    {
        Hill.Judge(Upper((10, 10), (1000, 10))).Is(Outcome.Pass, 0, 100);
        var rounding = Hill.Judge(Upper((10, 10 - 9.9e-10), (1000, 20)));
        Assert.Equal(Outcome.Pass, Hill.Judge(Upper((100, 10 - 9.9e-10), (1000, 20))).Outcome);
        Assert.Equal(0, Hill.Judge(Upper((100, 10 - 9.9e-10), (1000, 20))).Margin);
        Assert.Equal(Outcome.Pass, rounding.Outcome);
        Assert.Equal(Outcome.Fail, Hill.Judge(Upper((100, 10 - 1.1e-9), (1000, 20))).Outcome);
        Assert.Equal(Outcome.Fail, Hill.Judge(Upper((100, 10 - 9.9e-10), (1000, 20)) with { Scale = 0.1 }).Outcome);
    }

    [Fact]
    public void A_limit_that_the_run_does_not_span_is_inconclusive_and_says_where_to_sweep()
    {
        var below = Hill.Judge(Upper((5, 12), (100, 12)));
        below.Is(Outcome.Inconclusive, null, null, "spanTooShort");
        Assert.Contains("down to 5 Hz", below.Reason!.Sentence, StringComparison.Ordinal);
        var above = Hill.Judge(Upper((100, 12), (2000, 12)));
        Assert.Contains("up to 2000 Hz", above.Reason!.Sentence, StringComparison.Ordinal);
        var beside = Hill.Judge(Upper((2000, 12), (4000, 12)));
        beside.Is(Outcome.Inconclusive, null, null, "spanTooShort");
        Assert.Contains("from 2000 Hz to 4000 Hz", beside.Reason!.Sentence, StringComparison.Ordinal);
    }

    [Fact]
    public void A_limit_broken_where_it_is_spanned_fails_all_the_same()
        => Hill.Judge(Upper((5, 9), (2000, 9))).Is(Outcome.Fail, -1, 100, "spanTooShort");

    [Fact]
    public void An_end_point_within_the_stated_ratio_stands_for_the_limits_end()
    {
        var limit = Upper((9.8, 12), (1020, 12)) with { EndRatio = 1.03 };
        Hill.Judge(limit).Is(Outcome.Pass, 2, 100);
        Hill.Judge(limit with { EndRatio = 1.01 }).Is(Outcome.Inconclusive, null, null, "spanTooShort");
        // The last level of -10 dB stands for 1020 Hz, where the limit is -11 dB.
        Hill.Judge(Upper((10, 12), (1000, 12), (1020, -11)) with { EndRatio = 1.03 }).Is(Outcome.Fail, -1, 1020);
        Hill.Judge(Lower((9.8, 0.25), (10, -20), (1000, -20)) with { EndRatio = 1.03 }).Is(Outcome.Fail, -0.25, 9.8);
    }

    [Fact]
    public void A_gap_larger_than_the_stated_density_is_inconclusive_and_names_it()
    {
        var run = Measuring.Levels([10, 20, 40, 200, 400], [0, 0, 0, 0, 0]);
        var limit = Upper((10, 1), (400, 1));
        run.Judge(limit with { MinPointsPerDecade = 1.43 }).Is(Outcome.Pass, 1, 10);
        var sparse = run.Judge(limit with { MinPointsPerDecade = 3 });
        sparse.Is(Outcome.Inconclusive, null, null, "gapTooLarge");
        Assert.Contains("Between 40 Hz and 200 Hz", sparse.Reason!.Sentence, StringComparison.Ordinal);
        // Where the limit does not reach, gaps do not matter; a piece that it touches partly does.
        run.Judge(Upper((10, 1), (40, 1)) with { MinPointsPerDecade = 3 }).Is(Outcome.Pass, 1, 10);
        run.Judge(Upper((10, 1), (41, 1)) with { MinPointsPerDecade = 3 }).Is(Outcome.Inconclusive, null, null, "gapTooLarge");
        run.Judge(Upper((200, 1), (400, 1)) with { MinPointsPerDecade = 3 }).Is(Outcome.Pass, 1, 200);
        run.Judge(Upper((10, -1), (400, -1)) with { MinPointsPerDecade = 3 }).Is(Outcome.Fail, -1, 10, "gapTooLarge");
    }

    [Fact]
    public void A_grid_of_exactly_the_stated_density_is_dense_enough()
    {
        var f = Measuring.LogGrid(1, 1000, 31);
        Measuring.Levels(f, new double[31]).Judge(Upper((1, 1), (1000, 1)) with { MinPointsPerDecade = 10 }).Is(Outcome.Pass, 1, 1);
    }

    [Fact]
    public void An_exact_zero_meets_an_upper_limit_and_fails_a_lower_one_without_a_margin()
    {
        var run = Measuring.Levels([10, 100, 1000], [0, double.NegativeInfinity, -2]);
        run.Judge(Upper((10, 1), (1000, 1))).Is(Outcome.Pass, 1, 10);
        run.Judge(Upper((20, 1), (500, 1))).Is(Outcome.Pass, null, 20, "zeroGain");
        run.Judge(Upper((10, -1), (1000, -1))).Is(Outcome.Fail, -1, 10);
        run.Judge(Lower((10, -999), (1000, -999))).Is(Outcome.Fail, null, 100, "zeroGain");
        run.Judge(Lower((20, -999), (30, -999))).Is(Outcome.Fail, null, 20, "zeroGain");
    }

    [Fact]
    public void A_relative_limit_counts_from_the_reference_of_the_same_run()
    {
        var limit = Upper((10, 1), (1000, 1)) with { Basis = LimitBasis.Reference };
        Hill.Judge(limit with { Reference = Measuring.Peak }).Is(Outcome.Pass, 1, 100);
        Hill.Judge(limit with { Reference = new ReferenceLevel.AtFrequency(10) }).Is(Outcome.Fail, -9, 100);
        // Mean over 10 to 100 Hz of a straight line from 0 to 10 dB: 5 dB.
        Hill.Judge(limit with { Reference = new ReferenceLevel.Band(10, 100) }).Is(Outcome.Fail, -4, 100);
        Hill.Judge(limit with { Reference = new ReferenceLevel.AtFrequency(9) }).Is(Outcome.Inconclusive, null, null, "outsideSweep");
    }

    [Fact]
    public void Limits_are_drawn_in_absolute_terms()
    {
        var limit = Upper((10, 1), (100, 1), (100, 3), (1000, 3));
        Assert.Equal([double.NaN, 1, 1, 3, double.NaN], LimitCurve.Resolve(limit, null, null, [9, 10, 100, 1000, 1001]));
        Assert.Equal([11, 13], LimitCurve.Resolve(limit with { Basis = LimitBasis.Reference, Reference = Measuring.Peak }, Hill, null, [50, 500]));
        Assert.Equal([1, 11, -7], LimitCurve.Resolve(limit.AgainstGolden(), null, Hill, [10, 100, 1000]));
        Assert.Equal([double.NaN], LimitCurve.Resolve(limit.AgainstGolden(), null, null, [10]));
        Assert.Equal(3, LimitCurve.ValueAt(limit with { Side = LimitSide.Lower }, 100));
    }

    [Fact]
    public void The_worst_criterion_is_the_worst_outcome_then_the_least_margin_over_scale()
    {
        Mask mask = new(
            [
                Upper((10, 8), (1000, 8)) with { Name = "fails by 2", Scale = 4 },
                Upper((10, 9), (1000, 9)) with { Name = "fails by 1" },
                Upper((5, 99), (1000, 99)) with { Name = "short" },
            ],
            [Require("peak", "gainDb", null, 9.5, null)]);
        var evaluation = MaskEvaluator.Evaluate(Hill, null, mask, DeviceTraits.Transfer);
        Assert.Equal(Outcome.Fail, evaluation.Outcome);
        Assert.Equal(1, evaluation.WorstIndex);
        Assert.Equal(["fails by 2", "fails by 1", "short", "peak.gainDb"], evaluation.Criteria.Select(c => c.Name));
        var short2 = MaskEvaluator.Evaluate(Hill, null, new Mask([Upper((10, 11), (1000, 11)), mask.Limits[2]], []), DeviceTraits.Transfer);
        Assert.Equal((Outcome.Inconclusive, 1), (short2.Outcome, short2.WorstIndex!.Value));
        var zero = Measuring.Levels([10, 100, 1000], [100, double.NegativeInfinity, 0]);
        var beyond = MaskEvaluator.Evaluate(zero, null, new Mask([Upper((10, 1), (1000, 1)), Lower((10, 1), (1000, 1))], []), DeviceTraits.Transfer);
        Assert.Equal(1, beyond.WorstIndex);
        var empty = MaskEvaluator.Evaluate(Hill, null, new Mask([], []), DeviceTraits.Transfer);
        Assert.Equal((Outcome.Pass, null), (empty.Outcome, empty.WorstIndex));
    }

    [Fact]
    public void A_grid_that_misses_the_ends_by_rounding_spans_them()
    {
        // 10^(log10 20 + 3 i / 30) begins at 20.000000000000004.
        double[] f = [.. Enumerable.Range(0, 31).Select(i => Math.Pow(10, Math.Log10(20) + 3.0 * i / 30))];
        Assert.True(f[0] > 20 || f[^1] < 20_000);
        var run = Measuring.Levels(f, new double[31]);
        run.Judge(Upper((20, 1), (20_000, 1))).Is(Outcome.Pass, 1, 20);
        Measuring.Close(0, run.Measure("level", ("frequencyHz", 20)).Value("gainDb"), 0, "level at 20 Hz");
        Measuring.Close(0, run.Measure("ripple", ("fromHz", 20), ("toHz", 20_000)).Value("rippleDb"), 0, "ripple");
        Assert.Equal(Outcome.Inconclusive, run.Judge(Upper((19.99, 1), (20_000, 1))).Outcome);
    }
}

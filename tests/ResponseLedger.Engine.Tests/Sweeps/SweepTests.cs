using CsCheck;
using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Engine.Tests.Sweeps;

public sealed class SweepTests
{
    private static readonly double[] TwoHz = [1, 2];

    [Theory]
    [InlineData(10, 20)]
    [InlineData(100, 40)]
    [InlineData(1, 0)]
    [InlineData(0.5, -6.020599913279624)]
    public void Gain_of_ten_is_twenty_decibels(double ratio, double levelDb)
    {
        // Common practice: L = 20 log10 |H|.
        Measuring.Close(levelDb, Sweep.Create(SweepForm.Ratio, TwoHz, [ratio, 1], []).GainDb[0], 1e-13, "ratio");
        Measuring.Close(levelDb, Sweep.Create(SweepForm.RealImaginary, TwoHz, [0, 1], [-ratio, 0]).GainDb[0], 1e-13, "imaginary part");
    }

    [Fact]
    public void Half_power_is_a_voltage_factor_of_one_over_root_two()
        => Measuring.Close(-10 * Math.Log10(2), Sweep.Create(SweepForm.Ratio, TwoHz, [Math.Sqrt(0.5), 1], []).GainDb[0], 1e-14, "half power");

    [Theory]
    [InlineData(3e-300, 4e-300, -5986.020599913279624)]
    [InlineData(3e300, 4e300, 6013.979400086720376)]
    [InlineData(1.7e308, 1.7e308, 6167.619278384)]
    [InlineData(4.9406564584124654e-324, 0, -6466.124306)]
    [InlineData(0, -1e-310, -6200)]
    public void Level_neither_overflows_nor_underflows_on_the_way(double re, double im, double levelDb)
        => Measuring.Close(levelDb, Sweep.Create(SweepForm.RealImaginary, TwoHz, [re, 1], [im, 0]).GainDb[0], 1e-6, "level");

    [Fact]
    public void Levels_of_extreme_gains_are_accurate_to_rounding()
    {
        // 3-4-5 triangles scaled by powers of ten: 20 log10 5 +- 6000 dB.
        Measuring.Close(20 * Math.Log10(5) - 6000, Sweep.Create(SweepForm.RealImaginary, TwoHz, [3e-300, 1], [4e-300, 0]).GainDb[0], 2e-12, "small");
        Measuring.Close(20 * Math.Log10(5) + 6000, Sweep.Create(SweepForm.RealImaginary, TwoHz, [3e300, 1], [4e300, 0]).GainDb[0], 2e-12, "large");
        // 3 and 4 units of the least subnormal: 5 units of 2^-1074.
        Measuring.Close(20 * Math.Log10(5) - 1074 * 20 * Math.Log10(2),
            Sweep.Create(SweepForm.RealImaginary, TwoHz, [3 * double.Epsilon, 1], [4 * double.Epsilon, 0]).GainDb[0], 2e-12, "subnormal");
    }

    [Fact]
    public void An_exact_zero_is_minus_infinity_without_phase_and_its_pieces_have_no_interior_value()
    {
        var run = Sweep.Create(SweepForm.RealImaginary, [1, 2, 4, 8], [1, 0, 1, 2], [0, 0, 0, 0]);
        Assert.Equal(double.NegativeInfinity, run.GainDb[1]);
        Assert.True(double.IsNaN(run.PhaseDeg[1]));
        Assert.Null(run.GainDbAt(2));
        Assert.Null(run.GainDbAt(1.5));
        Assert.Null(run.PhaseDegAt(3));
        Assert.Equal(0, run.GainDbAt(4));
        Assert.Equal(0, run.PhaseDegAt(1));
        Measuring.Close(10 * Math.Log10(2), run.GainDbAt(Math.Sqrt(32)), 1e-12, "middle of the last piece");
    }

    [Fact]
    public void Between_points_level_and_phase_run_straight_against_log_f_and_nothing_is_extrapolated()
    {
        var run = Measuring.LevelsAndPhases([100, 10_000], [0, -40], [10, -50]);
        Measuring.Close(-20, run.GainDbAt(1000), 1e-12, "level in the geometric middle");
        Measuring.Close(-20, run.PhaseDegAt(1000), 1e-12, "phase in the geometric middle");
        Assert.Equal(0, run.GainDbAt(100));
        Assert.Equal(-40, run.GainDbAt(10_000));
        Assert.Null(run.GainDbAt(Math.BitDecrement(100)));
        Assert.Null(run.GainDbAt(Math.BitIncrement(10_000)));
        Assert.Null(run.GainDbAt(double.NaN));
    }

    [Fact]
    public void Planes_are_kept_verbatim_and_complex_values_come_back_identical()
    {
        double[] re = [0.1, -0.0, 1e-300];
        double[] im = [1.0 / 3, 5e-324, -2];
        var run = Sweep.Create(SweepForm.RealImaginary, [1, 2, 3], re, im);
        var (gotRe, gotIm) = (new double[3], new double[3]);
        run.GetComplex(gotRe, gotIm);
        Assert.Equal(re.Select(BitConverter.DoubleToInt64Bits), gotRe.Select(BitConverter.DoubleToInt64Bits));
        Assert.Equal(im.Select(BitConverter.DoubleToInt64Bits), gotIm.Select(BitConverter.DoubleToInt64Bits));
        Assert.Equal(re, run.FirstPlane.ToArray());
        Assert.Equal(im, run.SecondPlane.ToArray());
        re[0] = 99;
        Assert.Equal(0.1, run.FirstPlane[0]);
    }

    [Fact]
    public void Polar_forms_give_exact_complex_values_at_right_angles()
    {
        var run = Sweep.Create(SweepForm.RatioPhase, [1, 2, 3, 4], [2, 2, 0, 2], [90, -540, 17, 720]);
        var (re, im) = (new double[4], new double[4]);
        run.GetComplex(re, im);
        Assert.Equal([0, -2, 0, 2], re);
        Assert.Equal([2, 0, 0, 0], im);
        var levels = Measuring.LevelsAndPhases(TwoHz, [20, double.NegativeInfinity], [180, 0]);
        levels.GetComplex(re.AsSpan(0, 2), im.AsSpan(0, 2));
        Assert.Equal([-10, 0], re[..2]);
        Assert.Throws<InvalidOperationException>(() => Measuring.Levels(TwoHz, [0, 0]).GetComplex(new double[2], new double[2]));
        Assert.Throws<ArgumentException>(() => run.GetComplex(new double[3], new double[4]));
    }

    public static TheoryData<SweepForm, double[], double[], double[], string> Refused => new()
    {
        { SweepForm.Level, [1], [0], [], "2 or more" },
        { SweepForm.Level, [1, 1], [0, 0], [], "ascend strictly" },
        { SweepForm.Level, [2, 1], [0, 0], [], "ascend strictly" },
        { SweepForm.Level, [0, 1], [0, 0], [], "above 0 Hz" },
        { SweepForm.Level, [-1, 1], [0, 0], [], "above 0 Hz" },
        { SweepForm.Level, [1, double.PositiveInfinity], [0, 0], [], "finite" },
        { SweepForm.Level, [1, double.NaN], [0, 0], [], "finite" },
        { SweepForm.Level, [1, 2], [0, double.NaN], [], "level is finite" },
        { SweepForm.Level, [1, 2], [0, double.PositiveInfinity], [], "level is finite" },
        { SweepForm.Level, [1, 2], [0], [], "one value a point" },
        { SweepForm.Level, [1, 2], [0, 0], [0, 0], "one value a point" },
        { SweepForm.LevelPhase, [1, 2], [0, 0], [], "one value a point" },
        { SweepForm.LevelPhase, [1, 2], [0, 0], [0, double.NaN], "must be finite" },
        { SweepForm.Ratio, [1, 2], [0, -1e-9], [], "zero or more" },
        { SweepForm.Ratio, [1, 2], [0, double.PositiveInfinity], [], "zero or more" },
        { SweepForm.RealImaginary, [1, 2], [0, double.NaN], [0, 0], "must be finite" },
        { SweepForm.RealImaginary, [1, 2], [0, 0], [double.NegativeInfinity, 0], "must be finite" },
        { (SweepForm)9, [1, 2], [0, 0], [], "not a form" },
    };

    [Theory, MemberData(nameof(Refused))]
    public void Unusable_planes_are_refused_with_a_sentence(SweepForm form, double[] frequencyHz, double[] first, double[] second, string says)
        => Assert.Contains(says, Assert.Throws<ArgumentException>(() => Sweep.Create(form, frequencyHz, first, second)).Message, StringComparison.Ordinal);

    [Fact]
    public void Magnitude_only_sweeps_have_no_phase_ever()
    {
        var run = Sweep.Create(SweepForm.Ratio, TwoHz, [1, 2], []);
        Assert.False(run.HasPhase);
        Assert.True(run.PhaseDeg.IsEmpty);
        Assert.True(run.DelaySeconds.IsEmpty);
        Assert.True(run.SuspectSteps.IsEmpty);
        Assert.Null(run.PhaseDegAt(1));
        Assert.Null(run.DelaySecondsAt(1));
    }

    [Fact]
    public void A_level_under_the_noise_floor_has_no_phase()
    {
        var run = Sweep.Create(SweepForm.LevelPhase, [1, 2, 3], [0, -80, -60], [0, 100, 20], 0, -60);
        Assert.Equal(0, run.PhaseDeg[0]);
        Assert.True(double.IsNaN(run.PhaseDeg[1]));
        Assert.Equal(20, run.PhaseDeg[2]);
    }

    [Fact]
    public void A_part_keeps_its_edges_and_another_grid_keeps_the_planes()
    {
        var run = Measuring.LevelsAndPhases([1, 2, 3, 4], [5, 6, 7, 8], [1, 2, 3, 4]);
        var part = run.Between(2, 3);
        Assert.Equal([2, 3], part.FrequencyHz.ToArray());
        Assert.Equal([6, 7], part.GainDb.ToArray());
        Assert.Equal([2, 3], part.PhaseDeg.ToArray());
        Assert.Throws<ArgumentException>(() => run.Between(2.5, 3.5));
        Assert.Equal([8, 9, 10, 11], run.OverFrequencies([8, 9, 10, 11]).FrequencyHz.ToArray());
        Assert.Throws<ArgumentException>(() => run.OverFrequencies([8, 9]));
    }

    [Fact]
    public void Points_a_rounding_apart_are_two_points()
    {
        double next = Math.BitIncrement(1000.0);
        var run = Measuring.LevelsAndPhases([1000, next, 2000], [0, 10, 20], [0, 1, 2]);
        Assert.Equal(10, run.GainDbAt(next));
        Measuring.Close(10 + 10 * Math.Log(1.5) / Math.Log(2), run.GainDbAt(1500), 1e-12, "next piece");
    }

    [Fact]
    public void Level_and_phase_of_a_complex_gain_give_it_back()
        => Gen.Select(Gen.Double[-1e6, 1e6], Gen.Double[-1e6, 1e6]).Sample((re, im) =>
        {
            if (re == 0 && im == 0)
                return;
            var run = Sweep.Create(SweepForm.RealImaginary, TwoHz, [re, 1], [im, 0]);
            var back = Measuring.LevelsAndPhases(TwoHz, run.GainDb.ToArray(), run.PhaseDeg.ToArray());
            var (x, y) = (new double[2], new double[2]);
            back.GetComplex(x, y);
            double size = double.Hypot(re, im);
            Measuring.Close(re, x[0], 1e-13 * size, "re");
            Measuring.Close(im, y[0], 1e-13 * size, "im");
        }, seed: "0000KOIPIECf");
}

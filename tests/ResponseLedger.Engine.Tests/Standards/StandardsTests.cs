using ResponseLedger.Engine.Masks;
using ResponseLedger.Engine.Measures;
using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Engine.Tests.Standards;

/// <summary>Published weightings and equalisations as runs and masks; sources stand in tests/reference/README.md.</summary>
public sealed class StandardsTests
{
    /// <summary>Rec. ITU-R BS.468-4: the network of Figure 1a against the tolerances of Table 1.</summary>
    [Fact]
    public void Bs468_network_misses_the_bare_table_narrowly_at_6303_hertz()
    {
        var evaluation = Judge(Bs468Run(1), Bs468Mask(0));
        Assert.Equal(Outcome.Fail, evaluation.Outcome);
        Assert.Equal(0, evaluation.WorstIndex);
        Measuring.Close(-0.01662959, evaluation.Criteria[0].Margin, 1e-7, "upper margin");
        Measuring.Close(6303.0964, evaluation.Criteria[0].FrequencyHz, 1e-4, "its frequency");
        Assert.Equal(Outcome.Pass, evaluation.Criteria[1].Outcome);
        Measuring.Close(0.01662283, evaluation.Criteria[1].Margin, 1e-7, "lower margin");
        Assert.Equal(6300, evaluation.Criteria[1].FrequencyHz);
    }

    [Fact]
    public void Bs468_network_passes_with_the_rounding_of_the_table()
    {
        var evaluation = Judge(Bs468Run(1), Bs468Mask(0.05));
        Assert.Equal(Outcome.Pass, evaluation.Outcome);
        // The 100 Hz row prints -19.8 where the network has -19.850, but its tolerance of 1 dB is wide; 6.3 kHz stays the narrowest.
        Measuring.Close(0.05 - 0.01662959, evaluation.Criteria[0].Margin, 1e-7, "upper margin");
    }

    [Theory]
    [InlineData(1.06)]
    [InlineData(1 / 1.06)]
    public void Bs468_network_scaled_six_percent_along_frequency_fails(double factor)
        => Assert.Equal(Outcome.Fail, Judge(Bs468Run(factor), Bs468Mask(0.05)).Outcome);

    /// <summary>Level of the network at the table's frequencies between grid points: 0.004 dB of network_db.</summary>
    [Fact]
    public void Bs468_levels_are_read_between_grid_points()
    {
        var run = Bs468Run(1);
        foreach (var row in ReferenceData.Csv("itu-r-bs468-4.csv"))
            Measuring.Close(ReferenceData.Number(row["network_db"]), run.GainDbAt(ReferenceData.Number(row["frequency_hz"])), 0.004, row["frequency_hz"]);
    }

    /// <summary>IEC 61672-1:2013 Annex E formulas against the table: analytic 1e-9 dB, printed tenth 0.05 dB.</summary>
    [Fact]
    public void A_C_and_Z_weightings_equal_the_table()
    {
        var rows = ReferenceData.Csv("iec-61672-1-weightings.csv");
        Assert.Equal(34, rows.Count);
        var exactHz = ReferenceData.Column(rows, "exact_hz");
        var a = Sweep.Create(SweepForm.Ratio, exactHz, Array.ConvertAll(exactHz, WeightingA), []);
        var c = Sweep.Create(SweepForm.Ratio, exactHz, Array.ConvertAll(exactHz, WeightingC), []);
        var z = Sweep.Create(SweepForm.Ratio, exactHz, Array.ConvertAll(exactHz, _ => 1.0), []);
        for (int i = 0; i < rows.Count; i++)
        {
            Measuring.Close(ReferenceData.Number(rows[i]["a_exact_db"]), a.GainDb[i], 1e-9, "A " + rows[i]["nominal_hz"]);
            Measuring.Close(ReferenceData.Number(rows[i]["c_exact_db"]), c.GainDb[i], 1e-9, "C " + rows[i]["nominal_hz"]);
            Measuring.Close(ReferenceData.Number(rows[i]["a_db"]), a.GainDb[i], 0.05, "A printed " + rows[i]["nominal_hz"]);
            Measuring.Close(ReferenceData.Number(rows[i]["c_db"]), c.GainDb[i], 0.05, "C printed " + rows[i]["nominal_hz"]);
            Assert.Equal(ReferenceData.Number(rows[i]["z_db"]), z.GainDb[i]);
        }
    }

    [Theory]
    [InlineData("class1")]
    [InlineData("class2")]
    public void A_weighting_passes_its_classes(string cls)
    {
        var evaluation = Judge(WeightingRun(1), WeightingMask(cls));
        Assert.Equal(Outcome.Pass, evaluation.Outcome);
        Assert.All(evaluation.Criteria, c => Assert.InRange(c.Margin!.Value, 0.3, 5));
    }

    [Theory]
    [InlineData(1.06)]
    [InlineData(1 / 1.06)]
    public void A_weighting_scaled_six_percent_fails_class_one(double factor)
        => Assert.Equal(Outcome.Fail, Judge(WeightingRun(factor), WeightingMask("class1")).Outcome);

    /// <summary>IEC 60098 time constants 3180, 318 and 75 microseconds: 1e-6 dB and 1e-6 degree.</summary>
    [Fact]
    public void Riaa_equalisation_equals_its_analytic_values()
    {
        var rows = ReferenceData.Csv("iec-60098-riaa.csv");
        Assert.Equal(52, rows.Count);
        var run = Sweep.Create(
            SweepForm.RealImaginary, ReferenceData.Column(rows, "frequency_hz"), ReferenceData.Column(rows, "real"), ReferenceData.Column(rows, "imag"));
        for (int i = 0; i < rows.Count; i++)
        {
            Measuring.Close(ReferenceData.Number(rows[i]["level_db"]), run.GainDb[i], 1e-6, "level " + rows[i]["frequency_hz"]);
            Measuring.Close(ReferenceData.Number(rows[i]["phase_deg"]), run.PhaseDeg[i], 1e-6, "phase " + rows[i]["frequency_hz"]);
        }
    }

    [Fact]
    public void Riaa_runs_at_minus_twenty_decibels_a_decade_far_above_its_corners()
    {
        var f = Measuring.LogGrid(1e6, 1e9, 301);
        var run = Sweep.Create(SweepForm.Ratio, f, Array.ConvertAll(f, hz =>
            System.Numerics.Complex.Abs((1 + S(hz) * 318e-6) / ((1 + S(hz) * 3180e-6) * (1 + S(hz) * 75e-6)))), []);
        var slope = run.Measure("slope", ("fromHz", 1e7), ("toHz", 1e9));
        Measuring.Close(-20, slope.Value("dbPerDecade"), 1e-5, "slope");
        Measuring.Close(-20 * Math.Log10(2), slope.Value("dbPerOctave"), 1e-5, "an octave");
        Measuring.Close(-1, slope.Value("power"), 1e-6, "power");

        static System.Numerics.Complex S(double hz) => new(0, 2 * Math.PI * hz);
    }

    private static Evaluation Judge(Sweep run, Mask mask)
    {
        Assert.Empty(MaskEvaluator.ProblemsOf(mask));
        return MaskEvaluator.Evaluate(run, null, mask, DeviceTraits.Transfer);
    }

    private static Sweep Bs468Run(double factor)
    {
        var rows = ReferenceData.Csv("itu-r-bs468-4-network.csv");
        return Sweep.Create(
            SweepForm.RealImaginary,
            Array.ConvertAll(ReferenceData.Column(rows, "frequency_hz"), f => f * factor),
            ReferenceData.Column(rows, "real"), ReferenceData.Column(rows, "imag"));
    }

    private static Mask Bs468Mask(double openedDb)
    {
        var rows = ReferenceData.Csv("itu-r-bs468-4.csv");
        return new Mask(
            [
                Limit(LimitSide.Upper, rows, "frequency_hz", r => ReferenceData.Number(r["response_db"]) + ReferenceData.Number(r["tolerance_plus_db"]) + openedDb),
                Limit(LimitSide.Lower, rows, "frequency_hz", r => ReferenceData.Number(r["response_db"]) - ReferenceData.Number(r["tolerance_minus_db"]) - openedDb),
            ],
            []);
    }

    private static Sweep WeightingRun(double factor)
    {
        var f = Measuring.LogGrid(5, 40_000, 1601);
        return Sweep.Create(SweepForm.Ratio, f, Array.ConvertAll(f, hz => WeightingA(hz / factor)), []);
    }

    private static Mask WeightingMask(string cls)
    {
        var rows = ReferenceData.Csv("iec-61672-1-weightings.csv");
        return new Mask(
            [
                Limit(LimitSide.Upper, rows, "exact_hz", r => ReferenceData.Number(r["a_exact_db"]) + ReferenceData.Number(r[cls + "_upper_db"])),
                Limit(LimitSide.Lower, rows, "exact_hz", r => ReferenceData.Number(r["a_exact_db"]) + ReferenceData.Number(r[cls + "_lower_db"])),
            ],
            []);
    }

    private static CurveLimit Limit(LimitSide side, IReadOnlyList<Dictionary<string, string>> rows, string head, Func<Dictionary<string, string>, double> value)
        => new(side.ToString(), CurveQuantity.GainDb, side, LimitBasis.Absolute, null, null, null, null,
            [.. rows.Select(r => new LimitCorner(ReferenceData.Number(r[head]), value(r))).Where(c => double.IsFinite(c.Value))]);

    // IEC 61672-1 Annex E; the pole frequencies stand in the head of the reference file.
    private const double F1 = 20.598997057568144, F2 = 107.65264864304627, F3 = 737.86223073628988, F4 = 12194.21714799801;

    private static double WeightingA(double f) => RawA(f) / RawA(1000);

    private static double WeightingC(double f) => RawC(f) / RawC(1000);

    private static double RawA(double f)
        => F4 * F4 * f * f * f * f / ((f * f + F1 * F1) * Math.Sqrt(f * f + F2 * F2) * Math.Sqrt(f * f + F3 * F3) * (f * f + F4 * F4));

    private static double RawC(double f) => F4 * F4 * f * f / ((f * f + F1 * F1) * (f * f + F4 * F4));
}

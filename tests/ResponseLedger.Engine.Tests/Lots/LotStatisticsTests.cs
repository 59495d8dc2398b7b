using ResponseLedger.Engine.Lots;

namespace ResponseLedger.Engine.Tests.Lots;

public sealed class LotStatisticsTests
{
    /// <summary>tests/reference/clopper-pearson.csv (beta quantiles refined in 40 digits): 1e-10 absolute, 1e-9 for n above 6000.</summary>
    [Fact]
    public void Clopper_Pearson_bounds_equal_the_reference()
    {
        var rows = ReferenceData.Csv("clopper-pearson.csv");
        Assert.Equal(69, rows.Count);
        foreach (var row in rows)
        {
            long count = long.Parse(row["k"], System.Globalization.CultureInfo.InvariantCulture);
            long of = long.Parse(row["n"], System.Globalization.CultureInfo.InvariantCulture);
            double confidence = ReferenceData.Number(row["confidence"]);
            var (lower, upper) = row["side"] switch
            {
                "two-sided" => ClopperPearson.TwoSided(count, of, confidence),
                "lower" => (ClopperPearson.Lower(count, of, confidence), 1),
                _ => (0, ClopperPearson.Upper(count, of, confidence)),
            };
            double tolerance = of > 6000 ? 1e-9 : 1e-10;
            Measuring.Close(ReferenceData.Number(row["lower"]), lower, tolerance, $"lower of {count}/{of} {row["side"]}");
            Measuring.Close(ReferenceData.Number(row["upper"]), upper, tolerance, $"upper of {count}/{of} {row["side"]}");
        }
    }

    [Theory]
    [InlineData(-1, 10, 0.95)]
    [InlineData(11, 10, 0.95)]
    [InlineData(0, 0, 0.95)]
    [InlineData(1, 10, 0)]
    [InlineData(1, 10, 1)]
    [InlineData(1, 10, double.NaN)]
    public void Bounds_of_nonsense_are_refused(long count, long of, double confidence)
        => Assert.Throws<ArgumentException>(() => ClopperPearson.TwoSided(count, of, confidence));

    [Fact]
    public void Margins_are_described_by_count_least_median_mean_and_sample_deviation()
    {
        var found = LotStatistics.OfMargins("pass band", "dB", [3, null, 1, 2, 10]);
        Assert.Equal(new MarginStatistics("pass band", "dB", 4, 1, 1, 2.5, 4, Math.Sqrt(50.0 / 3)), found with { StandardDeviation = Math.Sqrt(50.0 / 3) });
        Measuring.Close(Math.Sqrt(50.0 / 3), found.StandardDeviation, 1e-14, "deviation");
        Assert.Equal(3, LotStatistics.OfMargins("x", "dB", [9, 3, 1]).Median);
    }

    [Fact]
    public void One_margin_has_no_deviation_and_none_has_nothing()
    {
        Assert.Equal(new MarginStatistics("x", "dB", 1, 0, 5, 5, 5, null), LotStatistics.OfMargins("x", "dB", [5]));
        Assert.Equal(new MarginStatistics("x", "dB", 0, 2, null, null, null, null), LotStatistics.OfMargins("x", "dB", [null, null]));
        Assert.Throws<ArgumentException>(() => LotStatistics.OfMargins("x", "dB", [double.NaN]));
    }

    [Fact]
    public void Yield_is_a_count_and_its_bounds_speak_of_the_process()
    {
        var yield = LotStatistics.OfYield(9, 10);
        Assert.Equal(0.9, yield.Yield);
        // 1 of 10 mirrored, tests/reference/clopper-pearson.csv.
        Measuring.Close(1 - 0.44501611702819543, yield.ProcessLower, 1e-10, "lower");
        Measuring.Close(1 - 0.0025285785444617843, yield.ProcessUpper, 1e-10, "upper");
        Assert.Equal(new YieldStatistics(0, 0, null, 0.95, null, null), LotStatistics.OfYield(0, 0));
        Assert.Throws<ArgumentException>(() => LotStatistics.OfYield(3, 2));
    }
}

using CsCheck;
using ResponseLedger.Engine.Measures;
using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Engine.Tests.Measures;

public sealed class LoopMarginTests
{
    private static MeasureResult Margins(Sweep run, double? criticalPhaseDeg = null)
        => criticalPhaseDeg is { } critical ? run.Measure("loopMargins", ("criticalPhaseDeg", critical)) : run.Measure("loopMargins");

    [Fact]
    public void Crossovers_lie_where_the_straight_pieces_cross()
    {
        var found = Margins(Measuring.LevelsAndPhases([1, 100, 10_000], [20, -20, -40], [-90, -150, -210]));
        var gain = Assert.Single(found.GainCrossovers);
        Measuring.Close(10, gain.FrequencyHz, 1e-12, "gain crossover");
        Measuring.Close(60, gain.PhaseMarginDeg, 1e-12, "phase margin");
        var phase = Assert.Single(found.PhaseCrossovers);
        Measuring.Close(1000, phase.FrequencyHz, 1e-9, "phase crossover");
        Measuring.Close(30, phase.GainMarginDb, 1e-12, "gain margin");
        Assert.Equal(gain.FrequencyHz, found.Value("gainCrossoverHz"));
        Assert.Equal(phase.FrequencyHz, found.Value("phaseCrossoverHz"));
        Assert.Null(found.Value("gainReductionDb"));
    }

    [Fact]
    public void A_point_that_stands_on_the_line_counts_once()
    {
        var through = Margins(Measuring.LevelsAndPhases([1, 10, 100], [20, 0, -20], [-170, -180, -190]));
        Assert.Equal([new GainCrossover(10, 0)], through.GainCrossovers);
        Assert.Equal([new PhaseCrossover(10, 0)], through.PhaseCrossovers);
        Assert.Equal((0, 0, 10), (through.Value("phaseMarginDeg"), through.Value("gainMarginDb"), through.Value("gainCrossoverHz")));
        Assert.Equal((0, 10), (through.Value("leastDistance"), through.Value("leastDistanceHz")));
        var touch = Margins(Measuring.LevelsAndPhases([1, 10, 100], [-20, 0, -20], [-90, -100, -110]));
        Assert.Equal([new GainCrossover(10, 80)], touch.GainCrossovers);
        Assert.Equal([new GainCrossover(1, 90)], Margins(Measuring.LevelsAndPhases([1, 10], [0, -20], [-90, -100])).GainCrossovers);
        Assert.Equal([new GainCrossover(10, 80)], Margins(Measuring.LevelsAndPhases([1, 10], [20, 0], [-90, -100])).GainCrossovers);
    }

    [Fact]
    public void Phase_crossovers_count_on_every_turn_upward_and_downward()
    {
        // From -100 down to -650 degrees and back up to -500: -180 at one place, -540 at two.
        var found = Margins(Measuring.LevelsAndPhases([1, 10, 100, 1000, 10_000], [-1, -2, -3, -4, -5], [-100, -250, -400, -560, -500]));
        Assert.Equal(3, found.PhaseCrossovers.Count);
        Measuring.Close(Math.Pow(10, 80.0 / 150), found.PhaseCrossovers[0].FrequencyHz, 1e-12, "-180");
        Measuring.Close(1 + 80.0 / 150, found.PhaseCrossovers[0].GainMarginDb, 1e-12, "its margin");
        Measuring.Close(Math.Pow(10, 2 + 140.0 / 160), found.PhaseCrossovers[1].FrequencyHz, 1e-9, "-540 downward");
        Measuring.Close(Math.Pow(10, 3 + 20.0 / 60), found.PhaseCrossovers[2].FrequencyHz, 1e-8, "-540 upward");
    }

    [Theory]
    [InlineData(-180, -170, 10)]
    [InlineData(-180, 170, -10)]
    [InlineData(-180, 0, 180)]
    [InlineData(0, -170, -170)]
    [InlineData(0, 10, 10)]
    [InlineData(0, 180, 180)]
    public void A_phase_margin_is_signed_and_lies_above_minus_180_up_to_180(double critical, double phaseDeg, double margin)
    {
        var found = Margins(Measuring.LevelsAndPhases([1, 10], [1, -1], [phaseDeg, phaseDeg]), critical);
        Assert.Equal(margin, found.Value("phaseMarginDeg"));
        Measuring.Close(Math.Sqrt(10), found.Value("gainCrossoverHz"), 1e-12, "crossover");
    }

    [Fact]
    public void Of_margins_of_one_size_the_negative_one_is_the_least()
        => Assert.Equal((-30, 10), (Margins(Measuring.LevelsAndPhases([1, 10], [0, 0], [-150, -210])).Value("phaseMarginDeg"),
            Margins(Measuring.LevelsAndPhases([1, 10], [0, 0], [-150, -210])).Value("gainCrossoverHz")));

    [Theory]
    [InlineData(120, -20)]
    [InlineData(6000, -6000)]
    [InlineData(6160, -6400)]
    public void Extreme_levels_leave_the_least_distance_where_the_gain_is_near_one(double startDb, double endDb)
    {
        // Constant phase 60 degrees from the critical one: the foot of the ray lies at |L| = 1/2, and the search must not wander far from it.
        var found = Margins(Measuring.LevelsAndPhases([1, 10], [startDb, endDb], [-120, -120]));
        Measuring.Close(Math.Sqrt(0.75), found.Value("leastDistance"), 1e-12, "foot of the ray");
    }

    [Fact]
    public void Steep_pieces_in_numbers_give_the_least_distance_of_a_dense_scan()
    {
        double[] f = Measuring.LogGrid(1, 1e4, 401);
        var level = f.Select((_, i) => i % 2 == 0 ? 80.0 : -80.0).ToArray();
        var phase = f.Select((_, i) => -90.0 - 0.4 * i).ToArray();
        var found = Margins(Measuring.LevelsAndPhases(f, level, phase)).Value("leastDistance")!.Value;
        double scanned = double.PositiveInfinity;
        for (int i = 0; i + 1 < f.Length; i++)
        {
            for (int k = 0; k <= 4000; k++)
            {
                double t = k / 4000.0;
                var gain = System.Numerics.Complex.FromPolarCoordinates(
                    Math.Pow(10, (level[i] + t * (level[i + 1] - level[i])) / 20), (phase[i] + t * (phase[i + 1] - phase[i])) * Math.PI / 180);
                scanned = Math.Min(scanned, (1 + gain).Magnitude);
            }
        }

        Assert.InRange(found, scanned - 1e-3, scanned + 1e-12);
    }

    [Fact]
    public void The_least_distance_of_straight_ways_is_that_of_geometry()
    {
        // Constant phase 60 degrees from the critical one: the line's foot lies at |L| = cos 60, distance sin 60.
        var ray = Margins(Measuring.LevelsAndPhases([1, 10_000], [40, -40], [-120, -120]));
        Measuring.Close(Math.Sqrt(0.75), ray.Value("leastDistance"), 1e-15, "foot of the ray");
        Measuring.Close(Math.Pow(10, 2 + 2 * 20 * Math.Log10(2) / 40), ray.Value("leastDistanceHz"), 1e-6, "its frequency");
        // Constant level of 6.02 dB through the critical phase: distance 1 at phase 0.
        var circle = Margins(Measuring.LevelsAndPhases([1, 100], [20 * Math.Log10(2), 20 * Math.Log10(2)], [-50, 70]), 0);
        Measuring.Close(1, circle.Value("leastDistance"), 1e-15, "circle");
        Measuring.Close(Math.Pow(10, 100.0 / 120), circle.Value("leastDistanceHz"), 1e-6, "its frequency");
        // Straight through the critical point itself.
        Measuring.Close(0, Margins(Measuring.LevelsAndPhases([1, 10_000], [40, -40], [-180, -180])).Value("leastDistance"), 1e-13, "through the point");
    }

    [Fact]
    public void Loops_at_rest_are_measured_without_ado()
    {
        var rest = Margins(Measuring.LevelsAndPhases([1, 10, 100], [-6, -6, -6], [-90, -90, -90]));
        Measuring.Close(double.Hypot(1, Math.Pow(10, -0.3)), rest.Value("leastDistance"), 1e-15, "distance");
        Assert.Equal(1, rest.Value("leastDistanceHz"));
        Assert.Equal("noCrossover", rest.Reason!.Code);
    }

    [Fact]
    public void A_gain_of_exactly_zero_is_at_distance_one_and_hides_its_crossover()
    {
        var found = Margins(Measuring.LevelsAndPhases([1, 10, 100], [20, double.NegativeInfinity, 20], [0, 0, 0]));
        Assert.Equal((1, 10), (found.Value("leastDistance"), found.Value("leastDistanceHz")));
        Assert.Empty(found.GainCrossovers);
        Assert.Contains(found.Notes, n => n.Code == "zeroGain");
    }

    [Fact]
    public void Without_phase_crossovers_of_gain_are_still_found()
    {
        var found = Margins(Measuring.Levels([1, 100], [20, -20]));
        Assert.Null(Assert.Single(found.GainCrossovers).PhaseMarginDeg);
        Measuring.Close(10, found.Value("gainCrossoverHz"), 1e-12, "the only crossover");
        Assert.Null(found.Value("phaseMarginDeg"));
        Assert.Null(found.Value("leastDistance"));
        Assert.Empty(found.PhaseCrossovers);
        Assert.Equal("phaseAbsent", found.Reason!.Code);
    }

    [Fact]
    public void The_device_says_the_critical_phase_unless_the_call_does()
    {
        var run = Measuring.LevelsAndPhases([1, 100], [20, -20], [30, 30]);
        var call = new MeasureCall("loopMargins", new Dictionary<string, double>());
        Measuring.Close(30, MeasureCatalogue.Evaluate(run, call, new DeviceTraits(true, 0)).Value("phaseMarginDeg"), 1e-12, "0");
        Measuring.Close(-150, MeasureCatalogue.Evaluate(run, call, new DeviceTraits(true, -180)).Value("phaseMarginDeg"), 1e-12, "-180");
    }

    [Fact]
    public void No_scan_of_a_random_loop_comes_nearer_than_the_least_distance()
        => Gen.Select(Gen.Double[-25, 25].Array[5], Gen.Double[-115, 115].Array[5]).Sample((levels, steps) =>
        {
            double[] f = [1, 3, 10, 30, 100];
            var phase = new double[5];
            for (int i = 1; i < 5; i++)
                phase[i] = phase[i - 1] + steps[i];
            var run = Measuring.LevelsAndPhases(f, levels, phase);
            double least = Margins(run).Value("leastDistance")!.Value;
            double scanned = double.PositiveInfinity;
            foreach (double hz in Measuring.LogGrid(1, 100, 4001))
            {
                double gain = Math.Pow(10, run.GainDbAt(hz)!.Value / 20);
                double psi = (run.PhaseDegAt(hz)!.Value + 180) * Math.PI / 180;
                scanned = Math.Min(scanned, double.Hypot(1 - gain * Math.Cos(psi), gain * Math.Sin(psi)));
            }

            Assert.True(least <= scanned + 1e-12, $"{least:R} against {scanned:R}");
            Assert.True(scanned - least < 0.02, $"{least:R} is far under {scanned:R}");
        }, seed: "0000KOIPIEC8", iter: 300);
}

using System.Text.Json;
using ResponseLedger.Engine.Measures;
using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Engine.Tests.Measures;

/// <summary>
/// tests/reference/loops.json: 15 open loops, crossovers by polynomial roots in 50 digits, confirmed by Octave's margin.
/// Straight on the grid 1e-9; continuous 1e-4 relative in frequency, 0.02 degree, 0.001 dB (0.4 dB for the 40 Hz resonance).
/// </summary>
public sealed class LoopReferenceTests
{
    private static readonly Dictionary<string, JsonElement> Loops =
        ReferenceData.Json("loops.json").GetProperty("loops").EnumerateArray().ToDictionary(f => f.GetProperty("id").GetString()!);

    public static TheoryData<string> Ids => new(Loops.Keys);

    [Fact]
    public void All_fifteen_loops_are_here() => Assert.Equal(15, Loops.Count);

    [Theory, MemberData(nameof(Ids))]
    public void Straight_line_crossovers_are_met_to_rounding(string id)
    {
        var found = Margins(id, out _);
        CheckCrossovers(Loops[id].GetProperty("straightLineOnGrid"), found, 1e-9, 1e-9, 1e-9);
    }

    [Theory, MemberData(nameof(Ids))]
    public void Continuous_margins_are_met_to_what_the_grid_costs(string id)
    {
        var found = Margins(id, out var run);
        var measures = Loops[id].GetProperty("measures");
        double levelTolerance = id == "resonant-three-gain-crossovers" ? 0.4 : 0.001;
        CheckCrossovers(measures, found, 1e-4, 0.02, levelTolerance);
        Check(measures, "leastPhaseMarginDeg", found, "phaseMarginDeg", 0.02);
        Check(measures, "leastGainMarginIncreaseDb", found, "gainMarginDb", levelTolerance);
        Check(measures, "leastGainMarginDecreaseDb", found, "gainReductionDb", levelTolerance);
        var least = measures.GetProperty("leastDistanceToCriticalPoint");
        Measuring.Close(least.GetProperty("distance").GetDouble(), found.Value("leastDistance"), 1e-4, "least distance");
        // The distance is flat at its least, so its place is only as sharp as the square root of what the grid costs.
        double placeHz = least.GetProperty("frequencyHz").GetDouble();
        Measuring.Close(placeHz, found.Value("leastDistanceHz"), 0.01 * placeHz, "place of the least distance");
        if (least.GetProperty("place").GetString() == "stop")
            Assert.Equal(run.FrequencyHz[^1], found.Value("leastDistanceHz"));
    }

    [Theory, MemberData(nameof(Ids))]
    public void No_dense_scan_finds_a_smaller_distance(string id)
    {
        var found = Margins(id, out var run);
        double critical = Loops[id].GetProperty("criticalPhaseDeg").GetDouble();
        double scanned = double.PositiveInfinity;
        foreach (double frequencyHz in Measuring.LogGrid(run.FrequencyHz[0], run.FrequencyHz[^1], 60_001))
        {
            double gain = Math.Pow(10, run.GainDbAt(frequencyHz)!.Value / 20);
            double psi = (run.PhaseDegAt(frequencyHz)!.Value - critical) * Math.PI / 180;
            scanned = Math.Min(scanned, double.Hypot(1 - gain * Math.Cos(psi), gain * Math.Sin(psi)));
        }

        double least = found.Value("leastDistance")!.Value;
        Assert.True(least <= scanned + 1e-12, $"{least:R} against {scanned:R}");
        Assert.True(scanned - least < 1e-6, $"{least:R} is far from any scanned {scanned:R}");
    }

    [Fact]
    public void The_least_of_several_phase_margins_is_the_least_in_size_with_its_own_crossover()
    {
        var found = Margins("resonant-three-gain-crossovers", out _);
        Assert.Equal(3, found.GainCrossovers.Count);
        Measuring.Close(-79.6961762107232, found.Value("phaseMarginDeg"), 1e-9, "least margin");
        Measuring.Close(42.26645231531027, found.Value("gainCrossoverHz"), 1e-7, "its crossover");
        Assert.Null(found.Value("gainMarginDb"));
        Assert.Equal("noCrossover", found.Reason!.Code);
    }

    private static void Check(JsonElement measures, string expected, MeasureResult found, string output, double tolerance)
    {
        var value = measures.GetProperty(expected);
        if (value.ValueKind == JsonValueKind.Null)
            Assert.Null(found.Value(output));
        else
            Measuring.Close(value.GetDouble(), found.Value(output), tolerance, output);
    }

    private static void CheckCrossovers(JsonElement expected, MeasureResult found, double relativeHz, double deg, double db)
    {
        var gains = expected.GetProperty("gainCrossovers").EnumerateArray().ToList();
        Assert.Equal(gains.Count, found.GainCrossovers.Count);
        foreach (var (e, f) in gains.Zip(found.GainCrossovers))
        {
            double hz = e.GetProperty("frequencyHz").GetDouble();
            Measuring.Close(hz, f.FrequencyHz, relativeHz * hz, "gain crossover");
            Measuring.Close(e.GetProperty("phaseMarginDeg").GetDouble(), f.PhaseMarginDeg, deg, "phase margin");
        }

        var phases = expected.GetProperty("phaseCrossovers").EnumerateArray().ToList();
        Assert.Equal(phases.Count, found.PhaseCrossovers.Count);
        foreach (var (e, f) in phases.Zip(found.PhaseCrossovers))
        {
            double hz = e.GetProperty("frequencyHz").GetDouble();
            Measuring.Close(hz, f.FrequencyHz, relativeHz * hz, "phase crossover");
            Measuring.Close(e.GetProperty("gainMarginDb").GetDouble(), f.GainMarginDb, db, "gain margin");
        }
    }

    private static MeasureResult Margins(string id, out Sweep run)
    {
        var grid = Loops[id].GetProperty("grid");
        run = Sweep.Create(
            SweepForm.RealImaginary,
            ReferenceData.Numbers(grid.GetProperty("frequencyHz")),
            ReferenceData.Numbers(grid.GetProperty("re")),
            ReferenceData.Numbers(grid.GetProperty("im")));
        var device = new DeviceTraits(true, Loops[id].GetProperty("criticalPhaseDeg").GetDouble());
        return MeasureCatalogue.Evaluate(run, new MeasureCall("loopMargins", new Dictionary<string, double>()), device);
    }
}

using System.Text.Json;
using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Engine.Tests.Measures;

/// <summary>tests/reference/ngspice: AC results of five circuits against the roots of their closed forms, within what the grid allows.</summary>
public sealed class NgspiceReferenceTests
{
    private static readonly Dictionary<string, JsonElement> Circuits =
        ReferenceData.Json("ngspice/analytic.json").GetProperty("circuits").EnumerateArray().ToDictionary(c => c.GetProperty("name").GetString()!);

    public static TheoryData<string> Names => new(Circuits.Keys);

    [Theory, MemberData(nameof(Names))]
    public void Peak_and_half_power_points_are_met(string name)
    {
        var circuit = Circuits[name];
        var run = Load(name);
        Assert.Equal(circuit.GetProperty("points").GetInt32(), run.Count);
        var peak = run.Measure("peak");
        Measuring.Close(circuit.GetProperty("peakGainDb").GetDouble(), peak.Value("gainDb"), 0.001, "peak");
        Assert.Equal(circuit.GetProperty("peakPlace").GetString() != "interior", peak.Notes.Any(n => n.Code == "peakAtEdge"));
        var cutoffs = run.Measure("bandwidth", Measuring.Peak, ("dropDb", Measuring.HalfPowerDb));
        CheckCutoff(circuit, "lowerHalfPowerHz", cutoffs.Value("lowerHz"));
        CheckCutoff(circuit, "upperHalfPowerHz", cutoffs.Value("upperHz"));
    }

    [Fact]
    public void The_opened_integrator_has_one_gain_crossover_and_no_phase_crossover()
    {
        var expected = Circuits["loop-gain"].GetProperty("loop");
        var found = Load("loop-gain").Measure("loopMargins");
        var crossover = Assert.Single(found.GainCrossovers);
        var wanted = expected.GetProperty("gainCrossovers")[0];
        Measuring.Close(wanted.GetProperty("frequencyHz").GetDouble(), crossover.FrequencyHz, 1e-4 * 786_034, "crossover");
        Measuring.Close(wanted.GetProperty("phaseMarginDeg").GetDouble(), crossover.PhaseMarginDeg, 0.02, "phase margin");
        Assert.Empty(found.PhaseCrossovers);
        Measuring.Close(expected.GetProperty("leastDistanceToCriticalPoint").GetProperty("distance").GetDouble(), found.Value("leastDistance"), 1e-3, "least distance");
    }

    [Fact]
    public void The_notch_lies_between_grid_points_but_its_floor_is_seen()
    {
        var run = Load("twin-t");
        var notch = Circuits["twin-t"];
        double lowest = double.PositiveInfinity;
        foreach (double level in run.GainDb)
            lowest = Math.Min(lowest, level);
        Assert.InRange(lowest, notch.GetProperty("notchGainDb").GetDouble(), -40);
    }

    private static void CheckCutoff(JsonElement circuit, string head, double? found)
    {
        var expected = circuit.GetProperty(head);
        // The chord's sagitta at 50 points a decade: h^2/8 |L''| = 0.02^2/8 * 92 dB = 0.0046 dB at a second-order corner, which at its
        // slope of 20 dB/decade moves the half-power point by 5.3e-4 of the frequency.
        if (expected.ValueKind == JsonValueKind.Null)
            Assert.Null(found);
        else
            Measuring.Close(expected.GetDouble(), found, 6e-4 * expected.GetDouble(), head);
    }

    private static Sweep Load(string name)
    {
        var rows = ReferenceData.Csv($"ngspice/{name}.csv");
        return Sweep.Create(
            SweepForm.RealImaginary, ReferenceData.Column(rows, "frequency_hz"), ReferenceData.Column(rows, "real"), ReferenceData.Column(rows, "imag"));
    }
}

using System.Numerics;
using System.Text.Json;
using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Formats.Tests;

public sealed class ReferenceFileTests
{
    private static readonly JsonElement Circuits = JsonDocument.Parse(File.ReadAllText(Path.Combine(Reading.ReferenceFolder, "ngspice", "analytic.json"))).RootElement.GetProperty("circuits");

    [Theory]
    [InlineData("loop-gain")]
    [InlineData("rc-ladder")]
    [InlineData("rlc-bandpass")]
    [InlineData("sallen-key")]
    [InlineData("twin-t")]
    public void A_simulated_circuit_reads_as_a_run_and_agrees_with_its_polynomials(string name)
    {
        Sweep sweep = Reading.OfFile("ngspice", name + ".csv").Taken();
        Assert.Equal(SweepForm.RealImaginary, sweep.Form);
        JsonElement circuit = Circuits.EnumerateArray().First(c => c.GetProperty("name").GetString() == name);
        Assert.Equal(circuit.GetProperty("points").GetInt32(), sweep.Count);
        double bound = 2 * circuit.GetProperty("maxRelativeDeviation").GetDouble() + 1e-12;
        for (int i = 0; i < sweep.Count; i++)
        {
            var s = new Complex(0, 2 * Math.PI * sweep.FrequencyHz[i]);
            Complex expected = Polynomial(circuit.GetProperty("numerator"), s) / Polynomial(circuit.GetProperty("denominator"), s);
            var read = new Complex(sweep.FirstPlane[i], sweep.SecondPlane[i]);
            Assert.True((read - expected).Magnitude <= bound * expected.Magnitude, $"Point {i}: {read} for {expected}");
        }
    }

    [Fact]
    public void The_weighting_network_reads_as_a_run_of_400_points()
    {
        FileReading reading = Reading.OfFile("itu-r-bs468-4-network.csv");
        Sweep sweep = reading.Taken();
        Assert.Equal(400, sweep.Count);
        Assert.Equal(SweepForm.RealImaginary, sweep.Form);
        Assert.Equal(20.000000000000004, sweep.FrequencyHz[0]);
        Assert.Equal(0.0002262817833229016, sweep.FirstPlane[0]);
        Assert.Equal(0.020350155070579013, sweep.SecondPlane[0]);
    }

    private static Complex Polynomial(JsonElement highestFirst, Complex s)
        => highestFirst.EnumerateArray().Aggregate(Complex.Zero, (sum, coefficient) => sum * s + coefficient.GetDouble());
}

using ResponseLedger.Engine.Measures;
using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Engine.Tests;

/// <summary>Short ways to say what a test measures.</summary>
internal static class Measuring
{
    internal static readonly ReferenceLevel Peak = new ReferenceLevel.Peak();

    internal static readonly double HalfPowerDb = 10 * Math.Log10(2);

    internal static MeasureResult Measure(this Sweep run, string measure, ReferenceLevel? reference, params (string Name, double Value)[] parameters)
        => MeasureCatalogue.Evaluate(run, new MeasureCall(measure, parameters.ToDictionary(p => p.Name, p => p.Value), reference), DeviceTraits.Transfer);

    internal static MeasureResult Measure(this Sweep run, string measure, params (string Name, double Value)[] parameters)
        => run.Measure(measure, null, parameters);

    internal static double? Value(this MeasureResult result, string output) => result.Outputs.Single(o => o.Name == output).Value;

    internal static Sweep Levels(double[] frequencyHz, double[] gainDb) => Sweep.Create(SweepForm.Level, frequencyHz, gainDb, []);

    internal static Sweep LevelsAndPhases(double[] frequencyHz, double[] gainDb, double[] phaseDeg)
        => Sweep.Create(SweepForm.LevelPhase, frequencyHz, gainDb, phaseDeg);

    internal static double[] LogGrid(double fromHz, double toHz, int count)
        => Enumerable.Range(0, count).Select(i => i == 0 ? fromHz : i == count - 1 ? toHz : fromHz * Math.Pow(toHz / fromHz, (double)i / (count - 1))).ToArray();

    internal static void Close(double expected, double? actual, double tolerance, string what)
    {
        Assert.True(actual is not null, $"{what}: absent, expected {expected:R}.");
        Assert.True(Math.Abs(expected - actual!.Value) <= tolerance, $"{what}: expected {expected:R}, found {actual.Value:R}, off by {actual.Value - expected:E3}, allowed {tolerance:E3}.");
    }

    internal static void CloseOrAbsent(double? expected, double? actual, double relative, string what)
    {
        if (expected is { } value)
            Close(value, actual, relative * Math.Max(1, Math.Abs(value)), what);
        else
            Assert.True(actual is null, $"{what}: expected absent, found {actual:R}.");
    }
}

using System.Text.Json;
using ResponseLedger.Engine.Measures;
using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Engine.Tests.Measures;

/// <summary>
/// tests/reference/filters.json: 26 analogue prototypes (scipy.signal grids, measures by roots in 50 digits). The curve that is straight
/// on the grid must be met to 1e-9 relative; the continuous one to what the grid costs, as the set's README states.
/// </summary>
public sealed class FilterReferenceTests
{
    private static readonly Dictionary<string, JsonElement> Filters =
        ReferenceData.Json("filters.json").GetProperty("filters").EnumerateArray().ToDictionary(f => f.GetProperty("id").GetString()!);

    /// <summary>
    /// The case whose two peaks, both of the reference set, differ by more than the 0.001 dB that its README allows: 0.0010041 dB. There the
    /// tight comparison on the grid stands alone, and <see cref="The_set_disagrees_with_itself_about_one_peak"/> keeps the finding.
    /// </summary>
    private const string PeakDisagreement = "chebyshev1-lp-3-1p0db";

    public static TheoryData<string> Ids => new(Filters.Keys);

    [Fact]
    public void The_set_disagrees_with_itself_about_one_peak()
    {
        var filter = Filters[PeakDisagreement];
        double continuousDb = filter.GetProperty("measures").GetProperty("peak").GetProperty("gainDb").GetDouble();
        double onGridDb = filter.GetProperty("straightLineOnGrid").GetProperty("peak").GetProperty("gainDb").GetDouble();
        Assert.Equal(0.001004056, continuousDb - onGridDb, 1e-9);
    }

    [Fact]
    public void All_twenty_six_filters_are_here() => Assert.Equal(26, Filters.Count);

    [Theory, MemberData(nameof(Ids))]
    public void Straight_line_measures_are_met_to_rounding(string id)
    {
        var (filter, run) = Load(id);
        var straight = filter.GetProperty("straightLineOnGrid");
        var peak = run.Measure("peak");
        var expectedPeak = straight.GetProperty("peak");
        Measuring.Close(expectedPeak.GetProperty("gainDb").GetDouble(), peak.Value("gainDb"), 1e-9, "peak");
        if (!expectedPeak.GetProperty("tied").GetBoolean())
            Assert.Equal(expectedPeak.GetProperty("frequencyHz").GetDouble(), peak.Value("frequencyHz"));

        foreach (string drop in DropsOf(filter, run))
        {
            var expected = straight.GetProperty("cutoffsRelativeToPeak").GetProperty(drop);
            var found = run.Measure("bandwidth", Measuring.Peak, ("dropDb", DropDb(filter, drop)));
            Measuring.CloseOrAbsent(NumberOf(expected, "lowerHz"), found.Value("lowerHz"), 1e-9, drop + " lower");
            Measuring.CloseOrAbsent(NumberOf(expected, "upperHz"), found.Value("upperHz"), 1e-9, drop + " upper");
        }

        var measures = filter.GetProperty("measures");
        if (Part(straight, "slopeFit") is { } slope)
        {
            var found = MeasureBand(run, "slope", measures.GetProperty("slopeFit"));
            double expected = slope.GetProperty("slopeDbPerDecade").GetDouble();
            Measuring.CloseOrAbsent(expected, found.Value("dbPerDecade"), 1e-9, "slope");
            Measuring.CloseOrAbsent(expected * Math.Log10(2), found.Value("dbPerOctave"), 1e-9, "slope an octave");
            Measuring.CloseOrAbsent(expected / 20, found.Value("power"), 1e-9, "power");
            Measuring.CloseOrAbsent(slope.GetProperty("rmsResidualDb").GetDouble(), found.Value("residualDb"), 1e-9, "residual");
        }

        if (NumberOf(straight, "rippleDb") is { } ripple)
            Measuring.Close(ripple, MeasureBand(run, "ripple", measures.GetProperty("ripple")).Value("rippleDb"), 1e-9, "ripple");
        Measuring.CloseOrAbsent(straight.GetProperty("unwrappedPhaseDegAtLastPoint").GetDouble(), run.PhaseDeg[^1], 1e-9, "last phase");
        Assert.Equal(NumberOf(straight, "firstStepOver120DegEndsAtHz"), run.SuspectSteps.Length == 0 ? null : run.SuspectSteps[0].ToHz);
    }

    [Theory, MemberData(nameof(Ids))]
    public void Continuous_measures_are_met_to_what_the_grid_costs(string id)
    {
        var (filter, run) = Load(id);
        var measures = filter.GetProperty("measures");
        double cutoffTolerance = id.StartsWith("chebyshev", StringComparison.Ordinal) || id.StartsWith("elliptic", StringComparison.Ordinal) ? 6e-4 : 3e-4;
        // The all-pass has no peak of its own: its level is the same everywhere.
        var peak = Part(measures, "peak") ?? measures.GetProperty("passbandLevel");
        if (id != PeakDisagreement)
            Measuring.Close(peak.GetProperty("gainDb").GetDouble(), run.Measure("peak").Value("gainDb"), id == "resonant-bp-q25" ? 0.04 : 0.001, "peak");

        foreach (string drop in DropsOf(filter, run))
        {
            var expected = measures.GetProperty("cutoffsRelativeToPeak").GetProperty(drop);
            var found = run.Measure("bandwidth", Measuring.Peak, ("dropDb", DropDb(filter, drop)));
            Measuring.CloseOrAbsent(NumberOf(expected, "lowerHz"), found.Value("lowerHz"), cutoffTolerance, drop + " lower");
            Measuring.CloseOrAbsent(NumberOf(expected, "upperHz"), found.Value("upperHz"), cutoffTolerance, drop + " upper");
            CheckBand(expected, found, cutoffTolerance);
        }

        if (Part(measures, "ripple") is { } ripple)
        {
            Measuring.Close(ripple.GetProperty("rippleDb").GetDouble(), MeasureBand(run, "ripple", ripple).Value("rippleDb"),
                id == "chebyshev1-bp-3" ? 0.06 : 0.003, "ripple");
        }

        if (Part(measures, "slopeFit") is { } slope)
        {
            var found = MeasureBand(run, "slope", slope);
            Measuring.Close(slope.GetProperty("slopeDbPerDecade").GetDouble(), found.Value("dbPerDecade"), 0.001, "slope");
            Measuring.Close(slope.GetProperty("power").GetDouble(), found.Value("power"), 0.001 / 20, "power");
        }
    }

    [Theory, MemberData(nameof(Ids))]
    public void Phase_at_grid_points_and_delay_are_met(string id)
    {
        var (filter, run) = Load(id);
        var measures = filter.GetProperty("measures");
        foreach (var point in measures.GetProperty("unwrappedPhase").EnumerateArray())
        {
            if (NumberOf(point, "phaseDeg") is { } phase)
                Measuring.Close(phase, run.Measure("phase", ("frequencyHz", point.GetProperty("frequencyHz").GetDouble())).Value("phaseDeg"), 1e-9, "phase");
        }

        var delays = measures.GetProperty("groupDelay").EnumerateArray().Where(p => NumberOf(p, "delaySeconds") is not null).ToList();
        if (id.StartsWith("notch", StringComparison.Ordinal) || delays.Count == 0)
            return;
        double largest = delays.Max(p => Math.Abs(p.GetProperty("delaySeconds").GetDouble()));
        foreach (var point in delays)
        {
            double frequencyHz = point.GetProperty("frequencyHz").GetDouble();
            if (run.HasSuspectStep(frequencyHz * 0.95, frequencyHz * 1.05))
                continue;
            Measuring.Close(point.GetProperty("delaySeconds").GetDouble(), run.Measure("delay", ("frequencyHz", frequencyHz)).Value("delaySeconds"), 0.02 * largest, $"delay at {frequencyHz} Hz");
        }
    }

    [Theory, MemberData(nameof(Ids))]
    public void Shape_factor_and_stop_band_are_met(string id)
    {
        var (filter, run) = Load(id);
        var measures = filter.GetProperty("measures");
        var found = run.Measure("shapeFactor", Measuring.Peak, ("outerDropDb", 60), ("innerDropDb", 6));
        if (Part(measures, "shapeFactor60To6RelativeToPeak") is { } shape)
        {
            // The outer cutoffs stand on the straight skirts; the ratio inherits the cutoffs' tolerance several times over.
            Measuring.Close(shape.GetProperty("value").GetDouble(), found.Value("ratio"), 3e-3 * shape.GetProperty("value").GetDouble(), "shape factor");
        }
        else
        {
            Assert.Null(found.Value("ratio"));
            Assert.Equal("notReached", found.Reason!.Code);
        }

        if (Part(measures, "stopBand") is not { } stopBand)
            return;
        // The reference is the passband level: the level of the run at the frequency where the walk starts, within the peak's tolerance of it.
        double walkHz = Math.Clamp(measures.GetProperty("passbandLevel").GetProperty("walkFromHz").GetDouble(), run.FrequencyHz[0], run.FrequencyHz[^1]);
        var attenuation = run.Measure("attenuation", new ReferenceLevel.AtFrequency(walkHz), Band(stopBand));
        double offset = measures.GetProperty("passbandLevel").GetProperty("gainDb").GetDouble() - run.GainDbAt(walkHz)!.Value;
        double expected = stopBand.GetProperty("attenuationBelowPassbandLevelDb").GetDouble() - offset;
        // Between grid points the highest level of a band is that of a chord: 0.01 dB at the maxima of the elliptic stop band.
        Measuring.Close(expected, attenuation.Value("attenuationDb"), 0.01, "attenuation");
    }

    /// <summary>The drops with cutoffs in the set. The all-pass has none: there, no cutoff is reached on either side.</summary>
    private static string[] DropsOf(JsonElement filter, Sweep run)
    {
        if (Part(filter.GetProperty("measures"), "cutoffsRelativeToPeak") is not null)
            return ["halfPower", "threeDb"];
        Assert.Equal("allpass-2", filter.GetProperty("id").GetString());
        var found = run.Measure("bandwidth", Measuring.Peak, ("dropDb", 3));
        Assert.All(found.Outputs, o => Assert.Null(o.Value));
        Assert.Equal("notReached", found.Reason!.Code);
        return [];
    }

    private static void CheckBand(JsonElement expected, MeasureResult found, double tolerance)
    {
        if (NumberOf(expected, "bandwidthHz") is not { } width)
            return;
        double centreHz = expected.GetProperty("geometricCentreHz").GetDouble();
        // Each cutoff may be off by the tolerance, so the width is by that share of their sum.
        double relative = tolerance * (expected.GetProperty("lowerHz").GetDouble() + expected.GetProperty("upperHz").GetDouble()) / width;
        Measuring.Close(width, found.Value("bandwidthHz"), relative * width, "bandwidth");
        Measuring.Close(centreHz, found.Value("centreHz"), tolerance * centreHz, "centre");
        Measuring.Close(expected.GetProperty("q").GetDouble(), found.Value("q"), relative * expected.GetProperty("q").GetDouble(), "Q");
        Measuring.Close(expected.GetProperty("fractionalBandwidth").GetDouble(), found.Value("fractional"), relative * expected.GetProperty("fractionalBandwidth").GetDouble(), "fractional");
    }

    private static MeasureResult MeasureBand(Sweep run, string measure, JsonElement band) => run.Measure(measure, Band(band));

    private static (string, double)[] Band(JsonElement band)
        => [("fromHz", band.GetProperty("fromHz").GetDouble()), ("toHz", band.GetProperty("toHz").GetDouble())];

    private static double DropDb(JsonElement filter, string drop)
        => filter.GetProperty("measures").GetProperty("cutoffsRelativeToPeak").GetProperty(drop).GetProperty("dropDb").GetDouble();

    private static (JsonElement Filter, Sweep Run) Load(string id)
    {
        var grid = Filters[id].GetProperty("grid");
        return (Filters[id], Sweep.Create(
            SweepForm.RealImaginary,
            ReferenceData.Numbers(grid.GetProperty("frequencyHz")),
            ReferenceData.Numbers(grid.GetProperty("re")),
            ReferenceData.Numbers(grid.GetProperty("im"))));
    }

    private static JsonElement? Part(JsonElement parent, string name)
        => parent.TryGetProperty(name, out var part) && part.ValueKind == JsonValueKind.Object ? part : null;

    private static double? NumberOf(JsonElement parent, string name)
        => parent.TryGetProperty(name, out var part) && part.ValueKind == JsonValueKind.Number ? part.GetDouble() : null;
}

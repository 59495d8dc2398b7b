using ResponseLedger.Engine.Measures;

namespace ResponseLedger.Engine.Tests.Measures;

public sealed class CatalogueTests
{
    /// <summary>Names, parameters (a question mark for optional) and outputs as the HTTP contract fixes them.</summary>
    [Theory]
    [InlineData("level", "frequencyHz", false, "gainDb")]
    [InlineData("phase", "frequencyHz", false, "phaseDeg")]
    [InlineData("delay", "frequencyHz,apertureRatio?", false, "delaySeconds")]
    [InlineData("peak", "fromHz?,toHz?", false, "gainDb,frequencyHz")]
    [InlineData("bandwidth", "dropDb", true, "lowerHz,upperHz,bandwidthHz,centreHz,q,fractional")]
    [InlineData("shapeFactor", "outerDropDb,innerDropDb", true, "ratio")]
    [InlineData("ripple", "fromHz,toHz", false, "rippleDb")]
    [InlineData("attenuation", "fromHz,toHz", true, "attenuationDb")]
    [InlineData("slope", "fromHz,toHz", false, "dbPerDecade,dbPerOctave,power,residualDb")]
    [InlineData("loopMargins", "criticalPhaseDeg?", false, "phaseMarginDeg,gainCrossoverHz,gainMarginDb,gainReductionDb,phaseCrossoverHz,leastDistance,leastDistanceHz")]
    public void A_measure_takes_and_gives_what_the_contract_says(string name, string parameters, bool takesReference, string outputs)
    {
        var definition = MeasureCatalogue.Find(name)!;
        Assert.Equal(parameters, string.Join(",", definition.Parameters.Select(p => p.Name + (p.Required ? "" : "?"))));
        Assert.Equal(takesReference, definition.TakesReference);
        Assert.Equal(outputs, string.Join(",", definition.Outputs.Select(o => o.Name)));
        Assert.Contains(definition, MeasureCatalogue.All);
    }

    [Fact]
    public void There_are_ten_measures() => Assert.Equal(10, MeasureCatalogue.All.Count);

    public static TheoryData<string, string, double, string> BadParameters => new()
    {
        { "level", "frequencyHz", 0, "above 0" },
        { "level", "frequencyHz", -1, "above 0" },
        { "level", "frequencyHz", double.NaN, "finite" },
        { "level", "frequencyHz", double.PositiveInfinity, "finite" },
        { "loopMargins", "criticalPhaseDeg", -90, "-180 or 0" },
        { "loopMargins", "wrong", 1, "takes no wrong" },
        { "peak", "fromHz", 0, "above 0" },
    };

    [Theory, MemberData(nameof(BadParameters))]
    public void A_bad_parameter_is_a_problem_and_throws(string measure, string name, double value, string says)
    {
        var call = new MeasureCall(measure, new Dictionary<string, double> { [name] = value });
        Assert.Contains(says, Assert.Single(MeasureCatalogue.ProblemsOf(call)), StringComparison.Ordinal);
        var thrown = Assert.Throws<ArgumentException>(() => MeasureCatalogue.Evaluate(Measuring.Levels([1, 2], [0, 0]), call, DeviceTraits.Transfer));
        Assert.Contains(says, thrown.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Missing_reversed_and_unwanted_things_are_problems_with_their_place()
    {
        Assert.Equal(["parameters.fromHz", "parameters.toHz"], PathsOf("ripple", null));
        Assert.Equal(["parameters.toHz"], PathsOf("ripple", null, ("fromHz", 2), ("toHz", 2)));
        Assert.Equal(["parameters.outerDropDb"], PathsOf("shapeFactor", Measuring.Peak, ("outerDropDb", 3), ("innerDropDb", 6)));
        Assert.Equal(["parameters.apertureRatio"], PathsOf("delay", null, ("frequencyHz", 1), ("apertureRatio", 1)));
        Assert.Equal(["parameters.dropDb"], PathsOf("bandwidth", Measuring.Peak, ("dropDb", 0)));
        Assert.Equal(["reference"], PathsOf("bandwidth", null, ("dropDb", 3)));
        Assert.Equal(["reference"], PathsOf("level", Measuring.Peak, ("frequencyHz", 1)));
        Assert.Equal(["reference"], PathsOf("bandwidth", new ReferenceLevel.AtFrequency(-1), ("dropDb", 3)));
        Assert.Equal(["reference"], PathsOf("bandwidth", new ReferenceLevel.Band(10, 10), ("dropDb", 3)));
        Assert.Equal(["measure"], PathsOf("excessphase", null));
        Assert.Empty(PathsOf("loopMargins", null, ("criticalPhaseDeg", 0)));
        Assert.Empty(PathsOf("loopMargins", null, ("criticalPhaseDeg", -180)));

        static IEnumerable<string> PathsOf(string measure, ReferenceLevel? reference, params (string Name, double Value)[] parameters)
            => MeasureCatalogue.LocatedProblemsOf(new MeasureCall(measure, parameters.ToDictionary(p => p.Name, p => p.Value), reference)).Select(p => p.Path);
    }

    [Fact]
    public void Level_and_phase_at_a_frequency_are_absent_outside_the_sweep()
    {
        var run = Measuring.LevelsAndPhases([10, 1000], [0, 20], [10, 30]);
        Measuring.Close(10, run.Measure("level", ("frequencyHz", 100)).Value("gainDb"), 1e-12, "level");
        Measuring.Close(20, run.Measure("phase", ("frequencyHz", 100)).Value("phaseDeg"), 1e-12, "phase");
        foreach (string measure in (string[])["level", "phase", "delay"])
        {
            Assert.Equal("outsideSweep", run.Measure(measure, ("frequencyHz", 9.9)).Reason!.Code);
            Assert.Equal("outsideSweep", run.Measure(measure, ("frequencyHz", 1001)).Reason!.Code);
            Assert.Null(run.Measure(measure, ("frequencyHz", 1000)).Reason);
        }
    }

    [Fact]
    public void Values_beyond_a_double_are_absent_with_a_reason()
    {
        var run = Measuring.Levels([1, 2], [-1e308, 1e308]);
        var found = run.Measure("ripple", ("fromHz", 1), ("toHz", 2));
        Assert.Null(found.Value("rippleDb"));
        Assert.Equal("notFinite", found.Reason!.Code);
    }
}

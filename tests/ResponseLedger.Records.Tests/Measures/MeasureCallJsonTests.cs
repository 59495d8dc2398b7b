using System.Text.Json;
using ResponseLedger.Engine;
using ResponseLedger.Engine.Measures;
using ResponseLedger.Records.Measures;

namespace ResponseLedger.Records.Tests.Measures;

public sealed class MeasureCallJsonTests
{
    private static readonly MeasureCall Bandwidth = new(
        "bandwidth",
        new Dictionary<string, double> { ["dropDb"] = 3 },
        new ReferenceLevel.Band(100, 1000));

    [Fact]
    public void A_call_reads_back_as_it_was_written()
    {
        var json = MeasureCallJson.Write(Bandwidth).ToJsonString();
        Assert.Equal("""{"measure":"bandwidth","parameters":{"dropDb":3,"reference":{"kind":"band","fromHz":100,"toHz":1000}}}""", json);
        using var parsed = JsonDocument.Parse(json);
        Assert.True(MeasureCallJson.TryParse(parsed.RootElement, out var call, out _));
        Assert.Equal((Bandwidth.Measure, Bandwidth.Reference), (call.Measure, call.Reference));
        Assert.Equal(Bandwidth.Parameters, call.Parameters);
    }

    [Theory]
    [InlineData("""{"parameters":{}}""", "measure")]
    [InlineData("""{"measure":"level","parameters":{"frequencyHz":"1 k"}}""", "parameters.frequencyHz")]
    [InlineData("""{"measure":"level","parameters":{"frequencyHz":{}}}""", "parameters.frequencyHz")]
    [InlineData("""{"measure":"level","frequencyHz":1}""", "frequencyHz")]
    [InlineData("""{"measure":"level","parameters":{"frequencyHz":1,"frequencyHz":2}}""", "parameters.frequencyHz")]
    [InlineData("""{"measure":"bandwidth","parameters":{"reference":{"kind":"frequency"}}}""", "parameters.reference.frequencyHz")]
    [InlineData("""{"measure":"bandwidth","parameters":{"reference":{"kind":"peak","unit":"dB"}}}""", "parameters.reference.unit")]
    [InlineData("7", "")]
    public void A_wrong_call_is_told_by_its_path(string json, string path)
    {
        using var parsed = JsonDocument.Parse(json);
        Assert.False(MeasureCallJson.TryParse(parsed.RootElement, out var call, out var problems));
        Assert.Null(call);
        Assert.Equal(path, Assert.Single(problems).Path);
    }

    [Fact]
    public void Equal_calls_have_one_key_whatever_the_order_of_their_parameters()
    {
        var forward = new MeasureCall("ripple", new Dictionary<string, double> { ["fromHz"] = 1, ["toHz"] = 2 });
        var backward = new MeasureCall("ripple", new Dictionary<string, double> { ["toHz"] = 2, ["fromHz"] = 1 });
        var other = new MeasureCall("ripple", new Dictionary<string, double> { ["toHz"] = 2, ["fromHz"] = 1.5 });
        Assert.Equal(MeasureCallJson.KeyOf(forward), MeasureCallJson.KeyOf(backward));
        Assert.NotEqual(MeasureCallJson.KeyOf(forward), MeasureCallJson.KeyOf(other));
        Assert.NotEqual(MeasureCallJson.KeyOf(forward), MeasureCallJson.KeyOf(forward with { Reference = new ReferenceLevel.Peak() }));
    }

    [Fact]
    public void An_absent_output_is_null_with_a_reason_beside_it()
    {
        var result = new MeasureResult(
            Bandwidth,
            [new("lowerHz", null, "Hz"), new("upperHz", 1234.5, "Hz")],
            new Absence("notReached", "The lower cutoff lies below 10 Hz."),
            [new Absence("suspectStep", "The phase steps by 130 degrees at 50 Hz.")],
            [],
            []);
        Assert.Equal(
            """{"measure":"bandwidth","outputs":{"lowerHz":null,"upperHz":1234.5},"reason":"notReached","explanation":"The lower cutoff lies below 10 Hz.","notes":[{"code":"suspectStep","message":"The phase steps by 130 degrees at 50 Hz."}]}""",
            MeasureCallJson.Write(result).ToJsonString());
    }

    [Fact]
    public void Loop_margins_list_every_crossover()
    {
        var result = new MeasureResult(
            new MeasureCall("loopMargins", new Dictionary<string, double>()),
            [new("phaseMarginDeg", 45, "deg")],
            null,
            [],
            [new GainCrossover(100, 60), new GainCrossover(200, null)],
            [new PhaseCrossover(1000, -12.5)]);
        Assert.Equal(
            """{"measure":"loopMargins","outputs":{"phaseMarginDeg":45},"gainCrossovers":[{"frequencyHz":100,"phaseMarginDeg":60},{"frequencyHz":200,"phaseMarginDeg":null}],"phaseCrossovers":[{"frequencyHz":1000,"gainMarginDb":-12.5}]}""",
            MeasureCallJson.Write(result).ToJsonString());
    }

    [Theory]
    [InlineData(double.NaN)]
    [InlineData(double.NegativeInfinity)]
    public void An_output_that_is_not_finite_is_never_written(double value)
        => Assert.Throws<ArgumentException>(
            () => MeasureCallJson.Write(new MeasureResult(Bandwidth, [new("q", value, "1")], null, [], [], [])));
}

using ResponseLedger.Engine.Masks;
using ResponseLedger.Records.Verdicts;

namespace ResponseLedger.Records.Tests.Verdicts;

public sealed class VerdictDocumentTests
{
    [Fact]
    public void A_verdict_is_written_exactly_so()
        => Assert.Equal(
            """
            {"outcome":"fail","worst":{"criterion":"top","outcome":"fail","frequencyHz":500,"margin":-0.25,"unit":"dB","reason":null,"explanation":null},
            "criteria":[{"name":"top","outcome":"fail","margin":-0.25,"unit":"dB","frequencyHz":500,"reason":null,"explanation":null},
            {"name":"delay","outcome":"inconclusive","margin":null,"unit":"s","frequencyHz":null,"reason":"phaseAbsent","explanation":"The run has no phase; sweep with phase."},
            {"name":"level at 1 kHz","outcome":"pass","margin":0.75,"unit":"dB","frequencyHz":null,"reason":null,"explanation":null}],
            "measures":{"level at 1 kHz":{"measure":"level","outputs":{"gainDb":0.25}}},"maskRevision":3,"engine":7}
            """.ReplaceLineEndings(string.Empty),
            VerdictDocument.Write(Samples.Evaluation, Samples.Mask, 3, 7).ToJsonString());

    [Fact]
    public void A_mask_without_criteria_gives_a_verdict_without_a_worst_one()
    {
        var json = VerdictDocument.Write(new Evaluation(Outcome.Pass, null, [], []), new("none", new([], [])), 1, 1);
        Assert.Equal("""{"outcome":"pass","worst":null,"criteria":[],"measures":{},"maskRevision":1,"engine":1}""", json.ToJsonString());
    }

    [Fact]
    public void A_criterion_with_remarks_carries_them()
    {
        var top = Samples.Evaluation.Criteria[0] with { Notes = [new("suspectPhase", "The phase steps by 130 degrees at 50 Hz.")] };
        var mask = Samples.Mask with { Mask = new([Samples.Mask.Mask.Limits[0]], []) };
        var json = VerdictDocument.Write(new Evaluation(Outcome.Fail, 0, [top], []), mask, 1, 1);
        Assert.Equal(
            """[{"code":"suspectPhase","message":"The phase steps by 130 degrees at 50 Hz."}]""",
            json["criteria"]![0]!["notes"]!.ToJsonString());
    }

    [Theory]
    [InlineData(double.NaN)]
    [InlineData(double.PositiveInfinity)]
    [InlineData(double.NegativeInfinity)]
    public void A_margin_that_is_not_finite_leaves_neither_as_json_nor_as_a_row(double margin)
    {
        var evaluation = new Evaluation(Outcome.Pass, 0, [new("top", Outcome.Pass, margin, "dB", 1, null)], []);
        var mask = Samples.Mask with { Mask = new([Samples.Mask.Mask.Limits[0]], []) };
        Assert.Throws<ArgumentException>(() => VerdictDocument.Write(evaluation, mask, 1, 1));
        Assert.Throws<ArgumentException>(() => StoredVerdict.From(evaluation));
    }

    [Fact]
    public void An_evaluation_that_lacks_a_measure_of_the_mask_is_refused()
        => Assert.Throws<ArgumentException>(() => VerdictDocument.Write(Samples.Evaluation with { Measures = [] }, Samples.Mask, 1, 1));
}

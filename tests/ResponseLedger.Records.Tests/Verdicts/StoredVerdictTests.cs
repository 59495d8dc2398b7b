using ResponseLedger.Engine.Masks;
using ResponseLedger.Records.Verdicts;

namespace ResponseLedger.Records.Tests.Verdicts;

public sealed class StoredVerdictTests
{
    [Fact]
    public void A_row_keeps_the_numbers_in_the_mask_s_order()
    {
        var stored = StoredVerdict.From(Samples.Evaluation);
        Assert.Equal((Outcome.Fail, 0), (stored.Outcome, stored.WorstIndex));
        Assert.Equal([-0.25, null, 0.75], stored.Margins);
        Assert.Equal([4, 3, 0], stored.Outcomes);
        Assert.Equal([500, null, null], stored.FrequenciesHz);
    }

    [Theory]
    [InlineData(0, "top", "dB")]
    [InlineData(1, "delay", "s")]
    [InlineData(2, "level at 1 kHz", "dB")]
    public void The_worst_criterion_is_named_from_the_mask_alone(int index, string name, string unit)
    {
        var stored = StoredVerdict.From(Samples.Evaluation with { WorstIndex = index });
        var criterion = Samples.Evaluation.Criteria[index];
        Assert.Equal(
            new WorstCriterion(name, criterion.Outcome, criterion.FrequencyHz, criterion.Margin, unit),
            StoredVerdict.WorstOf(Samples.Mask, stored));
    }

    [Fact]
    public void A_verdict_of_another_mask_is_refused()
    {
        var stored = StoredVerdict.From(Samples.Evaluation);
        var shorter = Samples.Mask with { Mask = Samples.Mask.Mask with { Requirements = [] } };
        Assert.Throws<ArgumentException>(() => StoredVerdict.WorstOf(shorter, stored));
    }

    [Fact]
    public void A_verdict_without_criteria_has_no_worst_one()
        => Assert.Null(StoredVerdict.WorstOf(new("none", new([], [])), StoredVerdict.From(new Evaluation(Outcome.Pass, null, [], []))));
}

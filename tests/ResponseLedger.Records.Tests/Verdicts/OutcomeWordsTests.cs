using ResponseLedger.Engine.Masks;
using ResponseLedger.Records.Verdicts;

namespace ResponseLedger.Records.Tests.Verdicts;

public sealed class OutcomeWordsTests
{
    [Theory]
    [InlineData(Outcome.Pass, "pass")]
    [InlineData(Outcome.ConditionalPass, "conditionalPass")]
    [InlineData(Outcome.ConditionalFail, "conditionalFail")]
    [InlineData(Outcome.Inconclusive, "inconclusive")]
    [InlineData(Outcome.Fail, "fail")]
    public void Each_outcome_has_one_word_both_ways(Outcome outcome, string word)
    {
        Assert.Equal(word, OutcomeWords.Format(outcome));
        Assert.True(OutcomeWords.TryParse(word, out var back));
        Assert.Equal(outcome, back);
    }

    [Theory]
    [InlineData("Pass")]
    [InlineData("passed")]
    [InlineData("0")]
    [InlineData("")]
    [InlineData(null)]
    public void Another_word_is_no_outcome(string? word) => Assert.False(OutcomeWords.TryParse(word, out _));

    [Fact]
    public void A_number_that_is_no_outcome_has_no_word()
        => Assert.Throws<ArgumentOutOfRangeException>(() => OutcomeWords.Format((Outcome)9));
}

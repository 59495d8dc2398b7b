using ResponseLedger.Engine.Masks;

namespace ResponseLedger.Records.Verdicts;

/// <summary>The words for outcomes in the API and in signed documents.</summary>
public static class OutcomeWords
{
    /// <summary>The word for an outcome, such as <c>conditionalPass</c>.</summary>
    public static string Format(Outcome outcome) => outcome switch
    {
        Outcome.Pass => "pass",
        Outcome.ConditionalPass => "conditionalPass",
        Outcome.ConditionalFail => "conditionalFail",
        Outcome.Inconclusive => "inconclusive",
        Outcome.Fail => "fail",
        _ => throw new ArgumentOutOfRangeException(nameof(outcome), outcome, "There is no such outcome."),
    };

    /// <summary>The outcome for a word, exactly as <see cref="Format"/> writes it.</summary>
    public static bool TryParse(string? word, out Outcome outcome)
    {
        foreach (var candidate in Enum.GetValues<Outcome>())
        {
            if (string.Equals(Format(candidate), word, StringComparison.Ordinal))
            {
                outcome = candidate;
                return true;
            }
        }

        outcome = default;
        return false;
    }
}

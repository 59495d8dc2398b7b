namespace ResponseLedger.Records.Decisions;

/// <summary>What was decided on a lot.</summary>
public enum DecisionWord
{
    /// <summary>The lot may ship.</summary>
    Approve = 1,

    /// <summary>The lot may ship under concession.</summary>
    ApproveWithConcession = 2,

    /// <summary>The lot may not ship.</summary>
    Reject = 3,
}

/// <summary>The words for decisions in the API and in signed documents.</summary>
public static class DecisionWords
{
    /// <summary>The word for a decision, such as <c>approveWithConcession</c>.</summary>
    public static string Format(DecisionWord decision) => decision switch
    {
        DecisionWord.Approve => "approve",
        DecisionWord.ApproveWithConcession => "approveWithConcession",
        DecisionWord.Reject => "reject",
        _ => throw new ArgumentOutOfRangeException(nameof(decision), decision, "There is no such decision."),
    };

    /// <summary>The decision for a word, exactly as <see cref="Format"/> writes it.</summary>
    public static bool TryParse(string? word, out DecisionWord decision)
    {
        decision = word switch
        {
            "approve" => DecisionWord.Approve,
            "approveWithConcession" => DecisionWord.ApproveWithConcession,
            "reject" => DecisionWord.Reject,
            _ => 0,
        };
        return decision != 0;
    }
}

namespace ResponseLedger.Store.Queries;

/// <summary>The words for a lot's state, and the decisions that bring it about.</summary>
public static class LotStates
{
    /// <summary>No decision is in force.</summary>
    public const string Open = "open";

    /// <summary>No state of a lot, but the word by which a list is asked for all lots with a decision in force.</summary>
    public const string Decided = "decided";

    /// <summary>All states.</summary>
    public static IReadOnlyList<string> All { get; } = [Open, "approved", "approvedWithConcession", "rejected"];

    /// <summary>The state that a decision in force brings about; open without one.</summary>
    /// <param name="decisionKind"><c>approve</c>, <c>approveWithConcession</c>, <c>reject</c>, or null.</param>
    public static string After(string? decisionKind) => decisionKind switch
    {
        null => Open,
        "approve" => "approved",
        "approveWithConcession" => "approvedWithConcession",
        "reject" => "rejected",
        _ => throw new ArgumentOutOfRangeException(nameof(decisionKind), decisionKind, "There is no such decision."),
    };

    /// <summary>The decision behind a state other than open.</summary>
    public static string KindOf(string state) => state switch
    {
        "approved" => "approve",
        "approvedWithConcession" => "approveWithConcession",
        "rejected" => "reject",
        _ => throw new ArgumentOutOfRangeException(nameof(state), state, "No decision brings this state about."),
    };
}

using ResponseLedger.Engine.Masks;
using ResponseLedger.Records.Verdicts;

namespace ResponseLedger.Store.Queries;

/// <summary>How a unit of a lot stands.</summary>
/// <param name="UnitId">The unit.</param>
/// <param name="Serial">Its serial number.</param>
/// <param name="Outcome">Fail beats inconclusive beats not yet judged (null); a unit passes when every condition passes.</param>
/// <param name="IsTested">Whether it has a counting run in every condition.</param>
/// <param name="Disposition">The disposition in force, or null.</param>
/// <param name="Runs">Production runs it has in the lot, those that do not count included.</param>
/// <param name="Retests">Those that do not count because an earlier one does.</param>
/// <param name="Invalidated">Those that were invalidated.</param>
/// <param name="Stale">Counting runs whose verdict is pending.</param>
/// <param name="Counting">The counting run in each condition that has one, in the order of the conditions.</param>
public sealed record UnitStanding(
    Guid UnitId,
    string Serial,
    Outcome? Outcome,
    bool IsTested,
    UnitDispositionInForce? Disposition,
    int Runs,
    int Retests,
    int Invalidated,
    int Stale,
    IReadOnlyList<CountingRunRow> Counting)
{
    /// <summary>Whether every condition passes.</summary>
    public bool Passes => Outcome is Engine.Masks.Outcome.Pass or Engine.Masks.Outcome.ConditionalPass;

    /// <summary>Whether it is under rework, scrap or return.</summary>
    public bool IsWithdrawn => Disposition is { Kind: not UnitDispositionInForce.Concession };
}

/// <summary>
/// A disposition that is in force: that of a unit that does not pass. One that passes on a run received after its rework, scrap
/// or return is back in the lot; a new mask alone does not bring it back.
/// </summary>
/// <param name="Kind"><c>rework</c>, <c>scrap</c>, <c>return</c> or <c>concession</c>.</param>
/// <param name="Reason">The reason given.</param>
public sealed record UnitDispositionInForce(string Kind, string Reason)
{
    /// <summary>The one disposition that leaves a unit in the lot.</summary>
    public const string Concession = "concession";
}

/// <summary>The run of a unit that counts in a condition, with its verdict.</summary>
/// <param name="ConditionId">The condition.</param>
/// <param name="RunId">The run.</param>
/// <param name="ReadingId">The reading that is judged.</param>
/// <param name="VerdictId">The verdict; null while it is pending or no mask is released.</param>
/// <param name="BasisId">The verdict's basis.</param>
/// <param name="Verdict">What the verdict says.</param>
/// <param name="MeasuredAt">When it was measured.</param>
/// <param name="ReceivedAt">When it was received.</param>
public sealed record CountingRunRow(
    Guid ConditionId,
    Guid RunId,
    Guid ReadingId,
    Guid? VerdictId,
    Guid? BasisId,
    StoredVerdict? Verdict,
    DateTimeOffset MeasuredAt,
    DateTimeOffset ReceivedAt);

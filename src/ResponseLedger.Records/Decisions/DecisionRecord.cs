using ResponseLedger.Engine.Masks;

namespace ResponseLedger.Records.Decisions;

/// <summary>All that a decision on a lot rests on and says; <see cref="DecisionDocument"/> turns it into the bytes that are signed.</summary>
/// <param name="DecisionId">Id of the decision.</param>
/// <param name="Lot">The lot.</param>
/// <param name="Device">The device.</param>
/// <param name="Decision">What was decided.</param>
/// <param name="Reason">The signer's reason; may be empty for a plain approval.</param>
/// <param name="Signer">Who signed.</param>
/// <param name="Meaning">What the signature means, a sentence (21 CFR 11.50).</param>
/// <param name="SignedAt">When, cut to microseconds.</param>
/// <param name="EngineVersion">The engine version of all verdicts.</param>
/// <param name="Rule">The decision rule, with its risk (ISO/IEC 17025 7.8.6).</param>
/// <param name="Conditions">The device's conditions with mask and golden run.</param>
/// <param name="Units">Every unit of the lot.</param>
/// <param name="Counts">The lot's counts as shown at signing.</param>
/// <param name="Recommendation">What the server recommended when the signer decided.</param>
public sealed record DecisionRecord(
    Guid DecisionId,
    DecidedLot Lot,
    DecidedDevice Device,
    DecisionWord Decision,
    string Reason,
    Signer Signer,
    string Meaning,
    DateTimeOffset SignedAt,
    int EngineVersion,
    DecisionRule Rule,
    IReadOnlyList<DecidedCondition> Conditions,
    IReadOnlyList<DecidedUnit> Units,
    DecisionCounts Counts,
    Recommendation Recommendation);

/// <summary>The lot of a decision.</summary>
/// <param name="LotId">Its id.</param>
/// <param name="Number">Its number.</param>
/// <param name="Size">Units in the lot.</param>
/// <param name="DecisionOrdinal">1 for the first decision on the lot, 2 for the one after a reopening, and so on.</param>
public sealed record DecidedLot(Guid LotId, string Number, int Size, int DecisionOrdinal);

/// <summary>The device of a decision.</summary>
/// <param name="DeviceId">Its id.</param>
/// <param name="PartNumber">Its part number.</param>
/// <param name="Revision">Its revision.</param>
/// <param name="Kind"><c>transfer</c> or <c>loop</c>.</param>
public sealed record DecidedDevice(Guid DeviceId, string PartNumber, string Revision, string Kind);

/// <summary>Who signed.</summary>
/// <param name="PersonId">Id of the person.</param>
/// <param name="Name">Printed name at that time.</param>
/// <param name="Email">Address at that time.</param>
public sealed record Signer(Guid PersonId, string Name, string Email);

/// <summary>How a margin becomes an outcome.</summary>
/// <param name="Code">A stable word, such as <c>simpleAcceptance</c>.</param>
/// <param name="Statement">The rule and its risk, a sentence.</param>
public sealed record DecisionRule(string Code, string Statement);

/// <summary>What the server recommended.</summary>
/// <param name="Decision">The decision recommended, or null for none.</param>
/// <param name="Sentence">The sentence shown to the signer.</param>
public sealed record Recommendation(DecisionWord? Decision, string Sentence);

/// <summary>A condition of the device with what its runs were judged by.</summary>
/// <param name="ConditionId">Its id.</param>
/// <param name="Name">Its name.</param>
/// <param name="Mask">The released mask revision, or null where none is (then the lot can only be rejected).</param>
/// <param name="Golden">The golden run, or null where none is set.</param>
public sealed record DecidedCondition(Guid ConditionId, string Name, PinnedMask? Mask, PinnedGolden? Golden);

/// <summary>A mask revision, by its digest.</summary>
/// <param name="MaskRevisionId">Its id.</param>
/// <param name="Revision">Its number, from 1.</param>
/// <param name="Sha256">SHA-256 of its bytes.</param>
public sealed record PinnedMask(Guid MaskRevisionId, int Revision, byte[] Sha256);

/// <summary>A golden run, by its reading and files.</summary>
/// <param name="RunId">Its run.</param>
/// <param name="ReadingId">The reading of the run that was compared with.</param>
/// <param name="FilesSha256">The <see cref="RunFilesDigest"/> of its files.</param>
public sealed record PinnedGolden(Guid RunId, Guid ReadingId, byte[] FilesSha256);

/// <summary>The lot's counts, as the API states them.</summary>
/// <param name="Units">Units in the lot.</param>
/// <param name="Tested">Units with a counting run in every condition.</param>
/// <param name="Passed">Units that pass every condition.</param>
/// <param name="Failed">Units that fail.</param>
/// <param name="Inconclusive">Units that could not be decided.</param>
/// <param name="Withdrawn">Units withdrawn by a disposition.</param>
/// <param name="Retests">Runs that are stored and do not count.</param>
public sealed record DecisionCounts(int Units, int Tested, int Passed, int Failed, int Inconclusive, int Withdrawn, int Retests);

/// <summary>A unit of the lot.</summary>
/// <param name="UnitId">Its id.</param>
/// <param name="Serial">Its serial number.</param>
/// <param name="Outcome">The worst outcome over the conditions; null where a condition has no verdict.</param>
/// <param name="Disposition">What was done with a unit that does not pass, or null.</param>
/// <param name="Runs">The counting run in each condition.</param>
/// <param name="OtherRuns">Retests and invalidated runs, which do not count.</param>
public sealed record DecidedUnit(
    Guid UnitId,
    string Serial,
    Outcome? Outcome,
    UnitDisposition? Disposition,
    IReadOnlyList<CountingRun> Runs,
    IReadOnlyList<OtherRun> OtherRuns);

/// <summary>A disposition of a unit.</summary>
/// <param name="Word"><c>rework</c>, <c>scrap</c>, <c>return</c> or <c>concession</c>.</param>
/// <param name="Reason">The reason given.</param>
public sealed record UnitDisposition(string Word, string Reason);

/// <summary>The run of a unit that counts in a condition.</summary>
/// <param name="ConditionId">The condition.</param>
/// <param name="RunId">The run.</param>
/// <param name="ReadingId">The reading that was judged.</param>
/// <param name="VerdictId">The verdict, or null where there is no released mask.</param>
/// <param name="FilesSha256">SHA-256 of each file, in the run's order.</param>
/// <param name="Outcome">The run's outcome; null without a verdict.</param>
/// <param name="Worst">The criterion that decided; null without a verdict or criteria.</param>
/// <param name="MeasuredAt">When it was measured.</param>
/// <param name="ReceivedAt">When it was received.</param>
public sealed record CountingRun(
    Guid ConditionId,
    Guid RunId,
    Guid ReadingId,
    Guid? VerdictId,
    IReadOnlyList<byte[]> FilesSha256,
    Outcome? Outcome,
    PinnedWorst? Worst,
    DateTimeOffset MeasuredAt,
    DateTimeOffset ReceivedAt);

/// <summary>The criterion that decided a run's verdict.</summary>
/// <param name="Criterion">Its name.</param>
/// <param name="FrequencyHz">Where its least margin lies, or null.</param>
/// <param name="Margin">Its margin in <paramref name="Unit"/>, or null.</param>
/// <param name="Unit">The margin's unit.</param>
public sealed record PinnedWorst(string Criterion, double? FrequencyHz, double? Margin, string Unit);

/// <summary>A run that is kept and does not count.</summary>
/// <param name="ConditionId">The condition.</param>
/// <param name="RunId">The run.</param>
/// <param name="Standing">Why it does not count.</param>
/// <param name="Cause">The assignable cause of an invalidated run; null for a retest.</param>
/// <param name="Reason">The reason given for an invalidation, or why the retest does not count.</param>
/// <param name="FilesSha256">SHA-256 of each file, in the run's order.</param>
/// <param name="MeasuredAt">When it was measured.</param>
/// <param name="ReceivedAt">When it was received.</param>
public sealed record OtherRun(
    Guid ConditionId,
    Guid RunId,
    OtherRunStanding Standing,
    string? Cause,
    string Reason,
    IReadOnlyList<byte[]> FilesSha256,
    DateTimeOffset MeasuredAt,
    DateTimeOffset ReceivedAt);

/// <summary>Why a run does not count.</summary>
public enum OtherRunStanding
{
    /// <summary>An earlier run of the unit in the condition counts.</summary>
    Retest = 1,

    /// <summary>An engineer found an assignable cause.</summary>
    Invalidated = 2,
}

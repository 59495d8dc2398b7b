using ResponseLedger.Records.Verdicts;

namespace ResponseLedger.Store.Queries;

/// <summary>A run with everything that a list shows of it: where it belongs now, how it was read, whether it counts, its verdict.</summary>
/// <param name="Id">The run.</param>
/// <param name="ReceivedNo">Its order of receipt.</param>
/// <param name="Place">Where it belongs now.</param>
/// <param name="Purpose">What it is for.</param>
/// <param name="MeasuredAt">When it was measured.</param>
/// <param name="ReceivedAt">When it was received.</param>
/// <param name="ReceivedBy">Name of the person or token that sent it.</param>
/// <param name="Files">JSON text: <c>[{name, size, sha256}]</c>, in order.</param>
/// <param name="Circumstances">JSON text, or null.</param>
/// <param name="Reading">The reading in force.</param>
/// <param name="Standing">A word of <see cref="RunStandings"/>.</param>
/// <param name="Invalidation">Why it does not count any more, or null.</param>
/// <param name="Reassignments">How often it was reassigned.</param>
/// <param name="HasMask">Whether there is a mask to judge it by; without a verdict it is then pending.</param>
/// <param name="BasisId">The basis of the verdict; null without one.</param>
/// <param name="Verdict">The verdict on the basis that holds: the current one, or the one that the lot's decision pinned.</param>
public sealed record RunHead(
    Guid Id,
    long ReceivedNo,
    RunPlace Place,
    string Purpose,
    DateTimeOffset MeasuredAt,
    DateTimeOffset ReceivedAt,
    string? ReceivedBy,
    string Files,
    string? Circumstances,
    RunReading Reading,
    string Standing,
    RunInvalidationHead? Invalidation,
    int Reassignments,
    bool HasMask,
    Guid? BasisId,
    StoredVerdict? Verdict);

/// <summary>Where a run belongs.</summary>
public sealed record RunPlace(
    Guid DeviceId, string PartNumber, string Revision, Guid ConditionId, string Condition, Guid UnitId, string Serial,
    Guid? LotId, string? LotNumber, Guid BenchId, string Bench);

/// <summary>How a run was read.</summary>
/// <param name="Id">The reading.</param>
/// <param name="Number">Its number.</param>
/// <param name="Reader">Which reader.</param>
/// <param name="ReaderVersion">Its version.</param>
/// <param name="Columns">JSON text of the columns used, or null.</param>
/// <param name="Notes">JSON text: <c>[{code, message}]</c>.</param>
/// <param name="Form">The number of the sweep's form.</param>
/// <param name="Points">Number of points.</param>
/// <param name="FromHz">The lowest frequency in Hz.</param>
/// <param name="ToHz">The highest frequency in Hz.</param>
public sealed record RunReading(
    Guid Id, int Number, string Reader, int ReaderVersion, string? Columns, string Notes, short Form, int Points, double FromHz, double ToHz);

/// <summary>An invalidation as it is shown.</summary>
public sealed record RunInvalidationHead(string Cause, string Reason, DateTimeOffset At, string? By);

/// <summary>Whether a run counts, in words.</summary>
public static class RunStandings
{
    /// <summary>The production run that the unit is judged by.</summary>
    public const string Counting = "counting";

    /// <summary>A valid production run behind an earlier one.</summary>
    public const string Retest = "retest";

    /// <summary>A retest beyond the number that the device lets come to count.</summary>
    public const string RetestsUsedUp = "retestsUsedUp";

    /// <summary>An engineer found an assignable cause.</summary>
    public const string Invalidated = "invalidated";

    /// <summary>A run for another purpose.</summary>
    public const string NotProduction = "notProduction";
}

/// <summary>Which runs a list is asked for; null for all.</summary>
/// <param name="Device">Id, part number or <c>PART/REV</c>.</param>
/// <param name="Lot">Id or number of the lot that they belong to now.</param>
/// <param name="Serial">Serial number of the unit that they belong to now.</param>
/// <param name="Bench">Id or name.</param>
/// <param name="FromMeasuredAt">Measured then or later.</param>
/// <param name="ToMeasuredAt">Measured before.</param>
/// <param name="Outcome">Number of the verdict's outcome.</param>
/// <param name="Purpose">What they are for.</param>
/// <param name="Condition">Id or name.</param>
/// <param name="Id">One run alone.</param>
public sealed record RunFilter(
    string? Device = null, string? Lot = null, string? Serial = null, string? Bench = null, DateTimeOffset? FromMeasuredAt = null,
    DateTimeOffset? ToMeasuredAt = null, short? Outcome = null, string? Purpose = null, string? Condition = null, Guid? Id = null);

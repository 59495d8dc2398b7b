using ResponseLedger.Engine.Masks;
using ResponseLedger.Records.Masks;
using ResponseLedger.Store.Queries;

namespace ResponseLedger.Server.Lots;

/// <summary>A lot as lists and pages show it. Of a decided lot everything but the device's title is what the decision pinned.</summary>
/// <param name="Id">The lot.</param>
/// <param name="DeviceId">Its device.</param>
/// <param name="PartNumber">Part number of the device.</param>
/// <param name="Revision">Revision of the device.</param>
/// <param name="Title">Title of the device.</param>
/// <param name="Number">The lot's number.</param>
/// <param name="Size">Units that the lot has.</param>
/// <param name="State">open, approved, approvedWithConcession or rejected.</param>
/// <param name="Counts">How many units stand how.</param>
/// <param name="MaskRevision">Number of the mask revision of the first condition, or null.</param>
/// <param name="GoldenRunId">Golden run of the first condition, or null.</param>
/// <param name="Conditions">Every condition with its mask revision and golden run.</param>
/// <param name="Stale">Verdicts that are pending after a new release or golden run.</param>
/// <param name="Blockers">What stands against a plain approval now.</param>
/// <param name="Decision">The decision in force, or null while the lot is open.</param>
/// <param name="CreatedAt">When the lot was opened.</param>
/// <param name="FirstPass">What it came to at the first try, whatever was invalidated since.</param>
/// <param name="Worst">The worst criterion of its worst unit, or null while nothing is judged.</param>
/// <param name="LastRunAt">When its last production run was received, or null.</param>
internal sealed record LotView(
    Guid Id,
    Guid DeviceId,
    string PartNumber,
    string Revision,
    string Title,
    string Number,
    int Size,
    string State,
    LotCountsView Counts,
    int? MaskRevision,
    Guid? GoldenRunId,
    IReadOnlyList<LotConditionView> Conditions,
    int Stale,
    IReadOnlyList<Blocker> Blockers,
    LotDecisionView? Decision,
    DateTimeOffset CreatedAt,
    FirstPassView FirstPass,
    LotWorstView? Worst,
    DateTimeOffset? LastRunAt)
{
    public static LotView Of(LotHead lot, IReadOnlyDictionary<Guid, MaskDocument> masks)
    {
        var first = lot.Conditions.Count > 0 ? lot.Conditions[0] : null;
        return new LotView(
            lot.Id,
            lot.DeviceId,
            lot.PartNumber,
            lot.Revision,
            lot.Title,
            lot.Number,
            lot.Size,
            LotStates.After(lot.Decision?.Kind),
            LotCountsView.Of(lot.Tally),
            first?.MaskRevision,
            first?.GoldenRunId,
            [.. lot.Conditions.Select(c => new LotConditionView(c.Id, c.Name, c.MaskRevision, c.GoldenRunId))],
            lot.Tally.Stale,
            ApprovalBlockers.Of(lot),
            lot.Decision is { } decision ? LotDecisionView.Of(decision) : null,
            lot.CreatedAt,
            new FirstPassView(lot.FirstPass.Tested, lot.FirstPass.Passed),
            LotWorst.Of(lot, masks),
            lot.LastRunAt);
    }
}

/// <summary>Units with a run in every condition, and those whose first run passes in every condition.</summary>
internal sealed record FirstPassView(int Tested, int Passed);

/// <summary>The worst criterion of the worst unit of a lot.</summary>
internal sealed record LotWorstView(string Serial, Guid RunId, string Criterion, Outcome Outcome, double? FrequencyHz, double? Margin, string Unit);

/// <summary>How many units of a lot stand how. A unit is counted by its outcome, and once more where it is withdrawn or conceded.</summary>
internal sealed record LotCountsView(int Units, int Tested, int Passed, int Failed, int Inconclusive, int Withdrawn, int Retests, int Conceded)
{
    public static LotCountsView Of(LotTally tally)
        => new(tally.Units, tally.Tested, tally.Passed, tally.Failed, tally.Inconclusive, tally.Withdrawn, tally.Retests, tally.Conceded);
}

/// <summary>A condition of the lot's device and what its runs are judged by.</summary>
internal sealed record LotConditionView(Guid Id, string Name, int? MaskRevision, Guid? GoldenRunId);

/// <summary>The decision in force, without its record.</summary>
internal sealed record LotDecisionView(
    Guid Id, string Decision, int Ordinal, string Reason, SignerView SignedBy, string Meaning, DateTimeOffset SignedAt, string Sha256)
{
    public static LotDecisionView Of(DecisionHead decision) => new(
        decision.Id,
        decision.Kind,
        decision.Ordinal,
        decision.Reason,
        new SignerView(decision.SignerId, decision.SignerName, decision.SignerEmail),
        decision.Meaning,
        decision.SignedAt,
        Convert.ToHexStringLower(decision.Sha256));
}

/// <summary>Who signed, as named at that time.</summary>
internal sealed record SignerView(Guid Id, string Name, string Email);

/// <summary>The worst criterion, as lists show it.</summary>
/// <param name="Criterion">Name of the limit or requirement.</param>
/// <param name="Outcome">Its outcome.</param>
/// <param name="FrequencyHz">Where its least margin lies, or null.</param>
/// <param name="Margin">Its margin in <paramref name="Unit"/>, positive inside, or null.</param>
/// <param name="Unit">dB, deg, s, Hz, dB/decade or 1.</param>
internal sealed record WorstView(string Criterion, Outcome Outcome, double? FrequencyHz, double? Margin, string Unit);

/// <summary>A unit of a lot.</summary>
/// <param name="UnitId">The unit.</param>
/// <param name="Serial">Its serial number.</param>
/// <param name="RunId">The counting run in the condition that decides, or null where the unit has none.</param>
/// <param name="Runs">Production runs in the lot, those that do not count included.</param>
/// <param name="Outcome">Fail beats inconclusive beats not yet judged (null).</param>
/// <param name="Worst">The worst criterion of that run.</param>
/// <param name="Disposition">The disposition in force, or null.</param>
/// <param name="Conditions">The outcome in every condition.</param>
/// <param name="Retests">Runs that do not count because an earlier one does.</param>
/// <param name="Invalidated">Runs that were invalidated.</param>
internal sealed record UnitView(
    Guid UnitId,
    string Serial,
    Guid? RunId,
    int Runs,
    Outcome? Outcome,
    WorstView? Worst,
    DispositionView? Disposition,
    IReadOnlyList<UnitConditionView> Conditions,
    int Retests,
    int Invalidated);

/// <summary>A disposition in force: rework, scrap, return or concession, and why.</summary>
internal sealed record DispositionView(string Disposition, string Reason);

/// <summary>A unit in one condition; without a counting run all but the condition is null.</summary>
internal sealed record UnitConditionView(Guid ConditionId, string Name, Guid? RunId, Outcome? Outcome, WorstView? Worst);

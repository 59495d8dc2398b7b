using ResponseLedger.Engine.Masks;

namespace ResponseLedger.Store.Queries;

/// <summary>A lot with everything that a list shows of it.</summary>
/// <param name="Id">The lot.</param>
/// <param name="DeviceId">Its device.</param>
/// <param name="PartNumber">Part number of the device.</param>
/// <param name="Revision">Revision of the device.</param>
/// <param name="Title">Title of the device now.</param>
/// <param name="Number">The lot's number.</param>
/// <param name="Size">Units that the lot has.</param>
/// <param name="CreatedAt">When it was opened.</param>
/// <param name="Decision">The decision in force, or null while the lot is open.</param>
/// <param name="Conditions">The device's conditions in their order; of a decided lot those that were pinned.</param>
/// <param name="Tally">The counts.</param>
/// <param name="NeedsTwoSigners">Whether the device asks for two signers.</param>
/// <param name="FirstPass">What it came to at the first try.</param>
/// <param name="Worst">The least margin of each criterion that was the worst of a counting run; the scales of the mask tell which is the lot's worst.</param>
/// <param name="LastRunAt">When its last production run was received; null while it has none.</param>
public sealed record LotHead(
    Guid Id,
    Guid DeviceId,
    string PartNumber,
    string Revision,
    string Title,
    string Number,
    int Size,
    DateTimeOffset CreatedAt,
    DecisionHead? Decision,
    IReadOnlyList<LotCondition> Conditions,
    LotTally Tally,
    bool NeedsTwoSigners,
    FirstPass FirstPass,
    IReadOnlyList<LotMargin> Worst,
    DateTimeOffset? LastRunAt);

/// <summary>The least margin of a lot in one criterion of a mask, among the runs for which that criterion is the worst.</summary>
/// <param name="BasisId">What the runs are judged by.</param>
/// <param name="Outcome">Their outcome, as the number of <see cref="Engine.Masks.Outcome"/>.</param>
/// <param name="WorstIndex">The criterion.</param>
/// <param name="Margin">Its least margin, or null.</param>
/// <param name="FrequencyHz">Where it lies, or null.</param>
/// <param name="Serial">The unit.</param>
/// <param name="RunId">The run.</param>
public sealed record LotMargin(Guid BasisId, short Outcome, int WorstIndex, double? Margin, double? FrequencyHz, string Serial, Guid RunId);

/// <summary>A decision without its record.</summary>
public sealed record DecisionHead(
    Guid Id,
    int Ordinal,
    string Kind,
    string Reason,
    DateTimeOffset SignedAt,
    Guid SignerId,
    string SignerName,
    string SignerEmail,
    string Meaning,
    byte[] Sha256);

/// <summary>A condition and what its runs are judged by: now, or as pinned by the decision.</summary>
/// <param name="Id">The condition.</param>
/// <param name="Name">Its name.</param>
/// <param name="MaskId">The mask revision; null where none is released.</param>
/// <param name="MaskRevision">Its number.</param>
/// <param name="GoldenRunId">The golden run, or null.</param>
/// <param name="GoldenReadingId">Its reading.</param>
public sealed record LotCondition(Guid Id, string Name, Guid? MaskId, int? MaskRevision, Guid? GoldenRunId, Guid? GoldenReadingId);

/// <summary>How many units of a lot stand how.</summary>
/// <param name="Units">Units that were declared or have runs.</param>
/// <param name="Tested">Units with a counting run in every condition.</param>
/// <param name="Passed">Units that pass every condition.</param>
/// <param name="Failed">Units that fail in a condition.</param>
/// <param name="Inconclusive">Units that do not fail and could not be decided in a condition.</param>
/// <param name="Withdrawn">Units under rework, scrap or return.</param>
/// <param name="Retests">Runs that are stored and do not count.</param>
/// <param name="Cleared">Units that pass or are withdrawn.</param>
/// <param name="Conceded">Units that do not pass and are under concession.</param>
/// <param name="Stale">Counting runs whose verdict on the basis in force is pending.</param>
/// <param name="Unsent">Units that were declared, have no run and are withdrawn: serial numbers declared by mistake, or units lost before the test.</param>
public sealed record LotTally(
    int Units, int Tested, int Passed, int Failed, int Inconclusive, int Withdrawn, int Retests, int Cleared, int Conceded, int Stale, int Unsent)
{
    /// <summary>Units beyond a lot's size that no withdrawn declaration without a run explains.</summary>
    public int Beyond(int size) => Math.Max(0, Units - Unsent - size);

    /// <summary>Units of the lot's size that pass or are withdrawn; declarations beyond the size that never had a run stand for no unit.</summary>
    public int ClearedOf(int size) => Cleared - Math.Min(Unsent, Math.Max(0, Units - size));

    /// <summary>The same counts out of the rows of the units.</summary>
    public static LotTally Of(IReadOnlyCollection<UnitStanding> units)
    {
        ArgumentNullException.ThrowIfNull(units);
        return new LotTally(
            units.Count,
            units.Count(u => u.IsTested),
            units.Count(u => u.Passes),
            units.Count(u => u.Outcome is Outcome.Fail or Outcome.ConditionalFail),
            units.Count(u => u.Outcome is Outcome.Inconclusive),
            units.Count(u => u.IsWithdrawn),
            units.Sum(u => u.Retests),
            units.Count(u => u.Passes || u.IsWithdrawn),
            units.Count(u => u.Disposition?.Kind == UnitDispositionInForce.Concession),
            units.Sum(u => u.Stale),
            units.Count(u => u.Runs == 0 && u.IsWithdrawn));
    }
}

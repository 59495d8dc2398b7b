using ResponseLedger.Ledger;
using ResponseLedger.Records.Decisions;
using ResponseLedger.Records.Masks;
using ResponseLedger.Records.Verdicts;
using ResponseLedger.Server.Lots;
using ResponseLedger.Store.Model;
using ResponseLedger.Store.Queries;

namespace ResponseLedger.Server.SignOff;

/// <summary>Puts together what a decision pins: every run with its files, reading and verdict, mask, golden run, rule and engine version.</summary>
/// <param name="Lot">The lot.</param>
/// <param name="Ordinal">The decision's number in the lot.</param>
/// <param name="Standing">How its units stand.</param>
/// <param name="Evidence">Runs, files and digests.</param>
/// <param name="Masks">The masks of the verdicts, by basis.</param>
internal sealed record DecisionDraft(Lot Lot, int Ordinal, LotStanding Standing, DecisionEvidence Evidence, Dictionary<Guid, MaskDocument> Masks)
{
    private const string RetestReason = "A run of the unit in this condition that was received earlier counts.";

    /// <summary>The one decision rule of this version.</summary>
    public static readonly DecisionRule SimpleAcceptance = new(
        "simpleAcceptance",
        "Simple acceptance: a margin of zero or more passes, and the measurement's uncertainty is not added. At the limit itself the risk of accepting falsely is up to 50 % (ILAC-G8:09/2019, 4.2).");

    public DecisionRecord Sign(Guid decisionId, DecisionWord word, string reason, Signer signer, DateTimeOffset at, Recommendation recommendation)
    {
        var tally = Standing.Tally;
        var runs = Evidence.Runs.ToDictionary(r => r.RunId);
        var others = Evidence.Runs.ToLookup(r => r.UnitId);
        return new DecisionRecord(
            decisionId,
            new DecidedLot(Lot.Id, Lot.Number, Lot.Size, Ordinal),
            new DecidedDevice(Evidence.Device.Id, Evidence.Device.PartNumber, Evidence.Device.Revision, Evidence.Device.Kind),
            word,
            reason,
            signer,
            MeaningOf(word),
            Microseconds.Cut(at),
            Judge.EngineVersion,
            SimpleAcceptance,
            [.. Standing.Conditions.Select(Pin)],
            [.. Standing.Units.Select(u => Pin(u, runs, others[u.UnitId]))],
            new DecisionCounts(tally.Units, tally.Tested, tally.Passed, tally.Failed, tally.Inconclusive, tally.Withdrawn, tally.Retests),
            recommendation);
    }

    /// <summary>The rows that tie the decision to what it rests on.</summary>
    public IEnumerable<DecisionVerdict> Rows(Guid decisionId)
        => from unit in Standing.Units
           from run in unit.Counting
           select new DecisionVerdict
           {
               DecisionId = decisionId,
               UnitId = unit.UnitId,
               ConditionId = run.ConditionId,
               RunId = run.RunId,
               ReadingId = run.ReadingId,
               VerdictId = run.VerdictId,
           };

    /// <summary>What the signature under a decision means (21 CFR 11.50).</summary>
    public static string MeaningOf(DecisionWord word) => word switch
    {
        DecisionWord.Approve => "I have reviewed the evidence of this lot and approve the lot for release.",
        DecisionWord.ApproveWithConcession => "I have reviewed the evidence of this lot and approve the lot for release under the concessions named in this record.",
        _ => "I have reviewed the evidence of this lot and reject the lot: it may not be released.",
    };

    private DecidedCondition Pin(LotCondition condition) => new(
        condition.Id,
        condition.Name,
        condition.MaskId is { } mask ? new PinnedMask(mask, condition.MaskRevision!.Value, Evidence.MaskSha256[mask]) : null,
        condition is { GoldenRunId: { } golden, GoldenReadingId: { } reading } ? new PinnedGolden(golden, reading, Evidence.GoldenFilesSha256[golden]) : null);

    private DecidedUnit Pin(UnitStanding unit, Dictionary<Guid, LotRun> runs, IEnumerable<LotRun> all)
    {
        var counting = unit.Counting.Select(r => r.RunId).ToHashSet();
        return new DecidedUnit(
            unit.UnitId,
            unit.Serial,
            unit.Outcome,
            unit.Disposition is { } disposition ? new UnitDisposition(disposition.Kind, disposition.Reason) : null,
            [.. unit.Counting.Select(r => Pin(r, runs[r.RunId]))],
            [.. all.Where(r => !counting.Contains(r.RunId)).Select(Pin)]);
    }

    private CountingRun Pin(CountingRunRow run, LotRun row)
    {
        var worst = LotUnits.WorstOf(run, Masks);
        return new CountingRun(
            run.ConditionId,
            run.RunId,
            run.ReadingId,
            run.VerdictId,
            row.FilesSha256,
            run.Verdict?.Outcome,
            worst is null ? null : new PinnedWorst(worst.Criterion, worst.FrequencyHz, worst.Margin, worst.Unit),
            run.MeasuredAt,
            run.ReceivedAt);
    }

    private static OtherRun Pin(LotRun run) => new(
        run.ConditionId,
        run.RunId,
        run.IsInvalidated ? OtherRunStanding.Invalidated : OtherRunStanding.Retest,
        run.Cause,
        run.Reason ?? RetestReason,
        run.FilesSha256,
        run.MeasuredAt,
        run.ReceivedAt);
}

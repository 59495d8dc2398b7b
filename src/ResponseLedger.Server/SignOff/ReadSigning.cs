using System.Security.Claims;
using Microsoft.AspNetCore.Http.HttpResults;
using Microsoft.EntityFrameworkCore;
using ResponseLedger.Engine.Masks;
using ResponseLedger.Records.Decisions;
using ResponseLedger.Records.Verdicts;
using ResponseLedger.Server.Http;
using ResponseLedger.Server.Lots;
using ResponseLedger.Server.People;
using ResponseLedger.Store;
using ResponseLedger.Store.Queries;

namespace ResponseLedger.Server.SignOff;

/// <summary>What a decision on an open lot would pin and mean if it were signed now.</summary>
/// <param name="LotId">The lot.</param>
/// <param name="Ordinal">The number that the decision would have.</param>
/// <param name="PartNumber">Part number of the device.</param>
/// <param name="Revision">Revision of the device.</param>
/// <param name="Number">The lot's number.</param>
/// <param name="Size">Units that the lot has.</param>
/// <param name="Counts">How many units stand how.</param>
/// <param name="Invalidated">Runs that do not count because they were invalidated.</param>
/// <param name="Conditions">Every condition with mask revision and golden run.</param>
/// <param name="Dispositions">Units that are withdrawn or under concession.</param>
/// <param name="Engine">The engine version of all verdicts.</param>
/// <param name="Rule">The decision rule with its risk.</param>
/// <param name="Recommendation">What the server recommends; it stands in the record.</param>
/// <param name="Choices">Each decision: what signing it means, and what stands against it.</param>
/// <param name="AgainstSigner">Why the person who asks may not sign for this lot, or null.</param>
/// <param name="Seen">A digest over all of this: sent back with the decision, it refuses one for a lot that has changed since.</param>
internal sealed record SigningView(
    Guid LotId,
    int Ordinal,
    string PartNumber,
    string Revision,
    string Number,
    int Size,
    LotCountsView Counts,
    int Invalidated,
    IReadOnlyList<SigningConditionView> Conditions,
    IReadOnlyList<SigningUnitView> Dispositions,
    int Engine,
    DecisionRule Rule,
    RecommendationView Recommendation,
    IReadOnlyList<SigningChoiceView> Choices,
    string? AgainstSigner,
    string Seen);

/// <summary>A condition, its mask revision and its golden run; null where there is none.</summary>
internal sealed record SigningConditionView(Guid ConditionId, string Name, int? MaskRevision, string? MaskSha256, Guid? GoldenRunId, string? GoldenSerial);

/// <summary>A unit with a disposition in force.</summary>
internal sealed record SigningUnitView(Guid UnitId, string Serial, Outcome? Outcome, string Disposition, string Reason);

/// <summary>What the server recommends: approve, approveWithConcession or reject.</summary>
internal sealed record RecommendationView(string? Decision, string Sentence);

/// <summary>A decision that might be signed.</summary>
internal sealed record SigningChoiceView(string Decision, string Meaning, IReadOnlyList<Blocker> Blockers);

/// <summary>Shows what a signer is about to sign.</summary>
internal static class ReadSigning
{
    private static readonly DecisionWord[] words = [DecisionWord.Approve, DecisionWord.ApproveWithConcession, DecisionWord.Reject];

    public static async Task<Ok<SigningView>> GetAsync(Guid id, ClaimsPrincipal user, ResponseLedgerContext db, CancellationToken cancellationToken)
    {
        var lot = await db.Lots.AsNoTracking().SingleOrDefaultAsync(l => l.Id == id, cancellationToken) ?? throw new RefusedException(new NothingThere("lot"));
        if (await LotGate.Standing(db).AnyAsync(d => d.LotId == id, cancellationToken))
            throw new RefusedException(new LotDecided(lot.Number));

        var setting = await SigningRules.SettingOfLotAsync(db, id, cancellationToken);
        var standing = await LotStanding.ReadAsync(db, id, cancellationToken);
        var evidence = await DecisionEvidence.ReadAsync(db, lot, standing, cancellationToken);
        var ordinal = await db.Decisions.CountAsync(d => d.LotId == id, cancellationToken) + 1;
        var serials = await GoldenSerialsAsync(db, standing, cancellationToken);
        var recommendation = SigningRules.Recommend(lot, standing, setting);
        return TypedResults.Ok(new SigningView(
            id,
            ordinal,
            evidence.Device.PartNumber,
            evidence.Device.Revision,
            lot.Number,
            lot.Size,
            LotCountsView.Of(standing.Tally),
            evidence.Runs.Count(r => r.IsInvalidated),
            [.. standing.Conditions.Select(c => new SigningConditionView(
                c.Id,
                c.Name,
                c.MaskRevision,
                c.MaskId is { } mask ? Convert.ToHexStringLower(evidence.MaskSha256[mask]) : null,
                c.GoldenRunId,
                c.GoldenRunId is { } golden ? serials[golden] : null))],
            [.. from unit in standing.Units
                where unit.Disposition is not null
                select new SigningUnitView(unit.UnitId, unit.Serial, unit.Outcome, unit.Disposition!.Kind, unit.Disposition.Reason)],
            Judge.EngineVersion,
            DecisionDraft.SimpleAcceptance,
            new RecommendationView(recommendation.Decision is { } word ? DecisionWords.Format(word) : null, recommendation.Sentence),
            [.. words.Select(w => new SigningChoiceView(DecisionWords.Format(w), DecisionDraft.MeaningOf(w), SigningRules.Against(w, lot, standing, setting)))],
            SigningRules.AgainstSigner(setting, user, CurrentActor.Of(user).Id, evidence)?.Sentence,
            EvidenceDigest.Of(lot, ordinal, standing, evidence)));
    }

    private static async Task<Dictionary<Guid, string>> GoldenSerialsAsync(ResponseLedgerContext db, LotStanding standing, CancellationToken cancellationToken)
    {
        var golden = standing.Conditions.Select(c => c.GoldenRunId).OfType<Guid>().ToArray();
        return await (
            from run in db.Runs.Where(r => golden.Contains(r.Id))
            let unitId = db.RunAssignments.Where(a => a.RunId == run.Id).OrderByDescending(a => a.Number).Select(a => a.UnitId).First()
            join unit in db.Units on unitId equals unit.Id
            select new { run.Id, unit.Serial }).ToDictionaryAsync(r => r.Id, r => r.Serial, cancellationToken);
    }
}

using Microsoft.EntityFrameworkCore;
using Microsoft.Extensions.Logging;
using ResponseLedger.Engine;
using ResponseLedger.Engine.Masks;
using ResponseLedger.Records.Verdicts;
using ResponseLedger.Store.Curves;
using ResponseLedger.Store.Model;
using ResponseLedger.Store.Queries;

namespace ResponseLedger.Store.Judging;

/// <summary>A run's verdict in full, on the basis that holds for it.</summary>
/// <param name="Basis">What it was judged by.</param>
/// <param name="Evaluation">Every criterion: the stored numbers where they are stored, with the prose rebuilt.</param>
/// <param name="EngineVersion">The engine version that computed the numbers.</param>
/// <param name="Pinned">Whether a decision rests on this basis; it can then no longer change.</param>
/// <param name="Stored">Whether the verdict is in the store already; otherwise it was computed just now and is about to be.</param>
public sealed record RunVerdict(JudgementBasis Basis, Evaluation Evaluation, int EngineVersion, bool Pinned, bool Stored);

/// <summary>
/// Rebuilds a run's verdict: an open lot's run on the current basis, a decided lot's on the basis that was signed. The numbers
/// are those that are stored; where a recomputation on the same engine version gives others, that is an alarm, not an answer.
/// </summary>
public sealed partial class RunVerdicts(IDbContextFactory<ResponseLedgerContext> contexts, JudgingMaterial material, ILogger<RunVerdicts> log)
{
    // Room for the last digits, which another processor's summation may round otherwise.
    private const double RelativeRounding = 1e-9;

    /// <summary>The basis that holds for a run, or null where no mask was released. The run must exist.</summary>
    public async Task<Guid?> BasisOfAsync(Guid runId, CancellationToken cancellationToken)
    {
        await using var db = await contexts.CreateDbContextAsync(cancellationToken);
        return await BasisOfAsync(db, await PlaceAsync(db, runId, cancellationToken), cancellationToken);
    }

    /// <summary>The verdict, or null where no mask was released. The run must exist.</summary>
    public async Task<RunVerdict?> OfAsync(Guid runId, CancellationToken cancellationToken)
    {
        await using var db = await contexts.CreateDbContextAsync(cancellationToken);
        var place = await PlaceAsync(db, runId, cancellationToken);
        if (await BasisOfAsync(db, place, cancellationToken) is not { } id)
            return null;

        var stored = await (
            from basis in db.Bases
            where basis.Id == id
            select new
            {
                basis.EngineVersion,
                Verdict = db.Verdicts.FirstOrDefault(v => v.BasisId == id && v.ReadingId == place.ReadingId && v.UncertaintyId == null),
            }).AsNoTracking().SingleAsync(cancellationToken);
        var sweep = await db.SweepOfAsync(place.ReadingId, cancellationToken)
            ?? throw new InvalidDataException($"The reading {place.ReadingId} has no curve: the store was changed behind the server's back.");
        var judgedBy = await material.OfAsync(id, cancellationToken);
        var rebuilt = Judge.Evaluate(sweep, judgedBy);
        if (stored.Verdict is not { } verdict)
            return new RunVerdict(judgedBy, rebuilt.Evaluation, Judge.EngineVersion, place.DecisionId is not null, Stored: false);

        if (stored.EngineVersion == Judge.EngineVersion && !Agrees(rebuilt.Stored, verdict))
            LogDrift(log, runId, verdict.Id, stored.EngineVersion);
        return new RunVerdict(judgedBy, WithStored(rebuilt.Evaluation, verdict), stored.EngineVersion, place.DecisionId is not null, Stored: true);
    }

    private static async Task<Guid?> BasisOfAsync(ResponseLedgerContext db, Place place, CancellationToken cancellationToken)
        => place.DecisionId is null
            ? (await CurrentBases.FindAsync(db, place.ConditionId, cancellationToken))?.BasisId
            : place.PinnedBasisId;

    private static async Task<Place> PlaceAsync(ResponseLedgerContext db, Guid runId, CancellationToken cancellationToken)
        => await (
            from assignment in db.RunAssignments.Where(a => a.RunId == runId).OrderByDescending(a => a.Number).Take(1)
            let decisionId = LotGate.Standing(db).Where(d => d.LotId == assignment.LotId).Select(d => (Guid?)d.Id).FirstOrDefault()
            select new Place(
                assignment.ConditionId,
                decisionId,
                db.Readings.Where(r => r.RunId == runId).OrderByDescending(r => r.Number).Select(r => r.Id).First(),
                db.DecisionVerdicts
                    .Where(p => p.DecisionId == decisionId && p.ConditionId == assignment.ConditionId && p.VerdictId != null)
                    .Join(db.Verdicts, p => p.VerdictId, v => v.Id, (_, v) => (Guid?)v.BasisId)
                    .FirstOrDefault())).SingleAsync(cancellationToken);

    private static bool Agrees(StoredVerdict rebuilt, Verdict stored)
        => (short)rebuilt.Outcome == stored.Outcome
            && rebuilt.Outcomes.AsSpan().SequenceEqual(stored.Outcomes)
            && rebuilt.Margins.Zip(stored.Margins).All(pair => Agree(pair.First, pair.Second));

    private static bool Agree(double? one, double? other)
        => one is null || other is null
            ? one is null && other is null
            : Math.Abs(one.Value - other.Value) <= RelativeRounding * Math.Max(1, Math.Abs(other.Value));

    private static Evaluation WithStored(Evaluation rebuilt, Verdict stored) => rebuilt with
    {
        Outcome = (Outcome)stored.Outcome,
        WorstIndex = stored.WorstIndex,
        Criteria = [.. rebuilt.Criteria.Select((criterion, i) => criterion with
        {
            Outcome = (Outcome)stored.Outcomes[i],
            Margin = stored.Margins[i],
            FrequencyHz = stored.FrequenciesHz[i],
            Reason = ReasonOf(criterion, stored.Reasons[i]),
        })],
    };

    // The sentence belongs to its code; a code that is not found again stands without one.
    private static Absence? ReasonOf(CriterionResult rebuilt, string? code)
        => code is null ? null : rebuilt.Reason?.Code == code ? rebuilt.Reason : new Absence(code, string.Empty);

    [LoggerMessage(
        Level = LogLevel.Error,
        Message = "The verdict {VerdictId} of run {RunId} comes out differently when it is computed again on the same engine version {EngineVersion}. The stored numbers are shown. Raise the engine version, or find what changed the store.")]
    private static partial void LogDrift(ILogger log, Guid runId, Guid verdictId, int engineVersion);

    private sealed record Place(Guid ConditionId, Guid? DecisionId, Guid ReadingId, Guid? PinnedBasisId);
}

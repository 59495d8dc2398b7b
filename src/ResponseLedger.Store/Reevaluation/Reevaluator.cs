using System.Collections.Concurrent;
using System.Text.Json.Nodes;
using Microsoft.EntityFrameworkCore;
using Microsoft.Extensions.Logging;
using ResponseLedger.Engine.Sweeps;
using ResponseLedger.Ledger;
using ResponseLedger.Records.Verdicts;
using ResponseLedger.Store.Acts;
using ResponseLedger.Store.Curves;
using ResponseLedger.Store.Judging;
using ResponseLedger.Store.Queries;

namespace ResponseLedger.Store.Reevaluation;

/// <summary>
/// Evaluates the runs of open lots again when what they are judged by has changed: batch after batch, straight from the store's
/// curves, on all cores. It may be stopped anywhere; each batch is an act of its own with its entry in the ledger.
/// </summary>
public sealed class Reevaluator(
    IDbContextFactory<ResponseLedgerContext> contexts, ActRunner acts, JudgingMaterial material, TimeProvider time, ILogger<Reevaluator> log) : IDisposable
{
    /// <summary>Most readings in a batch.</summary>
    public const int BatchSize = 200;

    /// <summary>Most points in a batch: 16 bytes a point keep its curves within some 32 MB.</summary>
    private const int BatchPoints = 2_000_000;

    // One batch at a time in this process: a request and the background then never evaluate the same reading twice.
    private readonly SemaphoreSlim oneBatch = new(1);

    /// <summary>Evaluates a condition's stale readings until none is left or the time is up; returns how many are left.</summary>
    /// <param name="conditionId">The condition.</param>
    /// <param name="longest">When to stop; null for never. A batch that would probably not be done in time is not begun.</param>
    /// <param name="cancellationToken">Stops between batches, or within one, which is then not kept.</param>
    public async Task<int> SweepAsync(Guid conditionId, TimeSpan? longest, CancellationToken cancellationToken)
    {
        await using var db = await contexts.CreateDbContextAsync(cancellationToken);
        if (await CurrentBases.FindAsync(db, conditionId, cancellationToken) is not { } basis)
            return 0;

        var began = time.GetTimestamp();
        var longestBatch = TimeSpan.Zero;
        var after = Guid.Empty;
        while (longest is null || time.GetElapsedTime(began) + longestBatch < longest)
        {
            var batchBegan = time.GetTimestamp();
            var last = await BatchAsync(basis, after, longest - time.GetElapsedTime(began), cancellationToken);
            if (last is null)
                break;
            after = last.Value;
            longestBatch = TimeSpan.FromTicks(Math.Max(longestBatch.Ticks, time.GetElapsedTime(batchBegan).Ticks));
        }

        return await StaleReadings.Of(db, basis.BasisId).CountAsync(cancellationToken);
    }

    /// <summary>Makes the bases that a newer engine lacks, then evaluates everything that is stale; returns how many readings are left.</summary>
    public async Task<int> SweepAllAsync(CancellationToken cancellationToken)
    {
        foreach (var missing in (await InForceAsync(cancellationToken)).Where(b => b.BasisId is null))
            await MakeBasisAsync(missing, cancellationToken);

        var left = 0;
        foreach (var (basis, pending) in await PendingAsync(cancellationToken))
        {
            try
            {
                left += await SweepAsync(basis.ConditionId, null, cancellationToken);
            }
            catch (Exception exception) when (exception is not OperationCanceledException)
            {
                // One condition that cannot be evaluated must not keep the others waiting.
                log.LogError(exception, "The runs of condition {ConditionId} could not be evaluated again.", basis.ConditionId);
                left += pending;
            }
        }

        return left;
    }

    /// <summary>The conditions with stale readings, and how many.</summary>
    public async Task<IReadOnlyList<(BasisInForce Basis, int Pending)>> PendingAsync(CancellationToken cancellationToken)
    {
        var inForce = (await InForceAsync(cancellationToken)).Where(b => b.BasisId is not null).ToList();
        await using var db = await contexts.CreateDbContextAsync(cancellationToken);
        var counts = await StaleReadings.CountsAsync(db, [.. inForce.Select(b => b.BasisId!.Value)], cancellationToken);
        return [.. inForce.Where(b => counts.ContainsKey(b.BasisId!.Value)).Select(b => (b, counts[b.BasisId!.Value]))];
    }

    private async Task<List<BasisInForce>> InForceAsync(CancellationToken cancellationToken)
    {
        await using var db = await contexts.CreateDbContextAsync(cancellationToken);
        return await BasesInForce.AllAsync(db, cancellationToken);
    }

    private Task<bool> MakeBasisAsync(BasisInForce missing, CancellationToken cancellationToken)
        => acts.RunAsync(Actor.Server, async (act, token) =>
        {
            await Turn.TakeAsync(act.Db, missing.ConditionId, token);
            var made = await CurrentBases.EnsureAsync(act, missing.ConditionId, token);
            act.Record(
                "basis.made",
                new JsonObject { ["conditionId"] = missing.ConditionId.ToString("D"), ["basisId"] = made?.BasisId.ToString("D") },
                new JsonObject { ["maskRevision"] = made?.MaskRevision, ["engine"] = Judge.EngineVersion });
            return true;
        }, cancellationToken);

    /// <summary>One batch; the id of its last reading, or null when nothing was left or no time to begin.</summary>
    private async Task<Guid?> BatchAsync(CurrentBasis basis, Guid after, TimeSpan? patience, CancellationToken cancellationToken)
    {
        if (!await oneBatch.WaitAsync(Patience(patience), cancellationToken))
            return null;
        try
        {
            await using var db = await contexts.CreateDbContextAsync(cancellationToken);
            var stale = Bounded(await StaleReadings.Of(db, basis.BasisId, after).Take(BatchSize).ToListAsync(cancellationToken));
            if (stale.Count == 0)
                return null;
            var judged = await JudgeAsync(db, basis.BasisId, stale, cancellationToken);
            await KeepAsync(basis, judged, cancellationToken);
            return stale[^1].ReadingId;
        }
        finally
        {
            oneBatch.Release();
        }
    }

    private async Task<List<JudgedReading>> JudgeAsync(ResponseLedgerContext db, Guid basisId, List<StaleReading> stale, CancellationToken cancellationToken)
    {
        var by = await material.OfAsync(basisId, cancellationToken);
        var lots = stale.ToDictionary(s => s.ReadingId, s => s.LotId);
        var ids = lots.Keys.ToList();
        var curves = await (
            from reading in db.Readings
            join curve in db.Curves on reading.Id equals curve.ReadingId
            where ids.Contains(reading.Id)
            select new { reading.Id, reading.Form, reading.GridSha256, reading.NoiseFloorDb, curve.Planes }).AsNoTracking().ToListAsync(cancellationToken);
        var keys = curves.Select(c => Convert.ToHexString(c.GridSha256)).Distinct().Select(Convert.FromHexString).ToList();
        var grids = await db.Grids.AsNoTracking().Where(g => keys.Contains(g.Sha256))
            .ToDictionaryAsync(g => Convert.ToHexString(g.Sha256), g => g.Planes, cancellationToken);

        var judged = new ConcurrentBag<JudgedReading>();
        await Parallel.ForEachAsync(curves, cancellationToken, (curve, _) =>
        {
            try
            {
                var sweep = CurveCodec.Unpack((SweepForm)curve.Form, grids[Convert.ToHexString(curve.GridSha256)], curve.Planes, curve.NoiseFloorDb);
                judged.Add(new JudgedReading(curve.Id, lots[curve.Id], Judge.Evaluate(sweep, by)));
            }
            catch (Exception exception) when (exception is not OperationCanceledException)
            {
                // One reading that cannot be judged must not keep the others waiting; it stays stale, so its lot cannot be approved.
                log.LogError(exception, "Reading {ReadingId} could not be evaluated again on basis {BasisId}.", curve.Id, basisId);
            }

            return ValueTask.CompletedTask;
        });
        return [.. judged.OrderBy(j => j.ReadingId)];
    }

    private async Task KeepAsync(CurrentBasis basis, List<JudgedReading> judged, CancellationToken cancellationToken)
    {
        try
        {
            await acts.RunAsync(Actor.Server, async (act, token) =>
            {
                var open = await StillOpenAsync(act.Db, [.. judged.Select(j => j.LotId).Distinct()], token);
                var kept = judged.Where(j => open.Contains(j.LotId)).ToList();
                var added = await VerdictInsert.RunAsync(act, basis.BasisId, kept, token);
                if (added == 0)
                    throw new NothingNew();
                act.Record(
                    "verdicts.reevaluated",
                    new JsonObject { ["conditionId"] = basis.ConditionId.ToString("D"), ["basisId"] = basis.BasisId.ToString("D") },
                    Told(basis, kept, added));
                return added;
            }, cancellationToken);
        }
        catch (NothingNew)
        {
            // Decided meanwhile, or evaluated by another server: there is nothing to keep and nothing to tell.
        }
    }

    /// <summary>Shares the lots' gate with uploads, so that no decision falls between this look and the commit; gives those that are open.</summary>
    private static async Task<HashSet<Guid>> StillOpenAsync(ResponseLedgerContext db, Guid[] lotIds, CancellationToken cancellationToken)
    {
        await db.Database.ExecuteSqlAsync($"select from lot where id = any({lotIds}) order by id for share", cancellationToken);
        var decided = await LotGate.Standing(db).Where(d => lotIds.Contains(d.LotId)).Select(d => d.LotId).ToListAsync(cancellationToken);
        return [.. lotIds.Except(decided)];
    }

    private static JsonObject Told(CurrentBasis basis, List<JudgedReading> kept, int added) => new()
    {
        ["count"] = added,
        ["maskRevision"] = basis.MaskRevision,
        ["goldenReadingId"] = basis.GoldenReadingId?.ToString("D"),
        ["engine"] = Judge.EngineVersion,
        ["outcomes"] = new JsonObject(kept.GroupBy(j => j.Judgement.Stored.Outcome).OrderBy(g => g.Key)
            .Select(g => KeyValuePair.Create<string, JsonNode?>(OutcomeWords.Format(g.Key), g.Count()))),
    };

    private static List<StaleReading> Bounded(List<StaleReading> stale)
    {
        var points = 0L;
        var kept = stale.TakeWhile(s => (points += s.Points) <= BatchPoints).ToList();
        return kept.Count > 0 ? kept : [.. stale.Take(1)];
    }

    private static TimeSpan Patience(TimeSpan? patience) => patience switch
    {
        null => Timeout.InfiniteTimeSpan,
        { Ticks: < 0 } => TimeSpan.Zero,
        _ => patience.Value,
    };

    /// <inheritdoc/>
    public void Dispose() => oneBatch.Dispose();

    private sealed class NothingNew : Exception;
}

using System.Security.Claims;
using System.Text.Json.Nodes;
using Microsoft.AspNetCore.Http.HttpResults;
using Microsoft.EntityFrameworkCore;
using ResponseLedger.Server.Http;
using ResponseLedger.Server.Masks;
using ResponseLedger.Server.People;
using ResponseLedger.Store;
using ResponseLedger.Store.Acts;
using ResponseLedger.Store.Intake;
using ResponseLedger.Store.Judging;
using ResponseLedger.Store.Model;
using ResponseLedger.Store.Reevaluation;

namespace ResponseLedger.Server.Devices;

/// <summary>A condition's golden run and those before it, newest first.</summary>
internal sealed record GoldenHistory(Guid ConditionId, string Condition, GoldenView? Golden, IReadOnlyList<GoldenView> History);

/// <summary>The golden run as it was set, and how many runs still wait for their verdict by it.</summary>
internal sealed record GoldenSet(Guid DeviceId, Guid ConditionId, string Condition, GoldenView Golden, ReevaluationState Reevaluation);

/// <summary>The golden run of each condition: which one, and how it is chosen.</summary>
internal static class GoldenRuns
{
    public static async Task<Ok<Page<GoldenHistory>>> ListAsync(ResponseLedgerContext db, Guid id, CancellationToken cancellationToken)
    {
        var conditions = await db.Conditions.AsNoTracking().Where(c => c.DeviceId == id).OrderBy(c => c.Ordinal).ToListAsync(cancellationToken);
        if (conditions.Count == 0)
            throw new RefusedException(new NothingThere("device"));
        var golden = await DeviceViews.GoldenAsync(db, [id], inForceOnly: false, cancellationToken);
        return TypedResults.Ok(new Page<GoldenHistory>(
            [.. conditions.Select(c => new GoldenHistory(c.Id, c.Name, golden[c.Id].FirstOrDefault(), [.. golden[c.Id]]))], null));
    }

    public static async Task<Ok<GoldenSet>> SetAsync(
        Guid id, NewGolden request, ClaimsPrincipal user, ActRunner acts, ResponseLedgerContext db, ReevaluationAfterChange reevaluation, CancellationToken cancellationToken)
    {
        var conditionId = await acts.RunAsync(CurrentActor.Of(user), (act, token) => ChooseAsync(act, id, request, token), cancellationToken);
        var state = await reevaluation.RunAsync(conditionId, cancellationToken);
        var golden = await DeviceViews.GoldenAsync(db, [id], inForceOnly: true, cancellationToken);
        var name = await db.Conditions.Where(c => c.Id == conditionId).Select(c => c.Name).SingleAsync(cancellationToken);
        return TypedResults.Ok(new GoldenSet(id, conditionId, name, golden[conditionId].First(), state));
    }

    private static async Task<Guid> ChooseAsync(Act act, Guid deviceId, NewGolden request, CancellationToken cancellationToken)
    {
        if (!await act.Db.Devices.AnyAsync(d => d.Id == deviceId, cancellationToken))
            throw new RefusedException(new NothingThere("device"));
        var run = await (
            from candidate in act.Db.Runs
            where candidate.Id == request.RunId
            select new
            {
                candidate.Id,
                candidate.DeviceId,
                candidate.Purpose,
                Invalidated = act.Db.RunInvalidations.Any(i => i.RunId == candidate.Id),
                Assigned = act.Db.RunAssignments.Where(a => a.RunId == candidate.Id).OrderByDescending(a => a.Number).First(),
                ReadingId = act.Db.Readings.Where(r => r.RunId == candidate.Id).OrderByDescending(r => r.Number).Select(r => r.Id).First(),
            }).AsNoTracking().SingleOrDefaultAsync(cancellationToken)
            ?? throw new RefusedException(new FieldRefused("runId", "There is no run under this id."));
        if (run.DeviceId != deviceId)
            throw new RefusedException(new FieldRefused("runId", "This run is of another device; choose a run of this one."));
        if (run.Purpose is RunPurposes.Through or RunPurposes.Check)
            throw new RefusedException(new FieldRefused("runId", $"This is a {run.Purpose} run, which shows the bench and no unit; choose a golden, production or study run."));
        if (run.Invalidated)
            throw new RefusedException(new GoldenRunInvalidated());

        var conditionId = run.Assigned.ConditionId;
        await Turn.TakeAsync(act.Db, conditionId, cancellationToken);
        var before = await act.Db.GoldenChoices.AsNoTracking().Where(g => g.ConditionId == conditionId)
            .OrderByDescending(g => g.Number).FirstOrDefaultAsync(cancellationToken);
        var reason = request.Reason!.Trim();
        act.Db.Add(new GoldenChoice
        {
            Id = act.NewId(),
            DeviceId = deviceId,
            ConditionId = conditionId,
            Number = (before?.Number ?? 0) + 1,
            RunId = run.Id,
            ReadingId = run.ReadingId,
            Reason = reason,
            At = act.At,
            ById = act.ById,
        });
        act.Record(
            "golden.set",
            new JsonObject { ["deviceId"] = deviceId.ToString("D"), ["conditionId"] = conditionId.ToString("D"), ["runId"] = run.Id.ToString("D") },
            new JsonObject
            {
                ["readingId"] = run.ReadingId.ToString("D"),
                ["unitId"] = run.Assigned.UnitId.ToString("D"),
                ["reason"] = reason,
                ["before"] = before is null ? null : new JsonObject { ["runId"] = before.RunId.ToString("D"), ["readingId"] = before.ReadingId.ToString("D") },
            });
        await CurrentBases.EnsureAsync(act, conditionId, cancellationToken);
        return conditionId;
    }
}

using System.Security.Claims;
using System.Text.Json.Nodes;
using Microsoft.AspNetCore.Http.HttpResults;
using Microsoft.EntityFrameworkCore;
using ResponseLedger.Records.Verdicts;
using ResponseLedger.Server.Http;
using ResponseLedger.Server.People;
using ResponseLedger.Store;
using ResponseLedger.Store.Acts;
using ResponseLedger.Store.Curves;
using ResponseLedger.Store.Judging;
using ResponseLedger.Store.Model;

namespace ResponseLedger.Server.Runs;

/// <summary>POST /api/runs/{id}/reassignment: a run that was sent for the wrong unit, lot or condition. Where it was is kept.</summary>
internal sealed class ReassignRun(ActRunner acts, RunViews views, JudgingMaterial material)
{
    public static Task<Created<RunView>> HandleAsync(
        Guid id, ReassignmentAsked asked, ClaimsPrincipal user, ReassignRun reassign, CancellationToken cancellationToken)
        => reassign.RunAsync(id, asked, user, cancellationToken);

    private async Task<Created<RunView>> RunAsync(Guid id, ReassignmentAsked asked, ClaimsPrincipal user, CancellationToken cancellationToken)
    {
        await acts.RunAsync(CurrentActor.Of(user), (act, token) => ReassignAsync(act, id, asked, token), cancellationToken);
        return TypedResults.Created($"/api/runs/{id}", await views.OneAsync(id, cancellationToken));
    }

    private async Task<bool> ReassignAsync(Act act, Guid id, ReassignmentAsked asked, CancellationToken cancellationToken)
    {
        var placement = await RunPlacement.TakeAsync(act, id, cancellationToken);
        var (run, before) = (placement.Run, placement.Assignment);
        var lotId = asked.Lot is { } lot ? await LotAsync(act.Db, run.DeviceId, lot.Trim(), cancellationToken) : before.LotId;
        var conditionId = asked.Condition is { } condition ? await ConditionAsync(act.Db, run.DeviceId, condition.Trim(), cancellationToken) : before.ConditionId;
        await RunPlacement.CloseLotsAsync(act, [before.LotId, lotId], cancellationToken);
        var serial = asked.Serial?.Trim() ?? placement.Serial;
        var unitId = serial == placement.Serial ? before.UnitId : await UnitAsync(act, run.DeviceId, serial, cancellationToken);
        if (unitId == before.UnitId && lotId == before.LotId && conditionId == before.ConditionId)
            throw new RefusedException(new NothingChanges());
        await RefuseSameFilesAsync(act.Db, run, unitId, lotId, cancellationToken);
        await GoldenInForce.RefuseAsync(act.Db, id, cancellationToken);

        var reason = asked.Reason!.Trim();
        act.Db.RunAssignments.Add(new RunAssignment
        {
            RunId = id,
            Number = before.Number + 1,
            UnitId = unitId,
            LotId = lotId,
            ConditionId = conditionId,
            Reason = reason,
            At = act.At,
            ById = act.PersonId,
        });
        await JudgeAsync(act, id, conditionId, cancellationToken);
        act.Record(
            "run.reassigned",
            new JsonObject { ["runId"] = id.ToString(), ["serial"] = serial },
            new JsonObject
            {
                ["reason"] = reason,
                ["before"] = Told(placement.Serial, before.LotId, before.ConditionId),
                ["after"] = Told(serial, lotId, conditionId),
            });
        return true;
    }

    private static async Task<Guid> LotAsync(ResponseLedgerContext db, Guid deviceId, string name, CancellationToken cancellationToken)
    {
        var id = Guid.TryParse(name, out var parsed) ? parsed : (Guid?)null;
        var fits = await db.Lots.Where(l => l.Id == id || l.Number == name).Select(l => new { l.Id, l.DeviceId }).ToListAsync(cancellationToken);
        return fits.Find(l => l.DeviceId == deviceId)?.Id ?? throw new RefusedException(new FieldRefused(
            "lot", fits.Count == 0 ? $"There is no lot {name}." : $"Lot {name} is a lot of another device."));
    }

    private static async Task<Guid> ConditionAsync(ResponseLedgerContext db, Guid deviceId, string name, CancellationToken cancellationToken)
    {
        var id = Guid.TryParse(name, out var parsed) ? parsed : (Guid?)null;
        return await db.Conditions.Where(c => c.DeviceId == deviceId && (c.Id == id || c.Name == name)).Select(c => (Guid?)c.Id).FirstOrDefaultAsync(cancellationToken)
            ?? throw new RefusedException(new FieldRefused("condition", $"The device has no condition {name}."));
    }

    private static async Task<Guid> UnitAsync(Act act, Guid deviceId, string serial, CancellationToken cancellationToken)
    {
        await act.Db.Database.ExecuteSqlAsync(
            $"insert into unit (id, device_id, serial, at) values ({act.NewId()}, {deviceId}, {serial}, {act.At}) on conflict do nothing", cancellationToken);
        return await act.Db.Units.Where(u => u.DeviceId == deviceId && u.Serial == serial).Select(u => u.Id).SingleAsync(cancellationToken);
    }

    private static async Task RefuseSameFilesAsync(ResponseLedgerContext db, Run run, Guid unitId, Guid? lotId, CancellationToken cancellationToken)
    {
        var there = await (
            from assignment in db.RunAssignments
            join other in db.Runs on assignment.RunId equals other.Id
            where assignment.UnitId == unitId && assignment.LotId == lotId && other.Id != run.Id
                && other.Purpose == run.Purpose && other.FilesDigest == run.FilesDigest
                && !db.RunAssignments.Any(later => later.RunId == assignment.RunId && later.Number > assignment.Number)
            select (Guid?)other.Id).FirstOrDefaultAsync(cancellationToken);
        if (there is { } runId)
            throw new RefusedException(new SameFilesThere(runId));
    }

    // The run may have no verdict yet on what its new condition is judged by; the lot must not see it pending.
    private async Task JudgeAsync(Act act, Guid runId, Guid conditionId, CancellationToken cancellationToken)
    {
        if (await CurrentBases.FindAsync(act.Db, conditionId, cancellationToken) is not { } current)
            return;
        var readingId = await ReadRuns.ReadingOfAsync(act.Db, runId, cancellationToken);
        if (await act.Db.Verdicts.AnyAsync(v => v.ReadingId == readingId && v.BasisId == current.BasisId && v.UncertaintyId == null, cancellationToken))
            return;
        var sweep = await act.Db.SweepOfAsync(readingId, cancellationToken)
            ?? throw new InvalidDataException($"The reading {readingId} has no curve: the store was changed behind the server's back.");
        var judgement = Judge.Evaluate(sweep, await material.OfAsync(current.BasisId, cancellationToken));
        act.Db.Verdicts.Add(VerdictRows.Of(act, readingId, current.BasisId, judgement));
    }

    private static JsonObject Told(string serial, Guid? lotId, Guid conditionId)
        => new() { ["serial"] = serial, ["lotId"] = lotId?.ToString(), ["conditionId"] = conditionId.ToString() };
}

using Microsoft.EntityFrameworkCore;
using ResponseLedger.Engine.Sweeps;
using ResponseLedger.Server.Http;
using ResponseLedger.Server.Lots;
using ResponseLedger.Store;
using ResponseLedger.Store.Curves;
using ResponseLedger.Store.Judging;
using ResponseLedger.Store.Queries;

namespace ResponseLedger.Server.Runs;

/// <summary>
/// GET /api/runs/{id}/overlay: one run with its golden run and its limits, in the shape of a lot's overlay. It is drawn by the basis
/// that holds for the run, the one that was signed where its lot is decided; limits stand where they hold for this run.
/// </summary>
internal static class RunOverlay
{
    public static async Task<OverlayAnswer> GetAsync(
        Guid id,
        ResponseLedgerContext db,
        RunVerdicts verdicts,
        JudgingMaterial material,
        CancellationToken cancellationToken,
        string? quantity = null,
        string? basis = null,
        int? points = null)
    {
        var question = OverlayQuestion.Parse(quantity, basis, points, null) with { OneRun = true };
        var head = (await RunHeads.ListAsync(db, new RunFilter(Id: id), null, 1, cancellationToken)).SingleOrDefault()
            ?? throw new RefusedException(new NothingThere("run"));
        var basisId = await verdicts.BasisOfAsync(id, cancellationToken);
        var mask = basisId is { } known ? await material.OfAsync(known, cancellationToken) : null;
        var golden = await GoldenAsync(db, basisId, head.Place.ConditionId, cancellationToken);
        if (question.MinusGolden && golden is null)
            throw new RefusedException(new NoGoldenRun(head.Place.Condition));

        var sweep = await SweepAsync(db, head.Reading.Id, cancellationToken);
        var curves = new LotCurves(
            new LotCondition(head.Place.ConditionId, head.Place.Condition, null, mask?.Mask.Revision, golden?.RunId, null),
            mask?.Mask.Bytes.ToArray(),
            await db.Devices.Where(d => d.Id == head.Place.DeviceId).Select(d => d.GainUnit).SingleAsync(cancellationToken),
            golden,
            [new LotCurve(id, head.Place.Serial, head.Verdict?.Outcome, sweep)]);
        return new OverlayAnswer(Overlay.Of(curves, question));
    }

    // Without a mask there is no basis, and the golden run in force is as good a companion.
    private static async Task<LotCurve?> GoldenAsync(ResponseLedgerContext db, Guid? basisId, Guid conditionId, CancellationToken cancellationToken)
    {
        var readingId = basisId is { } id
            ? await db.Bases.Where(b => b.Id == id).Select(b => b.GoldenReadingId).SingleAsync(cancellationToken)
            : await db.GoldenChoices.Where(g => g.ConditionId == conditionId).OrderByDescending(g => g.Number).Select(g => (Guid?)g.ReadingId).FirstOrDefaultAsync(cancellationToken);
        if (readingId is not { } reading)
            return null;
        var owner = await (
            from row in db.Readings.Where(r => r.Id == reading)
            from assignment in db.RunAssignments.Where(a => a.RunId == row.RunId).OrderByDescending(a => a.Number).Take(1)
            join unit in db.Units on assignment.UnitId equals unit.Id
            select new { row.RunId, unit.Serial }).SingleAsync(cancellationToken);
        return new LotCurve(owner.RunId, owner.Serial, null, await SweepAsync(db, reading, cancellationToken));
    }

    private static async Task<Sweep> SweepAsync(ResponseLedgerContext db, Guid readingId, CancellationToken cancellationToken)
        => await db.SweepOfAsync(readingId, cancellationToken)
            ?? throw new InvalidDataException($"The reading {readingId} has no curve: the store was changed behind the server's back.");
}

using System.Text.Json.Nodes;
using Microsoft.EntityFrameworkCore;
using ResponseLedger.Engine.Sweeps;
using ResponseLedger.Records.Verdicts;
using ResponseLedger.Store;
using ResponseLedger.Store.Judging;
using ResponseLedger.Store.Queries;

namespace ResponseLedger.Server.Runs;

/// <summary>
/// A run as the API shows it. Standing is counting, retest, retestsUsedUp, invalidated or notProduction. Outcome and worst are those of the verdict on
/// the basis that holds; while there is none, the reason is noReleasedMask, or pending while runs are evaluated again.
/// </summary>
internal sealed record RunView(
    Guid Id, long ReceivedNo, Guid DeviceId, string PartNumber, string Revision, Guid ConditionId, string Condition, Guid UnitId, string Serial,
    Guid? LotId, string? LotNumber, Guid BenchId, string Bench, string Purpose, DateTimeOffset MeasuredAt, DateTimeOffset ReceivedAt,
    string? ReceivedBy, JsonNode Files, JsonNode? Circumstances, RunReadingView Reading, bool Counts, string Standing,
    RunInvalidationHead? Invalidation, int Reassigned, string? Outcome, string? OutcomeReason, JsonObject? Worst)
{
    /// <summary>Every reassignment, the oldest first; only where one run is shown.</summary>
    public IReadOnlyList<ReassignmentView>? Reassignments { get; init; }

    /// <summary>Where the run was sent for; only where one run is shown.</summary>
    public FirstPlaceView? FirstPlace { get; init; }
}

/// <summary>How a run was read.</summary>
internal sealed record RunReadingView(
    Guid Id, int Number, string Reader, int ReaderVersion, JsonNode? Columns, JsonNode Notes, int Points, string Form, double FromHz, double ToHz);

/// <summary>A reassignment: where the run went, why, when and by whom.</summary>
internal sealed record ReassignmentView(string Serial, string? Lot, string Condition, string? Reason, DateTimeOffset At, string? By);

/// <summary>Where a run was sent for, before any reassignment.</summary>
internal sealed record FirstPlaceView(string Serial, string? Lot, string Condition);

/// <summary>Turns rows into what the API shows.</summary>
internal sealed class RunViews(ResponseLedgerContext db, JudgingMaterial material)
{
    /// <summary>One run with its reassignments, or null.</summary>
    public async Task<RunView?> OneAsync(Guid id, CancellationToken cancellationToken)
    {
        var heads = await RunHeads.ListAsync(db, new RunFilter(Id: id), null, 1, cancellationToken);
        if (heads.Count == 0)
            return null;
        var view = await OfAsync(heads[0], cancellationToken);
        var placed = heads[0].Reassignments == 0 ? [] : await PlacesAsync(id, cancellationToken);
        return view with
        {
            Reassignments = [.. placed.Skip(1)],
            FirstPlace = placed.Count == 0 ? new FirstPlaceView(view.Serial, view.LotNumber, view.Condition) : new FirstPlaceView(placed[0].Serial, placed[0].Lot, placed[0].Condition),
        };
    }

    /// <summary>A run as lists show it.</summary>
    public async Task<RunView> OfAsync(RunHead head, CancellationToken cancellationToken)
    {
        // The masks of a page are few and kept in memory; only a verdict's own mask can name its worst criterion.
        var basis = head.BasisId is { } basisId ? await material.OfAsync(basisId, cancellationToken) : null;
        var worst = head.Verdict is { } verdict ? StoredVerdict.WorstOf(basis!.Mask.Mask, verdict) : null;
        var (place, reading) = (head.Place, head.Reading);
        return new RunView(
            head.Id, head.ReceivedNo, place.DeviceId, place.PartNumber, place.Revision, place.ConditionId, place.Condition, place.UnitId, place.Serial,
            place.LotId, place.LotNumber, place.BenchId, place.Bench, head.Purpose, head.MeasuredAt, head.ReceivedAt, head.ReceivedBy,
            JsonNode.Parse(head.Files)!, Parsed(head.Circumstances),
            new RunReadingView(
                reading.Id, reading.Number, reading.Reader, reading.ReaderVersion, Parsed(reading.Columns), JsonNode.Parse(reading.Notes)!,
                reading.Points, FormWord((SweepForm)reading.Form), reading.FromHz, reading.ToHz),
            head.Standing == RunStandings.Counting, head.Standing, head.Invalidation, head.Reassignments,
            head.Verdict is null ? null : OutcomeWords.Format(head.Verdict.Outcome),
            head.Verdict is not null ? null : head.HasMask ? "pending" : Upload.UploadResult.NoReleasedMask,
            worst is null ? null : VerdictDocument.Write(worst));
    }

    private async Task<IReadOnlyList<ReassignmentView>> PlacesAsync(Guid id, CancellationToken cancellationToken)
        => await (
            from assignment in db.RunAssignments.Where(a => a.RunId == id)
            join unit in db.Units on assignment.UnitId equals unit.Id
            join condition in db.Conditions on assignment.ConditionId equals condition.Id
            orderby assignment.Number
            select new ReassignmentView(
                unit.Serial,
                db.Lots.Where(l => l.Id == assignment.LotId).Select(l => l.Number).FirstOrDefault(),
                condition.Name,
                assignment.Reason,
                assignment.At,
                db.Users.Where(p => p.Id == assignment.ById).Select(p => p.DisplayName).FirstOrDefault())).ToListAsync(cancellationToken);

    private static JsonNode? Parsed(string? text) => text is null ? null : JsonNode.Parse(text);

    private static string FormWord(SweepForm form) => form switch
    {
        SweepForm.RealImaginary => "realImaginary",
        SweepForm.LevelPhase => "levelPhase",
        SweepForm.RatioPhase => "ratioPhase",
        SweepForm.Level => "level",
        SweepForm.Ratio => "ratio",
        _ => throw new ArgumentOutOfRangeException(nameof(form), form, "There is no such form."),
    };
}

using Microsoft.AspNetCore.Http.HttpResults;
using Microsoft.EntityFrameworkCore;
using ResponseLedger.Records.Verdicts;
using ResponseLedger.Server.Http;
using ResponseLedger.Server.Runs.Upload;
using ResponseLedger.Store;
using ResponseLedger.Store.Intake;
using ResponseLedger.Store.Queries;

namespace ResponseLedger.Server.Runs;

/// <summary>GET /api/runs and GET /api/runs/{id}.</summary>
internal static class ReadRuns
{
    public static async Task<Ok<Page<RunView>>> ListAsync(
        [AsParameters] RunListQuery query, ResponseLedgerContext db, RunViews views, CancellationToken cancellationToken)
    {
        var limit = Paging.Limit(query.Limit);
        var before = Paging.Key<RunKey>(query.Cursor)?.ReceivedNo;
        var heads = await RunHeads.ListAsync(db, query.ToFilter(), before, limit + 1, cancellationToken);
        var shown = new Dictionary<Guid, RunView>(heads.Count);
        foreach (var head in heads)
            shown[head.Id] = await views.OfAsync(head, cancellationToken);
        return TypedResults.Ok(Paging.Cut(heads, limit, head => shown[head.Id], head => new RunKey(head.ReceivedNo)));
    }

    public static async Task<Ok<RunView>> GetAsync(Guid id, RunViews views, CancellationToken cancellationToken)
        => TypedResults.Ok(await views.OneAsync(id, cancellationToken) ?? throw new RefusedException(new NothingThere("run")));

    /// <summary>The reading in force of a run.</summary>
    /// <exception cref="RefusedException">There is no such run.</exception>
    public static async Task<Guid> ReadingOfAsync(ResponseLedgerContext db, Guid runId, CancellationToken cancellationToken)
        => await db.Readings.Where(r => r.RunId == runId).OrderByDescending(r => r.Number).Select(r => (Guid?)r.Id).FirstOrDefaultAsync(cancellationToken)
            ?? throw new RefusedException(new NothingThere("run"));

    private sealed record RunKey(long ReceivedNo);
}

/// <summary>What a list of runs is asked for.</summary>
/// <param name="Device">Id, part number or PART/REV.</param>
/// <param name="Lot">Id or number.</param>
/// <param name="Serial">Serial number of the unit.</param>
/// <param name="Bench">Id or name.</param>
/// <param name="From">Measured then or later.</param>
/// <param name="To">Measured before.</param>
/// <param name="Outcome">pass, conditionalPass, conditionalFail, inconclusive or fail.</param>
/// <param name="Purpose">production, golden, through, check or study.</param>
/// <param name="Condition">Id or name.</param>
/// <param name="Limit">1 to 500; 50 unless stated.</param>
/// <param name="Cursor">The cursor that the page before gave as next.</param>
internal sealed record RunListQuery(
    string? Device, string? Lot, string? Serial, string? Bench, string? From, string? To, string? Outcome, string? Purpose, string? Condition,
    int? Limit, string? Cursor)
{
    /// <exception cref="RefusedException">A word or a time is not known.</exception>
    public RunFilter ToFilter()
    {
        var errors = new Dictionary<string, string[]>(StringComparer.Ordinal);
        DateTimeOffset? from = null, to = null;
        if (From is { Length: > 0 } && !TryTime(From, ref from))
            errors["from"] = ["A time is written as RFC 3339, such as 2026-03-01T09:30:00Z."];
        if (To is { Length: > 0 } && !TryTime(To, ref to))
            errors["to"] = ["A time is written as RFC 3339, such as 2026-03-01T09:30:00Z."];
        short? outcome = null;
        if (Some(Outcome) is { } word && !TryOutcome(word, ref outcome))
            errors["outcome"] = ["The outcome is one of pass, conditionalPass, conditionalFail, inconclusive, fail."];
        if (Some(Purpose) is { } purpose && !RunPurposes.All.Contains(purpose))
            errors["purpose"] = [$"The purpose is one of {string.Join(", ", RunPurposes.All)}."];
        return errors.Count == 0
            ? new RunFilter(Some(Device), Some(Lot), Some(Serial), Some(Bench), from, to, outcome, Some(Purpose), Some(Condition))
            : throw new RefusedException(new FieldRefused(errors));
    }

    private static string? Some(string? text) => string.IsNullOrEmpty(text) ? null : text;

    private static bool TryTime(string text, ref DateTimeOffset? time)
    {
        var known = UploadFields.TryTime(text, out var value);
        time = value;
        return known;
    }

    private static bool TryOutcome(string word, ref short? outcome)
    {
        var known = OutcomeWords.TryParse(word, out var value);
        outcome = (short)value;
        return known;
    }
}

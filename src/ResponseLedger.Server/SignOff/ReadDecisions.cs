using Microsoft.AspNetCore.Http.HttpResults;
using Microsoft.EntityFrameworkCore;
using Microsoft.Net.Http.Headers;
using ResponseLedger.Server.Http;
using ResponseLedger.Store;
using ResponseLedger.Store.Model;

namespace ResponseLedger.Server.SignOff;

/// <summary>Shows decisions and their records.</summary>
internal static class ReadDecisions
{
    public static async Task<Ok<Page<DecisionView>>> ListAsync(
        Guid id, ResponseLedgerContext db, CancellationToken cancellationToken, int? limit = null, string? cursor = null)
    {
        var count = Paging.Limit(limit);
        var before = Paging.Key<OrdinalKey>(cursor)?.Ordinal ?? int.MaxValue;
        if (!await db.Lots.AnyAsync(l => l.Id == id, cancellationToken))
            throw new RefusedException(new NothingThere("lot"));

        var decisions = await WithReopening(db, db.Decisions.Where(d => d.LotId == id && d.Ordinal < before))
            .OrderByDescending(d => d.Decision.Ordinal).Take(count + 1).ToListAsync(cancellationToken);
        return TypedResults.Ok(Paging.Cut(
            decisions, count, d => DecisionView.Of(d.Decision, d.Undone, d.UndoneBy, withRecord: false), d => new OrdinalKey(d.Decision.Ordinal)));
    }

    public static async Task<Ok<DecisionView>> GetAsync(Guid id, ResponseLedgerContext db, CancellationToken cancellationToken)
    {
        var found = await WithReopening(db, db.Decisions.Where(d => d.Id == id)).SingleOrDefaultAsync(cancellationToken)
            ?? throw new RefusedException(new NothingThere("decision"));
        return TypedResults.Ok(DecisionView.Of(found.Decision, found.Undone, found.UndoneBy, withRecord: true));
    }

    public static async Task<FileContentHttpResult> RecordAsync(Guid id, ResponseLedgerContext db, CancellationToken cancellationToken)
    {
        var found = await db.Decisions.Where(d => d.Id == id).Select(d => new { d.Record, d.Sha256 }).SingleOrDefaultAsync(cancellationToken)
            ?? throw new RefusedException(new NothingThere("decision"));
        return TypedResults.Bytes(found.Record, "application/json", entityTag: new EntityTagHeaderValue($"\"{Convert.ToHexStringLower(found.Sha256)}\""));
    }

    private static IQueryable<DecisionAndReopening> WithReopening(ResponseLedgerContext db, IQueryable<Decision> decisions)
        => from decision in decisions.AsNoTracking()
           join undone in db.Reopenings.AsNoTracking() on decision.Id equals undone.DecisionId into reopenings
           from undone in reopenings.DefaultIfEmpty()
           select new DecisionAndReopening
           {
               Decision = decision,
               Undone = undone,
               UndoneBy = db.Users.Where(p => p.Id == undone!.ById).Select(p => p.DisplayName).FirstOrDefault(),
           };

    private sealed record OrdinalKey(int Ordinal);

    private sealed class DecisionAndReopening
    {
        public required Decision Decision { get; init; }
        public required Reopening? Undone { get; init; }

        public required string? UndoneBy { get; init; }
    }
}

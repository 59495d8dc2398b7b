using Microsoft.AspNetCore.Http.HttpResults;
using ResponseLedger.Server.Http;
using ResponseLedger.Store;
using ResponseLedger.Store.Queries;

namespace ResponseLedger.Server.Lots;

/// <summary>Shows lots and their units.</summary>
internal static class ReadLots
{
    private const int LongestSearch = 200;

    public static async Task<Ok<Page<LotView>>> ListAsync(
        ResponseLedgerContext db, CancellationToken cancellationToken, string? state = null, string? device = null, string? search = null, int? limit = null, string? cursor = null)
    {
        if (!string.IsNullOrEmpty(state) && !LotStates.All.Contains(state, StringComparer.Ordinal))
            throw new RefusedException(new FieldRefused("state", $"The state is one of {string.Join(", ", LotStates.All)}."));

        var count = Paging.Limit(limit);
        var filter = new LotFilter(
            NoneIfBlank("state", state), NoneIfBlank("device", device), NoneIfBlank("search", search), Paging.Key<LotKey>(cursor)?.Id, count);
        var lots = await LotHeads.PageAsync(db, filter, cancellationToken);
        return TypedResults.Ok(Paging.Cut(lots, count, LotView.Of, lot => new LotKey(lot.Id)));
    }

    public static async Task<Ok<LotView>> GetAsync(Guid id, ResponseLedgerContext db, CancellationToken cancellationToken)
        => TypedResults.Ok(LotView.Of(await FindAsync(db, id, cancellationToken)));

    public static async Task<LotHead> FindAsync(ResponseLedgerContext db, Guid id, CancellationToken cancellationToken)
        => await LotHeads.FindAsync(db, id, cancellationToken) ?? throw new RefusedException(new NothingThere("lot"));

    private static string? NoneIfBlank(string name, string? text)
        => text?.Length > LongestSearch
            ? throw new RefusedException(new FieldRefused(name, $"At most {LongestSearch} characters."))
            : string.IsNullOrWhiteSpace(text) ? null : text.Trim();

    private sealed record LotKey(Guid Id);
}

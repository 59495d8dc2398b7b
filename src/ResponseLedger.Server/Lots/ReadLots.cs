using Microsoft.AspNetCore.Http.HttpResults;
using ResponseLedger.Server.Http;
using ResponseLedger.Store;
using ResponseLedger.Store.Judging;
using ResponseLedger.Store.Queries;

namespace ResponseLedger.Server.Lots;

/// <summary>Shows lots and their units.</summary>
internal static class ReadLots
{
    private const int LongestSearch = 200;

    public static async Task<Ok<Page<LotView>>> ListAsync(
        ResponseLedgerContext db, JudgingMaterial material, CancellationToken cancellationToken, string? state = null, string? device = null, string? search = null, int? limit = null, string? cursor = null)
    {
        if (!string.IsNullOrEmpty(state) && state != LotStates.Decided && !LotStates.All.Contains(state, StringComparer.Ordinal))
            throw new RefusedException(new FieldRefused("state", $"The state is one of {string.Join(", ", LotStates.All)}, or {LotStates.Decided} for all but the first."));

        var count = Paging.Limit(limit);
        var filter = new LotFilter(
            NoneIfBlank("state", state), NoneIfBlank("device", device), NoneIfBlank("search", search), Paging.Key<LotKey>(cursor)?.Id, count);
        var lots = await LotHeads.PageAsync(db, filter, cancellationToken);
        var masks = await LotWorst.MasksOfAsync(lots, material, cancellationToken);
        return TypedResults.Ok(Paging.Cut(lots, count, lot => LotView.Of(lot, masks), lot => new LotKey(lot.Id)));
    }

    public static async Task<Ok<LotView>> GetAsync(Guid id, ResponseLedgerContext db, JudgingMaterial material, CancellationToken cancellationToken)
        => TypedResults.Ok(await ViewAsync(db, id, material, cancellationToken));

    public static async Task<LotView> ViewAsync(ResponseLedgerContext db, Guid id, JudgingMaterial material, CancellationToken cancellationToken)
    {
        var lot = await FindAsync(db, id, cancellationToken);
        return LotView.Of(lot, await LotWorst.MasksOfAsync([lot], material, cancellationToken));
    }

    public static async Task<LotHead> FindAsync(ResponseLedgerContext db, Guid id, CancellationToken cancellationToken)
        => await LotHeads.FindAsync(db, id, cancellationToken) ?? throw new RefusedException(new NothingThere("lot"));

    private static string? NoneIfBlank(string name, string? text)
        => text?.Length > LongestSearch
            ? throw new RefusedException(new FieldRefused(name, $"At most {LongestSearch} characters."))
            : string.IsNullOrWhiteSpace(text) ? null : text.Trim();

    private sealed record LotKey(Guid Id);
}

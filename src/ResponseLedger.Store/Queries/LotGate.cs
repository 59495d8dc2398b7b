using Microsoft.EntityFrameworkCore;
using ResponseLedger.Store.Acts;
using ResponseLedger.Store.Model;

namespace ResponseLedger.Store.Queries;

/// <summary>A lot and its state, read after its lock was taken.</summary>
/// <param name="Lot">The lot.</param>
/// <param name="Standing">The decision in force, or null while the lot is open.</param>
public sealed record GatedLot(Lot Lot, Decision? Standing);

/// <summary>
/// The lock that uploads and decisions of a lot meet at. Uploads share it, decisions hold it alone, and both read the
/// lot's state only after they have it.
/// </summary>
public static class LotGate
{
    /// <summary>For an act that adds to a lot: many may hold it at once. Null when there is no such lot.</summary>
    public static async Task<GatedLot?> EnterAsync(ResponseLedgerContext db, Guid lotId, CancellationToken cancellationToken)
    {
        ArgumentNullException.ThrowIfNull(db);
        var lot = await db.Lots.FromSql($"select * from lot where id = {lotId} for share").AsNoTracking().SingleOrDefaultAsync(cancellationToken);
        return await WithStateAsync(db, lot, cancellationToken);
    }

    /// <summary>
    /// For an act that decides, reopens, or changes what counts: one at a time. The act's time is then that at which it got the
    /// lock, so that every run it finds was received before. Null when there is no such lot.
    /// </summary>
    public static async Task<GatedLot?> CloseAsync(Act act, Guid lotId, CancellationToken cancellationToken)
    {
        ArgumentNullException.ThrowIfNull(act);
        var lot = await act.Db.Lots.FromSql($"select * from lot where id = {lotId} for update").AsNoTracking().SingleOrDefaultAsync(cancellationToken);
        act.HappensNow();
        return await WithStateAsync(act.Db, lot, cancellationToken);
    }

    /// <summary>The decisions in force: those that no reopening undid.</summary>
    public static IQueryable<Decision> Standing(ResponseLedgerContext db)
    {
        ArgumentNullException.ThrowIfNull(db);
        return db.Decisions.Where(d => !db.Reopenings.Any(r => r.DecisionId == d.Id));
    }

    private static async Task<GatedLot?> WithStateAsync(ResponseLedgerContext db, Lot? lot, CancellationToken cancellationToken)
        => lot is null
            ? null
            : new GatedLot(lot, await Standing(db).AsNoTracking().SingleOrDefaultAsync(d => d.LotId == lot.Id, cancellationToken));
}

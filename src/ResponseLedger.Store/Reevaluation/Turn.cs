using Microsoft.EntityFrameworkCore;

namespace ResponseLedger.Store.Reevaluation;

/// <summary>
/// Acts that give the next number under one parent (a device's conditions, a condition's masks and golden runs) take turns,
/// so that what each reads is what the one before it left: a release and a change of the golden run at once both end up in the basis.
/// </summary>
public static class Turn
{
    /// <summary>Waits for the turn at the parent; it is given back when the act's transaction ends.</summary>
    public static Task TakeAsync(ResponseLedgerContext db, Guid parentId, CancellationToken cancellationToken)
    {
        ArgumentNullException.ThrowIfNull(db);
        return db.Database.ExecuteSqlAsync($"select pg_advisory_xact_lock(hashtextextended({parentId.ToString("D")}, 0))", cancellationToken);
    }
}

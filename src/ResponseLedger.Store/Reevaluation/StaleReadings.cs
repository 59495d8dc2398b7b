using Microsoft.EntityFrameworkCore;
using ResponseLedger.Store.Model;
using ResponseLedger.Store.Queries;

namespace ResponseLedger.Store.Reevaluation;

/// <summary>A reading of an open lot that has no verdict on the basis in force.</summary>
internal sealed record StaleReading(Guid ReadingId, Guid LotId, int Points);

/// <summary>
/// What is stale is a question to the store, not a list that is kept: that is why re-evaluation may be interrupted anywhere
/// and goes on where it stopped.
/// </summary>
internal static class StaleReadings
{
    /// <summary>The newest readings of runs that now belong to the basis's condition in an open lot and have no verdict on it, in the order of their ids, after one of them.</summary>
    public static IQueryable<StaleReading> Of(ResponseLedgerContext db, Guid basisId, Guid after = default)
        => Of(db, db.Bases.Where(b => b.Id == basisId)).Where(s => s.Reading.Id > after).OrderBy(s => s.Reading.Id)
            .Select(s => new StaleReading(s.Reading.Id, s.LotId, s.Reading.Points));

    /// <summary>How many readings are stale on each of these bases; bases without any are left out.</summary>
    public static async Task<Dictionary<Guid, int>> CountsAsync(ResponseLedgerContext db, IReadOnlyCollection<Guid> basisIds, CancellationToken cancellationToken)
        => await Of(db, db.Bases.Where(b => basisIds.Contains(b.Id)))
            .GroupBy(s => s.BasisId)
            .Select(g => new { BasisId = g.Key, Count = g.Count() })
            .ToDictionaryAsync(g => g.BasisId, g => g.Count, cancellationToken);

    private static IQueryable<Found> Of(ResponseLedgerContext db, IQueryable<Basis> bases)
        => from basis in bases
           join assigned in db.RunAssignments on basis.ConditionId equals assigned.ConditionId
           join lot in db.Lots on assigned.LotId equals lot.Id
           join reading in db.Readings on assigned.RunId equals reading.RunId
           where !LotGate.Standing(db).Any(d => d.LotId == lot.Id)
               && !db.RunAssignments.Any(later => later.RunId == assigned.RunId && later.Number > assigned.Number)
               && !db.Readings.Any(later => later.RunId == reading.RunId && later.Number > reading.Number)
               && !db.Verdicts.Any(v => v.ReadingId == reading.Id && v.BasisId == basis.Id)
           select new Found { BasisId = basis.Id, LotId = lot.Id, Reading = reading };

    private sealed class Found
    {
        public required Guid BasisId { get; init; }
        public required Guid LotId { get; init; }
        public required Reading Reading { get; init; }
    }
}

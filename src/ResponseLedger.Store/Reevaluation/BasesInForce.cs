using Microsoft.EntityFrameworkCore;
using ResponseLedger.Records.Verdicts;

namespace ResponseLedger.Store.Reevaluation;

/// <summary>A condition with a released mask, and its basis in force.</summary>
/// <param name="ConditionId">The condition.</param>
/// <param name="DeviceId">Its device.</param>
/// <param name="MaskRevision">Number of the newest released mask.</param>
/// <param name="BasisId">The basis row; null where a newer engine or rule has none yet.</param>
public sealed record BasisInForce(Guid ConditionId, Guid DeviceId, int MaskRevision, Guid? BasisId);

/// <summary>Bases in force of many conditions in one query.</summary>
internal static class BasesInForce
{
    /// <summary>Every condition that has a released mask.</summary>
    public static async Task<List<BasisInForce>> AllAsync(ResponseLedgerContext db, CancellationToken cancellationToken)
        => await Of(db, null).ToListAsync(cancellationToken);

    /// <summary>The conditions of one device that have a released mask.</summary>
    public static async Task<List<BasisInForce>> OfDeviceAsync(ResponseLedgerContext db, Guid deviceId, CancellationToken cancellationToken)
        => await Of(db, deviceId).ToListAsync(cancellationToken);

    // The same names as CurrentBases looks up for one condition; a test holds the two to each other.
    private static IQueryable<BasisInForce> Of(ResponseLedgerContext db, Guid? deviceId)
        => from mask in db.MaskRevisions.AsNoTracking()
           where (deviceId == null || mask.DeviceId == deviceId)
               && !db.MaskRevisions.Any(later => later.ConditionId == mask.ConditionId && later.Number > mask.Number)
           let golden = db.GoldenChoices.Where(g => g.ConditionId == mask.ConditionId).OrderByDescending(g => g.Number).Select(g => (Guid?)g.ReadingId).FirstOrDefault()
           let rule = db.DeviceSettings.Where(s => s.DeviceId == mask.DeviceId).OrderByDescending(s => s.Number).Select(s => s.DecisionRule).First()
           orderby mask.ConditionId
           select new BasisInForce(
               mask.ConditionId,
               mask.DeviceId,
               mask.Number,
               db.Bases.Where(b => b.ConditionId == mask.ConditionId && b.MaskId == mask.MaskId && b.GoldenReadingId == golden
                   && b.DecisionRule == rule && b.EngineVersion == Judge.EngineVersion).Select(b => (Guid?)b.Id).FirstOrDefault());
}

using Microsoft.EntityFrameworkCore;
using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Store.Curves;

/// <summary>Reads curves.</summary>
public static class CurveQueries
{
    /// <summary>The sweep of a reading, or null when there is no such reading.</summary>
    public static async Task<Sweep?> SweepOfAsync(this ResponseLedgerContext db, Guid readingId, CancellationToken cancellationToken)
    {
        ArgumentNullException.ThrowIfNull(db);
        var row = await (
            from reading in db.Readings
            join curve in db.Curves on reading.Id equals curve.ReadingId
            join grid in db.Grids on reading.GridSha256 equals grid.Sha256
            where reading.Id == readingId
            select new { reading.Form, reading.NoiseFloorDb, Grid = grid.Planes, curve.Planes }).AsNoTracking().SingleOrDefaultAsync(cancellationToken);
        return row is null ? null : CurveCodec.Unpack((SweepForm)row.Form, row.Grid, row.Planes, row.NoiseFloorDb);
    }
}

using System.Text.Json.Nodes;
using Microsoft.EntityFrameworkCore;
using ResponseLedger.Store;

namespace ResponseLedger.Server.Benches;

/// <summary>A bench as the API shows it.</summary>
/// <param name="Id">The bench's id.</param>
/// <param name="Name">Its name.</param>
/// <param name="SerialPattern">How it finds serials in file names; null for the usual rule.</param>
/// <param name="NoiseFloorDb">Level under which phase is not to be believed; null where none is stated.</param>
/// <param name="Remark">Free remark.</param>
/// <param name="LastSeenAt">Receipt of its last run; null while it has none.</param>
/// <param name="LastRunId">Its last run.</param>
/// <param name="Columns">The columns that it remembers, newest first.</param>
/// <param name="CreatedAt">When it was made.</param>
internal sealed record BenchView(
    Guid Id,
    string Name,
    string? SerialPattern,
    double? NoiseFloorDb,
    string? Remark,
    DateTimeOffset? LastSeenAt,
    Guid? LastRunId,
    IReadOnlyList<BenchColumnsView> Columns,
    DateTimeOffset CreatedAt);

/// <summary>The columns that somebody chose for files with certain heads.</summary>
internal sealed record BenchColumnsView(string HeadsDigest, JsonNode? Choices, DateTimeOffset At, string? By);

/// <summary>Puts bench views together: a fixed number of queries, however many benches.</summary>
internal static class BenchViews
{
    public static async Task<Dictionary<Guid, BenchView>> OfAsync(ResponseLedgerContext db, IReadOnlyList<Guid> ids, CancellationToken cancellationToken)
    {
        var rows = await (
            from bench in db.Benches
            where ids.Contains(bench.Id)
            select new
            {
                Bench = bench,
                Setting = db.BenchSettings.Where(s => s.BenchId == bench.Id).OrderByDescending(s => s.Number).FirstOrDefault(),
                Last = db.Runs.Where(r => r.BenchId == bench.Id).OrderByDescending(r => r.ReceivedNo).Select(r => new { r.Id, r.At }).FirstOrDefault(),
            }).AsNoTracking().ToListAsync(cancellationToken);
        var columns = await ColumnsAsync(db, ids, cancellationToken);
        return rows.ToDictionary(row => row.Bench.Id, row => new BenchView(
            row.Bench.Id,
            row.Bench.Name,
            row.Setting?.SerialPattern,
            row.Setting?.NoiseFloorDb,
            row.Setting?.Remark,
            row.Last?.At,
            row.Last?.Id,
            [.. columns[row.Bench.Id]],
            row.Bench.At));
    }

    private static async Task<ILookup<Guid, BenchColumnsView>> ColumnsAsync(ResponseLedgerContext db, IReadOnlyList<Guid> ids, CancellationToken cancellationToken)
    {
        var rows = await (
            from columns in db.BenchColumns
            where ids.Contains(columns.BenchId)
                && !db.BenchColumns.Any(later => later.BenchId == columns.BenchId && later.HeadsDigest == columns.HeadsDigest
                    && (later.At > columns.At || (later.At == columns.At && later.Id > columns.Id)))
            orderby columns.At descending, columns.Id descending
            select new
            {
                columns.BenchId,
                columns.HeadsDigest,
                columns.Choices,
                columns.At,
                By = db.Users.Where(p => p.Id == columns.ById).Select(p => p.DisplayName).FirstOrDefault(),
            }).AsNoTracking().ToListAsync(cancellationToken);
        return rows.ToLookup(row => row.BenchId, row => new BenchColumnsView(row.HeadsDigest, JsonNode.Parse(row.Choices), row.At, row.By));
    }
}

using System.Collections.Concurrent;
using Microsoft.EntityFrameworkCore;
using ResponseLedger.Engine.Measures;
using ResponseLedger.Records.Masks;
using ResponseLedger.Records.Verdicts;
using ResponseLedger.Store.Curves;

namespace ResponseLedger.Store.Judging;

/// <summary>Mask, golden sweep and device traits of a basis, read once and kept: a basis never changes.</summary>
public sealed class JudgingMaterial(IDbContextFactory<ResponseLedgerContext> contexts)
{
    private const int MostKept = 200;

    private readonly ConcurrentDictionary<Guid, JudgementBasis> kept = new();

    /// <summary>What a run is judged by on this basis.</summary>
    /// <exception cref="InvalidDataException">The stored mask cannot be read: the store was changed behind the server's back.</exception>
    public async Task<JudgementBasis> OfAsync(Guid basisId, CancellationToken cancellationToken)
    {
        if (kept.TryGetValue(basisId, out var known))
            return known;

        await using var db = await contexts.CreateDbContextAsync(cancellationToken);
        var row = await (
            from basis in db.Bases
            join mask in db.MaskRevisions on basis.MaskId equals mask.MaskId
            join device in db.Devices on mask.DeviceId equals device.Id
            where basis.Id == basisId
            select new { mask.Document, basis.GoldenReadingId, device.Kind, device.CriticalPhaseDeg }).AsNoTracking().SingleAsync(cancellationToken);
        if (!MaskRevisionDocument.TryParse(row.Document, out var document, out var problems))
            throw new InvalidDataException($"The mask of basis {basisId} cannot be read: {problems[0].Sentence}");

        var golden = row.GoldenReadingId is { } readingId ? await db.SweepOfAsync(readingId, cancellationToken) : null;
        var material = new JudgementBasis(document, golden, new DeviceTraits(row.Kind == "loop", row.CriticalPhaseDeg ?? -180));
        if (kept.Count >= MostKept)
            kept.Clear();
        kept[basisId] = material;
        return material;
    }
}

using ResponseLedger.Engine.Masks;
using ResponseLedger.Records.Masks;
using ResponseLedger.Records.Verdicts;
using ResponseLedger.Store.Judging;
using ResponseLedger.Store.Queries;

namespace ResponseLedger.Server.Lots;

/// <summary>Finds the worst criterion of a lot: by outcome as units are sorted, then by margin over scale.</summary>
internal static class LotWorst
{
    /// <summary>The masks that the worst margins of these lots are on, by basis.</summary>
    public static async Task<Dictionary<Guid, MaskDocument>> MasksOfAsync(IEnumerable<LotHead> lots, JudgingMaterial material, CancellationToken cancellationToken)
    {
        var masks = new Dictionary<Guid, MaskDocument>();
        foreach (var basis in lots.SelectMany(l => l.Worst).Select(w => w.BasisId).Distinct())
            masks[basis] = (await material.OfAsync(basis, cancellationToken)).Mask.Mask;
        return masks;
    }

    /// <summary>The worst criterion, or null while nothing is judged.</summary>
    public static LotWorstView? Of(LotHead lot, IReadOnlyDictionary<Guid, MaskDocument> masks)
    {
        var worst = lot.Worst
            .OrderBy(w => LotUnits.RankOf((Outcome)w.Outcome))
            .ThenBy(w => w.Margin is { } margin ? margin / LotUnits.ScaleOf(masks[w.BasisId], w.WorstIndex) : double.NegativeInfinity)
            .ThenBy(w => w.Serial, StringComparer.Ordinal)
            .FirstOrDefault();
        if (worst is null)
            return null;

        var (name, unit) = CriterionNames.At(masks[worst.BasisId].Mask, worst.WorstIndex);
        return new LotWorstView(worst.Serial, worst.RunId, name, (Outcome)worst.Outcome, worst.FrequencyHz, worst.Margin, unit);
    }
}

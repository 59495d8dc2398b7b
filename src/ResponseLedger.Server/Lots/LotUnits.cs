using Microsoft.AspNetCore.Http.HttpResults;
using ResponseLedger.Engine.Masks;
using ResponseLedger.Records.Masks;
using ResponseLedger.Records.Verdicts;
using ResponseLedger.Server.Http;
using ResponseLedger.Store;
using ResponseLedger.Store.Judging;
using ResponseLedger.Store.Queries;

namespace ResponseLedger.Server.Lots;

/// <summary>Shows the units of a lot, worst first or by serial number.</summary>
internal static class LotUnits
{
    private const string ByMargin = "margin";
    private const string BySerial = "serial";

    public static async Task<Ok<Page<UnitView>>> ListAsync(
        Guid id, ResponseLedgerContext db, JudgingMaterial material, CancellationToken cancellationToken, string? sort = null, int? limit = null, string? cursor = null)
    {
        if (sort is not (null or "" or ByMargin or BySerial))
            throw new RefusedException(new FieldRefused("sort", $"Sort by {ByMargin} or by {BySerial}."));
        var count = Paging.Limit(limit);
        var after = Paging.Key<UnitKey>(cursor);

        var standing = await LotStanding.ReadAsync(db, id, cancellationToken);
        if (standing.Conditions.Count == 0 && standing.Units.Count == 0)
            await ReadLots.FindAsync(db, id, cancellationToken);

        var masks = await MasksOfAsync(standing, material, cancellationToken);
        var rows = standing.Units.Select(u => (Unit: Show(standing, u, masks), Key: KeyOf(u, masks, bySerial: sort == BySerial)));
        var page = rows
            .Where(r => after is null || r.Key.CompareTo(after) > 0)
            .OrderBy(r => r.Key)
            .Take(count + 1)
            .ToList();
        return TypedResults.Ok(Paging.Cut(page, count, r => r.Unit, r => r.Key));
    }

    /// <summary>The masks that the lot's verdicts are on, by basis.</summary>
    public static async Task<Dictionary<Guid, MaskDocument>> MasksOfAsync(LotStanding standing, JudgingMaterial material, CancellationToken cancellationToken)
    {
        var masks = new Dictionary<Guid, MaskDocument>();
        foreach (var basis in standing.Units.SelectMany(u => u.Counting).Select(r => r.BasisId).OfType<Guid>().Distinct())
            masks[basis] = (await material.OfAsync(basis, cancellationToken)).Mask.Mask;
        return masks;
    }

    /// <summary>The worst criterion of a run, or null without a verdict or criteria.</summary>
    public static WorstCriterion? WorstOf(CountingRunRow run, Dictionary<Guid, MaskDocument> masks)
        => run is { BasisId: { } basis, Verdict: { } verdict } ? StoredVerdict.WorstOf(masks[basis], verdict) : null;

    private static UnitView Show(LotStanding standing, UnitStanding unit, Dictionary<Guid, MaskDocument> masks)
    {
        var deciding = Deciding(unit, masks);
        return new UnitView(
            unit.UnitId,
            unit.Serial,
            deciding?.RunId,
            unit.Runs,
            unit.Outcome,
            deciding is null ? null : View(WorstOf(deciding, masks)),
            unit.Disposition is { } disposition ? new DispositionView(disposition.Kind, disposition.Reason) : null,
            [.. standing.Conditions.Select(c => Show(c, unit.Counting.FirstOrDefault(r => r.ConditionId == c.Id), masks))],
            unit.Retests,
            unit.Invalidated);
    }

    private static UnitConditionView Show(LotCondition condition, CountingRunRow? run, Dictionary<Guid, MaskDocument> masks)
        => new(condition.Id, condition.Name, run?.RunId, run?.Verdict?.Outcome, run is null ? null : View(WorstOf(run, masks)));

    private static WorstView? View(WorstCriterion? worst)
        => worst is null ? null : new WorstView(worst.Criterion, worst.Outcome, worst.FrequencyHz, worst.Margin, worst.Unit);

    private static CountingRunRow? Deciding(UnitStanding unit, Dictionary<Guid, MaskDocument> masks)
        => unit.Counting.OrderBy(r => RankOf(r.Verdict?.Outcome)).ThenBy(r => SeverityOf(r, masks)).FirstOrDefault();

    private static UnitKey KeyOf(UnitStanding unit, Dictionary<Guid, MaskDocument> masks, bool bySerial)
    {
        if (bySerial)
            return new UnitKey(0, null, unit.Serial);
        var severity = Deciding(unit, masks) is { } deciding ? SeverityOf(deciding, masks) : double.NegativeInfinity;
        return new UnitKey(RankOf(unit.Outcome), double.IsFinite(severity) ? severity : null, unit.Serial);
    }

    /// <summary>Fail, inconclusive, not yet judged, and then by what the verdict says.</summary>
    public static int RankOf(Outcome? outcome) => outcome switch
    {
        Outcome.Fail => 0,
        Outcome.Inconclusive => 1,
        null => 2,
        Outcome.ConditionalFail => 3,
        Outcome.ConditionalPass => 4,
        _ => 5,
    };

    // Margin over scale, as a verdict finds its worst criterion; one without a margin comes before all that have one.
    private static double SeverityOf(CountingRunRow run, Dictionary<Guid, MaskDocument> masks)
    {
        if (run is not { BasisId: { } basis, Verdict: { WorstIndex: { } worst } verdict } || verdict.Margins[worst] is not { } margin)
            return double.NegativeInfinity;
        return margin / ScaleOf(masks[basis], worst);
    }

    /// <summary>By what a criterion's margin is divided to compare it with others.</summary>
    public static double ScaleOf(MaskDocument document, int criterion)
    {
        var mask = document.Mask;
        return (criterion < mask.Limits.Count ? mask.Limits[criterion].Scale : mask.Requirements[criterion - mask.Limits.Count].Scale) ?? 1;
    }

    /// <summary>Where a unit stands in the list; no severity comes before any.</summary>
    private sealed record UnitKey(int Rank, double? Severity, string Serial) : IComparable<UnitKey>
    {
        public int CompareTo(UnitKey? other)
        {
            if (other is null)
                return 1;
            var byRank = Rank.CompareTo(other.Rank);
            var bySeverity = byRank != 0 ? byRank : Nullable.Compare(Severity, other.Severity);
            return bySeverity != 0 ? bySeverity : string.CompareOrdinal(Serial, other.Serial);
        }
    }
}

using Microsoft.AspNetCore.Http.HttpResults;
using ResponseLedger.Engine.Lots;
using ResponseLedger.Records.Masks;
using ResponseLedger.Records.Verdicts;
using ResponseLedger.Store;
using ResponseLedger.Store.Judging;
using ResponseLedger.Store.Queries;

namespace ResponseLedger.Server.Lots;

/// <summary>Statistics of a lot.</summary>
/// <param name="FullyTested">Whether every unit of the lot's size is tested: then the yield is a count and no estimate.</param>
/// <param name="FirstPass">Yield by the first run received in every condition, whatever was invalidated since.</param>
/// <param name="Final">Yield by the counting runs.</param>
/// <param name="Conditions">Margins of every criterion over the counting runs.</param>
internal sealed record LotStatisticsView(bool FullyTested, YieldView FirstPass, YieldView Final, IReadOnlyList<ConditionStatisticsView> Conditions);

/// <summary>A yield as a count. The bounds (Clopper-Pearson, two-sided) speak of the process behind the lot, not of the lot.</summary>
internal sealed record YieldView(int Tested, int Passed, double? Yield, double Confidence, double? ProcessLower, double? ProcessUpper);

/// <summary>The criteria of one condition.</summary>
internal sealed record ConditionStatisticsView(Guid ConditionId, string Name, int? MaskRevision, IReadOnlyList<CriterionStatisticsView> Criteria);

/// <summary>Margins of one criterion; each number in <paramref name="Unit"/>, null where there are too few margins for it.</summary>
internal sealed record CriterionStatisticsView(
    string Name, string Unit, int Count, int Without, double? Least, double? Median, double? Mean, double? StandardDeviation);

/// <summary>Answers the statistics of a lot.</summary>
internal static class ReadLotStatistics
{
    public static async Task<Ok<LotStatisticsView>> GetAsync(Guid id, ResponseLedgerContext db, JudgingMaterial material, CancellationToken cancellationToken)
    {
        var lot = await ReadLots.FindAsync(db, id, cancellationToken);
        var standing = await LotStanding.ReadAsync(db, id, cancellationToken);
        var first = await FirstPass.ReadAsync(db, id, cancellationToken);
        var masks = await LotUnits.MasksOfAsync(standing, material, cancellationToken);
        var tally = standing.Tally;
        return TypedResults.Ok(new LotStatisticsView(
            tally.Tested >= lot.Size,
            Show(LotStatistics.OfYield(first.Passed, first.Tested)),
            Show(LotStatistics.OfYield(standing.Units.Count(u => u.IsTested && u.Passes), tally.Tested)),
            [.. standing.Conditions.Select(c => Show(c, standing, masks))]));
    }

    private static ConditionStatisticsView Show(LotCondition condition, LotStanding standing, Dictionary<Guid, MaskDocument> masks)
    {
        var judged = standing.Units.SelectMany(u => u.Counting)
            .Where(r => r.ConditionId == condition.Id && r.BasisId is not null && r.Verdict is not null)
            .ToList();
        if (judged.Count == 0)
            return new ConditionStatisticsView(condition.Id, condition.Name, condition.MaskRevision, []);

        var (mask, any) = (masks[judged[0].BasisId!.Value], judged[0].Verdict!);
        return new ConditionStatisticsView(condition.Id, condition.Name, condition.MaskRevision, [.. Enumerable.Range(0, any.Margins.Length).Select(i =>
        {
            var named = StoredVerdict.WorstOf(mask, any with { WorstIndex = i })!;
            return Show(LotStatistics.OfMargins(named.Criterion, named.Unit, judged.Select(r => r.Verdict!.Margins[i])));
        })]);
    }

    private static CriterionStatisticsView Show(MarginStatistics margins)
        => new(margins.Name, margins.Unit, margins.Count, margins.Without, margins.Least, margins.Median, margins.Mean, margins.StandardDeviation);

    private static YieldView Show(YieldStatistics yield)
        => new(yield.Tested, yield.Passed, yield.Yield, yield.Confidence, yield.ProcessLower, yield.ProcessUpper);
}

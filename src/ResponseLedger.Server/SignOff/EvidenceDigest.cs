using System.Text.Json.Nodes;
using ResponseLedger.Ledger;
using ResponseLedger.Store.Model;
using ResponseLedger.Store.Queries;

namespace ResponseLedger.Server.SignOff;

/// <summary>
/// A digest over all of a lot that a decision would pin. Whoever is shown the lot before signing gets it, and sends it back with the
/// signature: so nobody signs for what came in between.
/// </summary>
internal static class EvidenceDigest
{
    public static string Of(Lot lot, int ordinal, LotStanding standing, DecisionEvidence evidence)
    {
        var counting = standing.Units.SelectMany(u => u.Counting).Select(r => r.RunId).ToHashSet();
        var content = new JsonObject
        {
            ["lot"] = lot.Id.ToString("D"),
            ["size"] = lot.Size,
            ["ordinal"] = ordinal,
            ["conditions"] = new JsonArray([.. standing.Conditions.OrderBy(c => c.Id).Select(Condition)]),
            ["units"] = new JsonArray([.. standing.Units.OrderBy(u => u.UnitId).Select(Unit)]),
            ["others"] = new JsonArray([.. evidence.Runs.Where(r => !counting.Contains(r.RunId)).OrderBy(r => r.RunId).Select(Other)]),
        };
        return Convert.ToHexStringLower(CanonicalJson.Digest(CanonicalJson.Serialize(content)));
    }

    private static JsonNode Condition(LotCondition condition) => new JsonArray(
        condition.Id.ToString("D"), condition.MaskId?.ToString("D"), condition.GoldenRunId?.ToString("D"), condition.GoldenReadingId?.ToString("D"));

    private static JsonNode Unit(UnitStanding unit) => new JsonArray(
        unit.UnitId.ToString("D"),
        (int?)unit.Outcome,
        unit.Disposition?.Kind,
        unit.Disposition?.Reason,
        new JsonArray([.. unit.Counting.OrderBy(r => r.ConditionId).Select(r => new JsonArray(r.RunId.ToString("D"), r.ReadingId.ToString("D"), r.VerdictId?.ToString("D")))]));

    private static JsonNode Other(LotRun run) => new JsonArray(run.RunId.ToString("D"), run.UnitId.ToString("D"), run.ConditionId.ToString("D"), run.IsInvalidated);
}

using System.Text.Json.Nodes;
using ResponseLedger.Engine.Masks;
using ResponseLedger.Ledger;
using ResponseLedger.Records.Strict;
using ResponseLedger.Records.Verdicts;

namespace ResponseLedger.Records.Decisions;

/// <summary>
/// Writes a decision with one order for everything that has none of its own: conditions by name, units by serial, runs by
/// condition, runs that do not count by receipt; ties by id. Files keep the run's order, which carries meaning. What is absent is null.
/// </summary>
internal static class DecisionWriter
{
    public static JsonObject Write(DecisionRecord record)
    {
        var conditions = record.Conditions
            .OrderBy(c => c.Name, StringComparer.Ordinal)
            .ThenBy(c => TextOf(c.ConditionId), StringComparer.Ordinal)
            .ToArray();
        var places = new Dictionary<Guid, int>();
        for (var i = 0; i < conditions.Length; i++)
            places.TryAdd(conditions[i].ConditionId, i);
        var units = record.Units
            .OrderBy(u => u.Serial, StringComparer.Ordinal)
            .ThenBy(u => TextOf(u.UnitId), StringComparer.Ordinal);
        return new JsonObject
        {
            ["format"] = DecisionDocument.Format,
            ["decisionId"] = TextOf(record.DecisionId),
            ["lot"] = new JsonObject
            {
                ["lotId"] = TextOf(record.Lot.LotId),
                ["number"] = record.Lot.Number,
                ["size"] = record.Lot.Size,
                ["decisionOrdinal"] = record.Lot.DecisionOrdinal,
            },
            ["device"] = new JsonObject
            {
                ["deviceId"] = TextOf(record.Device.DeviceId),
                ["partNumber"] = record.Device.PartNumber,
                ["revision"] = record.Device.Revision,
                ["kind"] = record.Device.Kind,
            },
            ["decision"] = DecisionWords.Format(record.Decision),
            ["reason"] = record.Reason,
            ["signer"] = new JsonObject
            {
                ["personId"] = TextOf(record.Signer.PersonId),
                ["name"] = record.Signer.Name,
                ["email"] = record.Signer.Email,
            },
            ["meaning"] = record.Meaning,
            ["signedAt"] = Microseconds.Format(record.SignedAt),
            ["engineVersion"] = record.EngineVersion,
            ["rule"] = new JsonObject { ["code"] = record.Rule.Code, ["statement"] = record.Rule.Statement },
            ["conditions"] = new JsonArray([.. conditions.Select(Write)]),
            ["units"] = new JsonArray([.. units.Select(u => Write(u, places))]),
            ["counts"] = Write(record.Counts),
            ["recommendation"] = new JsonObject
            {
                ["decision"] = record.Recommendation.Decision is { } decision ? DecisionWords.Format(decision) : null,
                ["sentence"] = record.Recommendation.Sentence,
            },
        };
    }

    private static JsonObject Write(DecidedCondition condition) => new()
    {
        ["conditionId"] = TextOf(condition.ConditionId),
        ["name"] = condition.Name,
        ["maskRevisionId"] = TextOf(condition.Mask?.MaskRevisionId),
        ["maskRevision"] = condition.Mask?.Revision,
        ["maskSha256"] = condition.Mask is { } mask ? TextOf(mask.Sha256) : null,
        ["goldenRunId"] = TextOf(condition.Golden?.RunId),
        ["goldenReadingId"] = TextOf(condition.Golden?.ReadingId),
        ["goldenFilesSha256"] = condition.Golden is { } golden ? TextOf(golden.FilesSha256) : null,
    };

    private static JsonObject Write(DecidedUnit unit, Dictionary<Guid, int> places)
    {
        var runs = unit.Runs
            .OrderBy(r => places.GetValueOrDefault(r.ConditionId, int.MaxValue))
            .ThenBy(r => TextOf(r.RunId), StringComparer.Ordinal);
        var otherRuns = unit.OtherRuns
            .OrderBy(r => Microseconds.Cut(r.ReceivedAt))
            .ThenBy(r => TextOf(r.RunId), StringComparer.Ordinal);
        return new JsonObject
        {
            ["unitId"] = TextOf(unit.UnitId),
            ["serial"] = unit.Serial,
            ["outcome"] = WordOf(unit.Outcome),
            ["disposition"] = unit.Disposition is { } disposition
                ? new JsonObject { ["disposition"] = disposition.Word, ["reason"] = disposition.Reason }
                : null,
            ["runs"] = new JsonArray([.. runs.Select(Write)]),
            ["otherRuns"] = new JsonArray([.. otherRuns.Select(Write)]),
        };
    }

    private static JsonObject Write(CountingRun run) => new()
    {
        ["conditionId"] = TextOf(run.ConditionId),
        ["runId"] = TextOf(run.RunId),
        ["readingId"] = TextOf(run.ReadingId),
        ["verdictId"] = TextOf(run.VerdictId),
        ["files"] = Write(run.FilesSha256),
        ["outcome"] = WordOf(run.Outcome),
        ["worst"] = run.Worst is { } worst ? Write(worst) : null,
        ["measuredAt"] = Microseconds.Format(run.MeasuredAt),
        ["receivedAt"] = Microseconds.Format(run.ReceivedAt),
    };

    private static JsonObject Write(PinnedWorst worst) => new()
    {
        ["criterion"] = worst.Criterion,
        ["frequencyHz"] = JsonNumber.Of(worst.FrequencyHz),
        ["margin"] = JsonNumber.Of(worst.Margin),
        ["unit"] = worst.Unit,
    };

    private static JsonObject Write(OtherRun run) => new()
    {
        ["conditionId"] = TextOf(run.ConditionId),
        ["runId"] = TextOf(run.RunId),
        ["standing"] = StandingWordOf(run.Standing),
        ["cause"] = run.Cause,
        ["reason"] = run.Reason,
        ["files"] = Write(run.FilesSha256),
        ["measuredAt"] = Microseconds.Format(run.MeasuredAt),
        ["receivedAt"] = Microseconds.Format(run.ReceivedAt),
    };

    private static JsonObject Write(DecisionCounts counts) => new()
    {
        ["units"] = counts.Units,
        ["tested"] = counts.Tested,
        ["passed"] = counts.Passed,
        ["failed"] = counts.Failed,
        ["inconclusive"] = counts.Inconclusive,
        ["withdrawn"] = counts.Withdrawn,
        ["retests"] = counts.Retests,
    };

    private static JsonArray Write(IReadOnlyList<byte[]> hashes) => new([.. hashes.Select(h => JsonValue.Create(TextOf(h)))]);

    private static string StandingWordOf(OtherRunStanding standing)
        => DecisionReader.Standings.First(w => w.Value == standing).Key;

    private static string? WordOf(Outcome? outcome) => outcome is { } stated ? OutcomeWords.Format(stated) : null;

    private static string TextOf(Guid id) => id.ToString("D");

    private static string? TextOf(Guid? id) => id?.ToString("D");

    private static string TextOf(byte[] hash) => Convert.ToHexStringLower(hash);
}

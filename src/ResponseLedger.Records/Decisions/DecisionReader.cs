using System.Text.Json;
using ResponseLedger.Engine.Masks;
using ResponseLedger.Records.Strict;
using ResponseLedger.Records.Verdicts;

namespace ResponseLedger.Records.Decisions;

/// <summary>Reads the shape of a decision; whether its parts agree is <see cref="DecisionConsistency"/>'s matter.</summary>
internal static class DecisionReader
{
    private const int Name = ObjectReader.LongestName;
    private const int Prose = ObjectReader.LongestProse;

    public static Dictionary<string, OtherRunStanding> Standings { get; } = new(StringComparer.Ordinal)
    {
        ["retest"] = OtherRunStanding.Retest,
        ["invalidated"] = OtherRunStanding.Invalidated,
    };

    private static readonly string[] CountNames = ["units", "tested", "passed", "failed", "inconclusive", "withdrawn", "retests"];

    private static readonly Dictionary<string, Outcome> Outcomes =
        Enum.GetValues<Outcome>().ToDictionary(OutcomeWords.Format, StringComparer.Ordinal);

    private static readonly Dictionary<string, DecisionWord> Decisions =
        Enum.GetValues<DecisionWord>().ToDictionary(DecisionWords.Format, StringComparer.Ordinal);

    public static DecisionRecord? Read(JsonElement root, ProblemList problems)
    {
        if (ObjectReader.Open(root, string.Empty, problems) is not { } reader)
            return null;
        if (reader.Text("format", Name) is { } format && format != DecisionDocument.Format)
            reader.Add("format", $"Expected {DecisionDocument.Format}.");
        var decisionId = reader.Id("decisionId");
        var lot = Part(reader, "lot", ReadLot);
        var device = Part(reader, "device", ReadDevice);
        var decision = reader.Word("decision", Decisions);
        var reason = reader.OptionalText("reason", Prose);
        var signer = Part(reader, "signer", ReadSigner);
        var meaning = reader.Text("meaning", Prose);
        var signedAt = reader.Time("signedAt");
        var engineVersion = reader.WholeNumber("engineVersion", 1);
        var rule = Part(reader, "rule", ReadRule);
        var conditions = reader.Items("conditions", Each(ReadCondition));
        var units = reader.Items("units", Each(ReadUnit));
        var counts = Part(reader, "counts", ReadCounts);
        var recommendation = Part(reader, "recommendation", ReadRecommendation);
        if (reason is null && !reader.Has("reason"))
            reader.Add("reason", "This member is missing; a text is expected.");
        reader.Finish();
        return problems.Count > 0
            ? null
            : new DecisionRecord(
                decisionId!.Value, lot!, device!, decision!.Value, reason!, signer!, meaning!, signedAt!.Value,
                engineVersion!.Value, rule!, conditions, units, counts!, recommendation!);
    }

    private static DecidedLot? ReadLot(ObjectReader reader)
        => (reader.Id("lotId"), reader.Text("number", Name), reader.WholeNumber("size", 1), reader.WholeNumber("decisionOrdinal", 1)) is
            ({ } id, { } number, { } size, { } ordinal) ? new DecidedLot(id, number, size, ordinal) : null;

    private static DecidedDevice? ReadDevice(ObjectReader reader)
        => (reader.Id("deviceId"), reader.Text("partNumber", Name), reader.Text("revision", Name), reader.Text("kind", Name)) is
            ({ } id, { } partNumber, { } revision, { } kind) ? new DecidedDevice(id, partNumber, revision, kind) : null;

    private static Signer? ReadSigner(ObjectReader reader)
        => (reader.Id("personId"), reader.Text("name", Prose), reader.Text("email", Prose)) is
            ({ } id, { } name, { } email) ? new Signer(id, name, email) : null;

    private static DecisionRule? ReadRule(ObjectReader reader)
        => (reader.Text("code", Name), reader.Text("statement", Prose)) is
            ({ } code, { } statement) ? new DecisionRule(code, statement) : null;

    private static Recommendation? ReadRecommendation(ObjectReader reader)
    {
        var decision = reader.OptionalWord("decision", Decisions);
        return reader.Text("sentence", Prose) is { } sentence ? new Recommendation(decision, sentence) : null;
    }

    private static DecisionCounts? ReadCounts(ObjectReader reader)
    {
        int?[] n = [.. CountNames.Select(name => reader.WholeNumber(name, 0))];
        return n.All(c => c is not null)
            ? new DecisionCounts(n[0]!.Value, n[1]!.Value, n[2]!.Value, n[3]!.Value, n[4]!.Value, n[5]!.Value, n[6]!.Value)
            : null;
    }

    private static DecidedCondition? ReadCondition(ObjectReader reader)
    {
        var id = reader.Id("conditionId");
        var name = reader.Text("name", Name);
        PinnedMask? mask = null;
        if (HasAny(reader, "maskRevisionId", "maskRevision", "maskSha256")
            && (reader.Id("maskRevisionId"), reader.WholeNumber("maskRevision", 1), reader.Sha256("maskSha256")) is
                ({ } maskId, { } revision, { } maskSha256))
        {
            mask = new PinnedMask(maskId, revision, maskSha256);
        }

        PinnedGolden? golden = null;
        if (HasAny(reader, "goldenRunId", "goldenReadingId", "goldenFilesSha256")
            && (reader.Id("goldenRunId"), reader.Id("goldenReadingId"), reader.Sha256("goldenFilesSha256")) is
                ({ } runId, { } readingId, { } filesSha256))
        {
            golden = new PinnedGolden(runId, readingId, filesSha256);
        }

        return id is { } conditionId && name is not null ? new DecidedCondition(conditionId, name, mask, golden) : null;
    }

    private static DecidedUnit? ReadUnit(ObjectReader reader)
    {
        var id = reader.Id("unitId");
        var serial = reader.Text("serial", Name);
        var outcome = reader.OptionalWord("outcome", Outcomes);
        var disposition = reader.Has("disposition") ? Part(reader, "disposition", ReadDisposition) : null;
        var runs = reader.Items("runs", Each(ReadRun));
        var otherRuns = reader.Items("otherRuns", Each(ReadOtherRun));
        return id is { } unitId && serial is not null
            ? new DecidedUnit(unitId, serial, outcome, disposition, runs, otherRuns)
            : null;
    }

    private static UnitDisposition? ReadDisposition(ObjectReader reader)
        => (reader.Text("disposition", Name), reader.Text("reason", Prose)) is
            ({ } word, { } reason) ? new UnitDisposition(word, reason) : null;

    private static CountingRun? ReadRun(ObjectReader reader)
    {
        var ids = (Condition: reader.Id("conditionId"), Run: reader.Id("runId"), Reading: reader.Id("readingId"));
        var verdictId = reader.OptionalId("verdictId");
        var files = reader.Items("files", ObjectReaderValues.Sha256);
        var outcome = reader.OptionalWord("outcome", Outcomes);
        var worst = reader.Has("worst") ? Part(reader, "worst", ReadWorst) : null;
        var times = (Measured: reader.Time("measuredAt"), Received: reader.Time("receivedAt"));
        return ids is ({ } conditionId, { } runId, { } readingId) && times is ({ } measuredAt, { } receivedAt)
            ? new CountingRun(conditionId, runId, readingId, verdictId, files, outcome, worst, measuredAt, receivedAt)
            : null;
    }

    private static PinnedWorst? ReadWorst(ObjectReader reader)
    {
        var frequencyHz = reader.OptionalNumber("frequencyHz");
        var margin = reader.OptionalNumber("margin");
        return (reader.Text("criterion", Name), reader.Text("unit", Name)) is
            ({ } criterion, { } unit) ? new PinnedWorst(criterion, frequencyHz, margin, unit) : null;
    }

    private static OtherRun? ReadOtherRun(ObjectReader reader)
    {
        var ids = (Condition: reader.Id("conditionId"), Run: reader.Id("runId"));
        var standing = reader.Word("standing", Standings);
        var cause = reader.OptionalText("cause", Prose);
        var reason = reader.Text("reason", Prose);
        var files = reader.Items("files", ObjectReaderValues.Sha256);
        var times = (Measured: reader.Time("measuredAt"), Received: reader.Time("receivedAt"));
        return ids is ({ } conditionId, { } runId) && times is ({ } measuredAt, { } receivedAt) && standing is { } stated && reason is not null
            ? new OtherRun(conditionId, runId, stated, cause, reason, files, measuredAt, receivedAt)
            : null;
    }

    private static T? Part<T>(ObjectReader reader, string name, Func<ObjectReader, T?> read)
        where T : class
        => reader.Object(name) is { } part ? Finished(part, read) : null;

    private static Func<JsonElement, string, ProblemList, T?> Each<T>(Func<ObjectReader, T?> read)
        where T : class
        => (json, path, problems) => ObjectReader.Open(json, path, problems) is { } item ? Finished(item, read) : null;

    private static T? Finished<T>(ObjectReader reader, Func<ObjectReader, T?> read)
        where T : class
    {
        var value = read(reader);
        reader.Finish();
        return value;
    }

    private static bool HasAny(ObjectReader reader, params ReadOnlySpan<string> names)
    {
        var any = false;
        foreach (var name in names)
            any |= reader.Has(name);
        return any;
    }
}

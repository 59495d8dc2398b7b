using ResponseLedger.Engine.Masks;
using ResponseLedger.Records.Strict;

namespace ResponseLedger.Records.Decisions;

/// <summary>What a decision may not say because another part of it says otherwise.</summary>
internal static class DecisionConsistency
{
    private const string Concession = "concession";

    private static readonly string[] Dispositions = ["rework", "scrap", "return", Concession];

    public static void Check(DecisionRecord record, ProblemList problems)
    {
        if (record.Device.Kind is not ("transfer" or "loop"))
            problems.Add("device.kind", "Expected one of transfer, loop.");
        if (record.Decision != DecisionWord.Approve && string.IsNullOrWhiteSpace(record.Reason))
            problems.Add("reason", "A rejection or a concession needs a reason.");
        // A unit without any run may be a serial number declared by mistake; a rejection covers whatever was sent.
        if (record.Decision != DecisionWord.Reject && record.Units.Count(u => u.Runs.Count + u.OtherRuns.Count > 0) > record.Lot.Size)
            problems.Add("units", "Runs stand for more units than the lot's size.");
        AddRepeated(record.Conditions, c => c.ConditionId, i => $"conditions[{i}].conditionId", problems);
        AddRepeated(record.Conditions, c => c.Name, i => $"conditions[{i}].name", problems);
        AddRepeated(record.Units, u => u.UnitId, i => $"units[{i}].unitId", problems);
        AddRepeated(record.Units, u => u.Serial, i => $"units[{i}].serial", problems);

        var conditions = new Dictionary<Guid, DecidedCondition>();
        foreach (var condition in record.Conditions)
            conditions.TryAdd(condition.ConditionId, condition);
        var runs = new HashSet<Guid>();
        for (var i = 0; i < record.Units.Count; i++)
            CheckUnit(record, record.Units[i], $"units[{i}]", conditions, runs, problems);
    }

    private static void CheckUnit(
        DecisionRecord record,
        DecidedUnit unit,
        string path,
        Dictionary<Guid, DecidedCondition> conditions,
        HashSet<Guid> runs,
        ProblemList problems)
    {
        if (unit.Disposition is { } disposition && !Dispositions.Contains(disposition.Word, StringComparer.Ordinal))
            problems.Add($"{path}.disposition.disposition", $"Expected one of {string.Join(", ", Dispositions)}.");
        AddRepeated(unit.Runs, r => r.ConditionId, i => $"{path}.runs[{i}].conditionId", problems);
        for (var i = 0; i < unit.Runs.Count; i++)
            CheckRun(unit.Runs[i], $"{path}.runs[{i}]", conditions, runs, problems);
        for (var i = 0; i < unit.OtherRuns.Count; i++)
            CheckOtherRun(unit.OtherRuns[i], $"{path}.otherRuns[{i}]", conditions, runs, problems);
        CheckOutcome(record, unit, path, problems);
    }

    private static void CheckOutcome(DecisionRecord record, DecidedUnit unit, string path, ProblemList problems)
    {
        if (unit.Outcome is { } outcome)
        {
            if (unit.Runs.Any(r => r.Outcome > outcome))
                problems.Add($"{path}.outcome", "A unit is not better than its worst run.");

            // A unit passes when every condition of the device passes, so none may be without a verdict.
            if (outcome <= Outcome.ConditionalPass && unit.Runs.Count(r => r.Outcome is not null) < record.Conditions.Count)
                problems.Add($"{path}.outcome", "A unit passes only with a verdict in every condition.");
        }

        if (record.Decision == DecisionWord.Reject)
            return;
        if (unit.Disposition is null && unit.Outcome is Outcome.Fail or Outcome.Inconclusive)
            problems.Add($"{path}.disposition", "A lot with a unit that does not pass is approved only after the unit's disposition.");
        if (record.Decision == DecisionWord.Approve && unit.Disposition?.Word == Concession)
            problems.Add($"{path}.disposition", "A unit under concession makes it an approval with concession.");
    }

    private static void CheckRun(
        CountingRun run,
        string path,
        Dictionary<Guid, DecidedCondition> conditions,
        HashSet<Guid> runs,
        ProblemList problems)
    {
        CheckPlace(run.ConditionId, run.RunId, run.FilesSha256, path, conditions, runs, problems);
        if (run.VerdictId is null != run.Outcome is null)
            problems.Add($"{path}.outcome", "An outcome comes with its verdict, and a verdict with its outcome.");
        if (run.Worst is not null && run.Outcome is null)
            problems.Add($"{path}.worst", "There is no worst criterion without a verdict.");
        if (run.Outcome is not null && conditions.TryGetValue(run.ConditionId, out var condition) && condition.Mask is null)
            problems.Add($"{path}.outcome", "There is no verdict without a released mask of the condition.");
    }

    private static void CheckOtherRun(
        OtherRun run,
        string path,
        Dictionary<Guid, DecidedCondition> conditions,
        HashSet<Guid> runs,
        ProblemList problems)
    {
        CheckPlace(run.ConditionId, run.RunId, run.FilesSha256, path, conditions, runs, problems);
        if (run.Standing == OtherRunStanding.Invalidated && string.IsNullOrWhiteSpace(run.Cause))
            problems.Add($"{path}.cause", "An invalidated run has an assignable cause.");
    }

    private static void CheckPlace(
        Guid conditionId,
        Guid runId,
        IReadOnlyList<byte[]> files,
        string path,
        Dictionary<Guid, DecidedCondition> conditions,
        HashSet<Guid> runs,
        ProblemList problems)
    {
        if (!conditions.ContainsKey(conditionId))
            problems.Add($"{path}.conditionId", "This is not a condition of the device.");
        if (!runs.Add(runId))
            problems.Add($"{path}.runId", "This run stands twice.");
        if (files.Count == 0)
            problems.Add($"{path}.files", "A run has one file or more.");
    }

    private static void AddRepeated<TItem, TKey>(IReadOnlyList<TItem> items, Func<TItem, TKey> key, Func<int, string> path, ProblemList problems)
    {
        var seen = new HashSet<TKey>();
        for (var i = 0; i < items.Count; i++)
        {
            if (!seen.Add(key(items[i])))
                problems.Add(path(i), "This stands twice.");
        }
    }
}

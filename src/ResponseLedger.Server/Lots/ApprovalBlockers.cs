using ResponseLedger.Store.Queries;

namespace ResponseLedger.Server.Lots;

/// <summary>One thing that stands against a plain approval of a lot, with the way on.</summary>
/// <param name="Code">A word for it; the refusal of an approval carries it as its code or, for a finer word, as its reason.</param>
/// <param name="Sentence">What it is.</param>
internal sealed record Blocker(string Code, string Sentence);

/// <summary>What stands against an approval: the lot's page shows it, and a decision is refused by the first of it.</summary>
internal static class ApprovalBlockers
{
    /// <summary>Units neither pass nor are withdrawn.</summary>
    public const string UnitsNotPassed = "unitsNotPassed";

    /// <summary>A condition has no mask, so that no unit can pass.</summary>
    public const string NoReleasedMask = "noReleasedMask";

    /// <summary>Units are under concession, so that a plain approval would pass over it.</summary>
    public const string ConcessionNeeded = "concessionNeeded";

    /// <summary>What stands against a plain approval of a lot now; empty when somebody entitled may approve it.</summary>
    public static IReadOnlyList<Blocker> Of(LotHead lot)
        => lot.Decision is not null
            ? [new Blocker("lotDecided", "The lot is decided already. Reopen it to decide anew.")]
            : Of(lot.Size, lot.Conditions, lot.Tally, lot.NeedsTwoSigners, underConcession: false);

    /// <summary>What stands against an approval of an open lot, plain or under concession.</summary>
    public static IReadOnlyList<Blocker> Of(int size, IReadOnlyList<LotCondition> conditions, LotTally tally, bool needsTwoSigners, bool underConcession)
    {
        var blockers = new List<Blocker>(AnyDecision(size, tally, needsTwoSigners));
        var unreleased = conditions.Where(c => c.MaskId is null).Select(c => $"\"{c.Name}\"").ToList();
        if (unreleased.Count > 0)
        {
            blockers.Add(new Blocker(
                NoReleasedMask,
                $"No mask is released for the condition{(unreleased.Count > 1 ? "s" : "")} {string.Join(", ", unreleased)}, so the lot can only be rejected. Release one first."));
        }

        if (tally.Cleared + tally.Conceded < size)
            blockers.Add(new Blocker(UnitsNotPassed, NotPassed(size, tally)));
        if (!underConcession && tally.Conceded > 0)
            blockers.Add(new Blocker(ConcessionNeeded, $"{Units(tally.Conceded)} under concession: approve with concession instead."));
        if (underConcession && tally.Conceded == 0)
            blockers.Add(new Blocker("noConcession", "No unit is under concession: there is nothing to concede. Approve the lot plainly."));
        return blockers;
    }

    /// <summary>What stands against every decision, a rejection too.</summary>
    public static IReadOnlyList<Blocker> AnyDecision(int size, LotTally tally, bool needsTwoSigners)
    {
        var blockers = new List<Blocker>();
        if (needsTwoSigners)
            blockers.Add(new Blocker("needsTwoSigners", "The device asks for two signers, which this version cannot take."));
        if (tally.Stale > 0)
            blockers.Add(new Blocker("verdictsStale", $"{tally.Stale} verdict{(tally.Stale > 1 ? "s are" : " is")} still those of an earlier mask or golden run. They are being evaluated again; wait until that is done."));
        if (tally.Units > size)
            blockers.Add(new Blocker("moreUnitsThanSize", $"The lot has runs of {tally.Units} units and a size of {size}. Reassign the runs that do not belong here."));
        return blockers;
    }

    private static string NotPassed(int size, LotTally tally)
    {
        var open = size - tally.Cleared - tally.Conceded;
        var head = $"{open} of {size} units {(open == 1 ? "neither passes nor is" : "neither pass nor are")} withdrawn";

        // A unit with a disposition is counted by its outcome still, so the parts tell what is open only while there is none.
        string[] parts = tally.Withdrawn + tally.Conceded > 0 ? [] :
        [
            Part(tally.Failed, "fails", "fail"),
            Part(tally.Inconclusive, "could not be decided", "could not be decided"),
            Part(Math.Max(0, size - tally.Tested), "is not fully tested", "are not fully tested"),
        ];
        var told = string.Join(", ", parts.Where(p => p.Length > 0));
        return $"{head}{(told.Length > 0 ? $": {told}" : "")}. Test what is not tested, and give each that does not pass a disposition.";
    }

    private static string Part(int count, string one, string many) => count == 0 ? "" : count == 1 ? $"1 {one}" : $"{count} {many}";

    private static string Units(int count) => count == 1 ? "One unit is" : $"{count} units are";
}

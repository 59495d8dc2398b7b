using ResponseLedger.Server.Http;
using ResponseLedger.Server.Lots;

namespace ResponseLedger.Server.SignOff;

internal sealed record LotDecided(string Number)
    : Refusal(StatusCodes.Status409Conflict, "lotDecided", $"Lot {Number} is decided already. It must be reopened before anything under it changes.");

internal sealed record LotOpen(string Number)
    : Refusal(StatusCodes.Status409Conflict, "lotOpen", $"Lot {Number} is open: there is no decision to undo.");

internal sealed record UnitPasses(string Serial)
    : Refusal(StatusCodes.Status409Conflict, "unitPasses", $"Unit {Serial} passes; a disposition is for one that does not.");

internal sealed record OwnRuns(int Count)
    : Refusal(StatusCodes.Status409Conflict, "ownRuns", $"{Count} of the lot's runs were sent by you, and the device lets nobody sign for runs of their own. Somebody else must sign.");

internal sealed record EvidenceChanged(string Number)
    : Refusal(StatusCodes.Status409Conflict, "evidenceChanged", $"What stands under lot {Number} has changed since it was shown to you, so nothing was signed. Look at it again, then sign.");

/// <summary>What stands against a decision. A lot that has no mask, or needs a concession, is told to programs as one whose units did not pass, with the finer word as the reason.</summary>
internal sealed record StandsAgainst(string Code, string Sentence) : Refusal(StatusCodes.Status409Conflict, Code, Sentence)
{
    public static StandsAgainst Of(Blocker blocker) => blocker.Code is ApprovalBlockers.NoReleasedMask or ApprovalBlockers.ConcessionNeeded
        ? new(ApprovalBlockers.UnitsNotPassed, blocker.Sentence) { Reason = blocker.Code }
        : new(blocker.Code, blocker.Sentence);
}

internal sealed record SignerGone()
    : Refusal(StatusCodes.Status403Forbidden, "notAllowed", "Your account is no longer there.");

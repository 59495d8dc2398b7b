using System.Security.Claims;
using Microsoft.EntityFrameworkCore;
using ResponseLedger.Records.Decisions;
using ResponseLedger.Server.Http;
using ResponseLedger.Server.Lots;
using ResponseLedger.Server.People;
using ResponseLedger.Store;
using ResponseLedger.Store.Model;
using ResponseLedger.Store.Queries;

namespace ResponseLedger.Server.SignOff;

/// <summary>Who may sign for a lot, what stands against a decision, and what is recommended: asked before signing and at signing alike.</summary>
internal static class SigningRules
{
    public static IReadOnlyList<Blocker> Against(DecisionWord word, Lot lot, LotStanding standing, DeviceSetting setting) => word == DecisionWord.Reject
        ? ApprovalBlockers.AnyDecision(standing.Tally, setting.SigningNeedsTwo)
        : ApprovalBlockers.Of(lot.Size, standing.Conditions, standing.Tally, setting.SigningNeedsTwo, word == DecisionWord.ApproveWithConcession);

    public static Recommendation Recommend(Lot lot, LotStanding standing, DeviceSetting setting)
    {
        var plain = Against(DecisionWord.Approve, lot, standing, setting);
        if (plain.Count == 0)
            return new Recommendation(DecisionWord.Approve, "Every unit passes or is withdrawn: the lot may be approved.");
        return Against(DecisionWord.ApproveWithConcession, lot, standing, setting).Count == 0
            ? new Recommendation(DecisionWord.ApproveWithConcession, "Every unit passes, is withdrawn or is under concession: the lot may be approved with concession.")
            : new Recommendation(DecisionWord.Reject, string.Join(' ', plain.Select(b => b.Sentence)));
    }

    /// <summary>Why this person may not sign for the lot, or null.</summary>
    public static Refusal? AgainstSigner(DeviceSetting setting, ClaimsPrincipal user, Guid? personId, DecisionEvidence evidence)
    {
        var own = evidence.Runs.Count(r => r.ById is not null && r.ById == personId);
        return AgainstRole(setting, user) ?? (setting.SigningExcludesOwnRuns && own > 0 ? new OwnRuns(own) : null);
    }

    /// <summary>Why nobody with this person's roles may sign for the lot, or null.</summary>
    public static Refusal? AgainstRole(DeviceSetting setting, ClaimsPrincipal user)
        => setting.SigningNeedsQuality && !CurrentActor.Holds(user, Roles.Quality) ? new NotAllowed("This device's lots are signed by the role quality only.") : null;

    public static async Task<DeviceSetting> SettingOfLotAsync(ResponseLedgerContext db, Guid lotId, CancellationToken cancellationToken)
        => await db.DeviceSettings.AsNoTracking()
            .Where(s => db.Lots.Any(l => l.Id == lotId && l.DeviceId == s.DeviceId))
            .OrderByDescending(s => s.Number)
            .FirstOrDefaultAsync(cancellationToken) ?? throw new RefusedException(new NothingThere("lot"));
}

using System.Security.Claims;
using System.Text.Json.Nodes;
using Microsoft.AspNetCore.Http.HttpResults;
using Microsoft.EntityFrameworkCore;
using ResponseLedger.Records.Decisions;
using ResponseLedger.Server.Devices;
using ResponseLedger.Server.Http;
using ResponseLedger.Server.Lots;
using ResponseLedger.Server.People;
using ResponseLedger.Store;
using ResponseLedger.Store.Acts;
using ResponseLedger.Store.Judging;
using ResponseLedger.Store.Model;
using ResponseLedger.Store.Queries;

namespace ResponseLedger.Server.SignOff;

/// <summary>Signs a decision on a lot.</summary>
internal static class DecideLot
{
    public static async Task<Created<DecisionView>> HandleAsync(
        Guid id,
        NewDecision request,
        ClaimsPrincipal user,
        ActRunner acts,
        PasswordAsked password,
        JudgingMaterial material,
        ResponseLedgerContext db,
        CancellationToken cancellationToken)
    {
        var setting = await SettingOfLotAsync(db, id, cancellationToken);
        await SignerStanding.RequireAsync(db, user, SignersOf(setting), cancellationToken);
        await password.CheckAsync(user, request.Password, cancellationToken);

        var decision = await acts.RunAsync(CurrentActor.Of(user), (act, token) => DecideAsync(act, id, request, material, token), cancellationToken);
        return TypedResults.Created($"/api/decisions/{decision.Id}", DecisionView.Of(decision, undone: null, withRecord: true));
    }

    private static async Task<Decision> DecideAsync(
        Act act, Guid lotId, NewDecision request, JudgingMaterial material, CancellationToken cancellationToken)
    {
        var gated = await LotGate.CloseAsync(act, lotId, cancellationToken) ?? throw new RefusedException(new NothingThere("lot"));
        if (gated.Standing is not null)
            throw new RefusedException(new LotDecided(gated.Lot.Number));

        var setting = await SettingOfLotAsync(act.Db, lotId, cancellationToken);
        await SignerStanding.RequireAsync(act, SignersOf(setting), cancellationToken);
        _ = DecisionWords.TryParse(request.Decision, out var word);
        var standing = await LotStanding.ReadAsync(act.Db, lotId, cancellationToken);
        if (Against(word, gated.Lot, standing, setting) is [var blocker, ..])
            throw new RefusedException(StandsAgainst.Of(blocker));

        var evidence = await DecisionEvidence.ReadAsync(act.Db, gated.Lot, standing, cancellationToken);
        var own = evidence.Runs.Count(r => r.ById == act.ById);
        if (setting.SigningExcludesOwnRuns && own > 0)
            throw new RefusedException(new OwnRuns(own));

        var masks = await LotUnits.MasksOfAsync(standing, material, cancellationToken);
        var ordinal = await act.Db.Decisions.CountAsync(d => d.LotId == lotId, cancellationToken) + 1;
        var draft = new DecisionDraft(gated.Lot, ordinal, standing, evidence, masks);
        return await KeepAsync(act, draft, word, request.Reason?.Trim() ?? "", Recommend(gated.Lot, standing, setting), cancellationToken);
    }

    private static async Task<Decision> KeepAsync(
        Act act, DecisionDraft draft, DecisionWord word, string reason, Recommendation recommendation, CancellationToken cancellationToken)
    {
        var signer = await act.Db.Users.Where(p => p.Id == act.ById)
            .Select(p => new Signer(p.Id, p.DisplayName, p.Email!))
            .SingleOrDefaultAsync(cancellationToken) ?? throw new RefusedException(new SignerGone());
        var document = DecisionDocument.Create(draft.Sign(act.NewId(), word, reason, signer, act.At, recommendation));
        var decision = new Decision
        {
            Id = document.Record.DecisionId,
            LotId = draft.Lot.Id,
            Ordinal = draft.Ordinal,
            Kind = DecisionWords.Format(word),
            Reason = reason,
            Record = document.ToCanonicalBytes(),
            Sha256 = document.Sha256.ToArray(),
            At = act.At,
            ById = act.ById,
        };
        act.Db.Decisions.Add(decision);
        act.Db.DecisionVerdicts.AddRange(draft.Rows(decision.Id));
        act.Record(
            "lot.decided",
            new JsonObject { ["lotId"] = draft.Lot.Id.ToString("D"), ["number"] = draft.Lot.Number, ["decisionId"] = decision.Id.ToString("D") },
            new JsonObject
            {
                ["decision"] = decision.Kind,
                ["ordinal"] = decision.Ordinal,
                ["reason"] = reason,
                ["recordSha256"] = Convert.ToHexStringLower(decision.Sha256),
            });
        await act.SaveOrRefuseAsync(() => new LotDecided(draft.Lot.Number), cancellationToken);
        return decision;
    }

    private static IReadOnlyList<Blocker> Against(DecisionWord word, Lot lot, LotStanding standing, DeviceSetting setting) => word == DecisionWord.Reject
        ? ApprovalBlockers.AnyDecision(lot.Size, standing.Tally, setting.SigningNeedsTwo)
        : ApprovalBlockers.Of(lot.Size, standing.Conditions, standing.Tally, setting.SigningNeedsTwo, word == DecisionWord.ApproveWithConcession);

    private static Recommendation Recommend(Lot lot, LotStanding standing, DeviceSetting setting)
    {
        var plain = Against(DecisionWord.Approve, lot, standing, setting);
        if (plain.Count == 0)
            return new Recommendation(DecisionWord.Approve, "Every unit passes or is withdrawn: the lot may be approved.");
        return Against(DecisionWord.ApproveWithConcession, lot, standing, setting).Count == 0
            ? new Recommendation(DecisionWord.ApproveWithConcession, "Every unit passes, is withdrawn or is under concession: the lot may be approved with concession.")
            : new Recommendation(DecisionWord.Reject, string.Join(' ', plain.Select(b => b.Sentence)));
    }

    private static async Task<DeviceSetting> SettingOfLotAsync(ResponseLedgerContext db, Guid lotId, CancellationToken cancellationToken)
        => await db.DeviceSettings.AsNoTracking()
            .Where(s => db.Lots.Any(l => l.Id == lotId && l.DeviceId == s.DeviceId))
            .OrderByDescending(s => s.Number)
            .FirstOrDefaultAsync(cancellationToken) ?? throw new RefusedException(new NothingThere("lot"));

    private static string[] SignersOf(DeviceSetting setting) => setting.SigningNeedsQuality ? [Roles.Quality] : [Roles.Engineer, Roles.Quality];
}

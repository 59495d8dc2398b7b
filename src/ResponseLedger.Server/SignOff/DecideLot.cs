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
        var setting = await SigningRules.SettingOfLotAsync(db, id, cancellationToken);
        await SignerStanding.RequireAsync(db, user, SignersOf(setting), cancellationToken);
        await password.CheckAsync(user, request.Password, cancellationToken);

        var decision = await acts.RunAsync(CurrentActor.Of(user), (act, token) => DecideAsync(act, id, request, user, material, token), cancellationToken);
        return TypedResults.Created($"/api/decisions/{decision.Id}", DecisionView.Of(decision, undone: null, undoneBy: null, withRecord: true));
    }

    private static async Task<Decision> DecideAsync(
        Act act, Guid lotId, NewDecision request, ClaimsPrincipal user, JudgingMaterial material, CancellationToken cancellationToken)
    {
        var gated = await LotGate.CloseAsync(act, lotId, cancellationToken) ?? throw new RefusedException(new NothingThere("lot"));
        if (gated.Standing is not null)
            throw new RefusedException(new LotDecided(gated.Lot.Number));

        var setting = await SigningRules.SettingOfLotAsync(act.Db, lotId, cancellationToken);
        await SignerStanding.RequireAsync(act, SignersOf(setting), cancellationToken);
        _ = DecisionWords.TryParse(request.Decision, out var word);
        var standing = await LotStanding.ReadAsync(act.Db, lotId, cancellationToken);
        if (SigningRules.Against(word, gated.Lot, standing, setting) is [var blocker, ..])
            throw new RefusedException(StandsAgainst.Of(blocker));

        var evidence = await DecisionEvidence.ReadAsync(act.Db, gated.Lot, standing, cancellationToken);
        if (SigningRules.AgainstSigner(setting, user, act.ById, evidence) is { } wrongSigner)
            throw new RefusedException(wrongSigner);

        var masks = await LotUnits.MasksOfAsync(standing, material, cancellationToken);
        var ordinal = await act.Db.Decisions.CountAsync(d => d.LotId == lotId, cancellationToken) + 1;
        if (request.Seen is { } seen && seen != EvidenceDigest.Of(gated.Lot, ordinal, standing, evidence))
            throw new RefusedException(new EvidenceChanged(gated.Lot.Number));

        var draft = new DecisionDraft(gated.Lot, ordinal, standing, evidence, masks);
        return await KeepAsync(act, draft, word, request.Reason?.Trim() ?? "", SigningRules.Recommend(gated.Lot, standing, setting), cancellationToken);
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

    private static string[] SignersOf(DeviceSetting setting) => setting.SigningNeedsQuality ? [Roles.Quality] : [Roles.Engineer, Roles.Quality];
}

using System.Security.Claims;
using System.Text.Json.Nodes;
using Microsoft.AspNetCore.Http.HttpResults;
using Microsoft.EntityFrameworkCore;
using ResponseLedger.Records.Masks;
using ResponseLedger.Server.Http;
using ResponseLedger.Server.People;
using ResponseLedger.Store;
using ResponseLedger.Store.Acts;
using ResponseLedger.Store.Judging;
using ResponseLedger.Store.Model;

namespace ResponseLedger.Server.Masks;

/// <summary>Releases a draft: from then on its bytes never change, and open lots follow it.</summary>
internal static class ReleaseMask
{
    public static async Task<Ok<MaskView>> ReleaseAsync(
        Guid id,
        MaskRelease request,
        ClaimsPrincipal user,
        ActRunner acts,
        ResponseLedgerContext db,
        ReevaluationAfterChange reevaluation,
        HttpRequest http,
        CancellationToken cancellationToken)
    {
        var conditionId = await acts.RunAsync(CurrentActor.Of(user), async (act, token) =>
        {
            var (head, draft) = await DraftMasks.LockedAsync(act, id, token);
            DraftMasks.Demand(http, draft, needed: false);
            var document = MaskViews.Document(draft);
            if (MaskViews.Problems(document) is { Count: > 0 } problems)
                throw new RefusedException(new FieldRefused(problems.GroupBy(p => p.Path, p => p.Sentence).ToDictionary(g => g.Key, g => g.Distinct().ToArray())));

            var revision = await AddRevisionAsync(act, head, document, request.Reason!.Trim(), token);
            act.Db.Remove(draft);
            act.Record("mask.released", DraftMasks.Subject(head), new JsonObject
            {
                ["revision"] = revision.Number,
                ["title"] = document.Title,
                ["sha256"] = Convert.ToHexStringLower(revision.Sha256),
                ["reason"] = revision.Reason,
            });
            await CurrentBases.EnsureAsync(act, head.ConditionId, token);
            return head.ConditionId;
        }, cancellationToken);

        var state = await reevaluation.RunAsync(conditionId, cancellationToken);
        var view = await ReadMasks.ViewAsync(db, id, cancellationToken);
        return TypedResults.Ok(view with { Reevaluation = state });
    }

    private static async Task<MaskRevision> AddRevisionAsync(Act act, MaskHead head, MaskDocument document, string reason, CancellationToken cancellationToken)
    {
        var last = await act.Db.MaskRevisions.Where(r => r.ConditionId == head.ConditionId).MaxAsync(r => (int?)r.Number, cancellationToken) ?? 0;
        var released = MaskRevisionDocument.Create(head.DeviceId, head.ConditionId, last + 1, document);
        var revision = new MaskRevision
        {
            MaskId = head.Id,
            DeviceId = head.DeviceId,
            ConditionId = head.ConditionId,
            Number = last + 1,
            Document = released.Bytes.ToArray(),
            Sha256 = released.Sha256.ToArray(),
            Reason = reason,
            At = act.At,
            ById = act.ById,
        };
        act.Db.Add(revision);
        return revision;
    }
}

using System.Security.Claims;
using System.Text.Json.Nodes;
using Microsoft.AspNetCore.Http.HttpResults;
using Microsoft.EntityFrameworkCore;
using ResponseLedger.Ledger;
using ResponseLedger.Records.Masks;
using ResponseLedger.Server.Http;
using ResponseLedger.Server.People;
using ResponseLedger.Store;
using ResponseLedger.Store.Acts;
using ResponseLedger.Store.Model;
using ResponseLedger.Store.Reevaluation;

namespace ResponseLedger.Server.Masks;

/// <summary>Makes, saves and discards drafts.</summary>
internal static class DraftMasks
{
    public static async Task<Results<Created<MaskView>, ProblemHttpResult>> CreateAsync(
        Guid id, NewMask request, ClaimsPrincipal user, ActRunner acts, ResponseLedgerContext db, HttpResponse response, CancellationToken cancellationToken)
    {
        try
        {
            var maskId = await acts.RunAsync(CurrentActor.Of(user), (act, token) => DraftAsync(act, id, request, token), cancellationToken);
            var view = await ReadMasks.ViewAsync(db, maskId, cancellationToken);
            response.Headers.ETag = view.Etag;
            return TypedResults.Created($"/api/masks/{maskId}", view);
        }
        catch (RefusedException refused) when (refused.Refusal is DraftExists exists)
        {
            // Told as a member too, so that a program can go on with that draft.
            var problem = RefusalMapping.Describe(exists);
            problem.Extensions["draftId"] = exists.DraftId;
            return TypedResults.Problem(problem);
        }
    }

    public static async Task<Ok<MaskView>> ReplaceAsync(
        Guid id, MaskContent request, ClaimsPrincipal user, ActRunner acts, ResponseLedgerContext db, HttpContext http, CancellationToken cancellationToken)
    {
        var document = request.Read(out _)!;
        await acts.RunAsync(CurrentActor.Of(user), async (act, token) =>
        {
            var (head, draft) = await LockedAsync(act, id, token);
            Demand(http.Request, draft, needed: true);
            if (request.Condition is { } condition && (await ReadMasks.ConditionAsync(act.Db, head.DeviceId, condition, token)).Id != head.ConditionId)
                throw new RefusedException(new FieldRefused("condition", "A draft stays with its condition. Make a new draft for the other one."));

            draft.Document = Text(document);
            draft.Version++;
            draft.ChangedAt = act.At;
            draft.ChangedById = act.ById;
            act.Record("mask.draftChanged", Subject(head), new JsonObject { ["version"] = draft.Version, ["sha256"] = Digest(document) });
            return true;
        }, cancellationToken);
        return ReadMasks.Shown(await ReadMasks.ViewAsync(db, id, cancellationToken), http.Response);
    }

    public static async Task<NoContent> DiscardAsync(
        Guid id, ClaimsPrincipal user, ActRunner acts, HttpRequest http, CancellationToken cancellationToken)
    {
        await acts.RunAsync(CurrentActor.Of(user), async (act, token) =>
        {
            var (head, draft) = await LockedAsync(act, id, token);
            Demand(http, draft, needed: false);
            act.Db.Remove(draft);
            act.Record("mask.draftDiscarded", Subject(head), new JsonObject { ["version"] = draft.Version, ["sha256"] = Digest(MaskViews.Document(draft)) });
            return true;
        }, cancellationToken);
        return TypedResults.NoContent();
    }

    /// <summary>A draft, held until the act ends, so that of two at once the second sees what the first left.</summary>
    /// <exception cref="RefusedException">There is no such mask, or it is released.</exception>
    public static async Task<(MaskHead Head, MaskDraft Draft)> LockedAsync(Act act, Guid id, CancellationToken cancellationToken)
    {
        var head = await act.Db.Masks.AsNoTracking().SingleOrDefaultAsync(m => m.Id == id, cancellationToken)
            ?? throw new RefusedException(new NothingThere("mask"));
        await Turn.TakeAsync(act.Db, head.ConditionId, cancellationToken);
        if (await act.Db.MaskDrafts.SingleOrDefaultAsync(d => d.MaskId == id, cancellationToken) is { } draft)
            return (head, draft);
        throw new RefusedException(await act.Db.MaskRevisions.Where(r => r.MaskId == id).Select(r => (int?)r.Number).SingleOrDefaultAsync(cancellationToken) is { } number
            ? new MaskReleased(number)
            : new NothingThere("mask"));
    }

    /// <summary>Holds the request's If-Match against the draft.</summary>
    /// <exception cref="RefusedException">It is missing where it is needed, or names another state.</exception>
    public static void Demand(HttpRequest request, MaskDraft draft, bool needed)
    {
        var stated = request.Headers.IfMatch.Where(value => value is not null).SelectMany(value => value!.Split(',', StringSplitOptions.TrimEntries)).ToList();
        if (stated.Count == 0 && needed)
            throw new RefusedException(new IfMatchMissing());
        if (stated.Count > 0 && !stated.Contains("*") && !stated.Contains(MaskViews.ETag(draft)))
            throw new RefusedException(new DraftChanged(MaskViews.ETag(draft)));
    }

    /// <summary>How the ledger names a mask.</summary>
    public static JsonObject Subject(MaskHead head) => new()
    {
        ["maskId"] = head.Id.ToString("D"),
        ["deviceId"] = head.DeviceId.ToString("D"),
        ["conditionId"] = head.ConditionId.ToString("D"),
    };

    private static async Task<Guid> DraftAsync(Act act, Guid deviceId, NewMask request, CancellationToken cancellationToken)
    {
        if (!await act.Db.Devices.AnyAsync(d => d.Id == deviceId, cancellationToken))
            throw new RefusedException(new NothingThere("device"));
        var source = request.From is { } from
            ? await MaskViews.Rows(act.Db).SingleOrDefaultAsync(m => m.Head.Id == from && m.Head.DeviceId == deviceId, cancellationToken)
                ?? throw new RefusedException(new FieldRefused("from", "The device has no mask under this id."))
            : null;
        var condition = await ReadMasks.ConditionAsync(act.Db, deviceId, request.Condition ?? source?.Head.ConditionId.ToString("D"), cancellationToken);
        var document = source is null ? request.Read(out _)! : Copy(source, request.Title);

        await Turn.TakeAsync(act.Db, condition.Id, cancellationToken);
        if (await act.Db.MaskDrafts.Where(d => d.ConditionId == condition.Id).Select(d => (Guid?)d.MaskId).SingleOrDefaultAsync(cancellationToken) is { } present)
            throw new RefusedException(new DraftExists(present, condition.Name));

        var head = new MaskHead { Id = act.NewId(), DeviceId = deviceId, ConditionId = condition.Id, At = act.At, ById = act.ById };
        act.Db.Add(head);
        act.Db.Add(new MaskDraft
        {
            MaskId = head.Id,
            ConditionId = condition.Id,
            Document = Text(document),
            Version = 1,
            ChangedAt = act.At,
            ChangedById = act.ById,
        });
        act.Record(
            "mask.drafted",
            Subject(head),
            new JsonObject { ["title"] = document.Title, ["sha256"] = Digest(document), ["from"] = source?.Head.Id.ToString("D") });
        return head.Id;
    }

    private static MaskDocument Copy(MaskRow source, string? title)
    {
        var document = source.Revision is { } revision ? MaskViews.Document(revision) : MaskViews.Document(source.Draft!);
        return title is null ? document : document with { Title = title };
    }

    private static string Text(MaskDocument document) => document.ToJson().ToJsonString();

    private static string Digest(MaskDocument document) => Convert.ToHexStringLower(CanonicalJson.Digest(document.ToCanonicalBytes()));
}

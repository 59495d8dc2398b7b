using System.Globalization;
using System.Text;
using System.Text.Json.Nodes;
using Microsoft.EntityFrameworkCore;
using ResponseLedger.Records;
using ResponseLedger.Records.Masks;
using ResponseLedger.Store;
using ResponseLedger.Store.Model;

namespace ResponseLedger.Server.Masks;

/// <summary>A mask as the API shows it, draft or released.</summary>
internal sealed record MaskView(
    Guid Id,
    Guid DeviceId,
    Guid ConditionId,
    string Condition,
    string State,
    int? Revision,
    string Title,
    JsonArray Limits,
    JsonArray Requirements,
    string? Etag,
    string? Sha256,
    string? Reason,
    DateTimeOffset? ReleasedAt,
    string? ReleasedBy,
    DateTimeOffset? ChangedAt,
    string? ChangedBy,
    IReadOnlyList<DocumentProblem> Problems)
{
    /// <summary>Runs that still wait for their verdict by this mask; only where it was just released.</summary>
    public ReevaluationState? Reevaluation { get; init; }
}

/// <summary>A mask with its draft or its revision, as the store has them.</summary>
internal sealed class MaskRow
{
    public required MaskHead Head { get; init; }
    public required string Condition { get; init; }
    public required MaskDraft? Draft { get; init; }
    public required MaskRevision? Revision { get; init; }
    public required string? By { get; init; }
}

/// <summary>Makes mask views out of rows.</summary>
internal static class MaskViews
{
    /// <summary>Masks that are drafts or released; discarded drafts are left out.</summary>
    public static IQueryable<MaskRow> Rows(ResponseLedgerContext db)
        => from head in db.Masks.AsNoTracking()
           join condition in db.Conditions on head.ConditionId equals condition.Id
           from draft in db.MaskDrafts.Where(d => d.MaskId == head.Id).DefaultIfEmpty()
           from revision in db.MaskRevisions.Where(r => r.MaskId == head.Id).DefaultIfEmpty()
           where draft != null || revision != null
           select new MaskRow
           {
               Head = head,
               Condition = condition.Name,
               Draft = draft,
               Revision = revision,
               By = db.Users.Where(p => p.Id == (revision != null ? revision.ById : draft!.ChangedById)).Select(p => p.DisplayName).FirstOrDefault(),
           };

    /// <summary>The ETag of a draft: its count of saves.</summary>
    public static string ETag(MaskDraft draft) => string.Create(CultureInfo.InvariantCulture, $"\"{draft.Version}\"");

    /// <summary>The view of a row.</summary>
    public static MaskView Of(MaskRow row) => row.Revision is { } revision ? Released(row, revision) : Drafted(row, row.Draft!);

    /// <summary>What a draft's row says.</summary>
    public static MaskDocument Document(MaskDraft draft)
        => MaskDocument.TryParse(Encoding.UTF8.GetBytes(draft.Document), out var document, out var problems)
            ? document
            : throw new InvalidDataException($"The draft {draft.MaskId} cannot be read: {problems[0].Path}: {problems[0].Sentence}");

    /// <summary>What a revision's row says.</summary>
    public static MaskDocument Document(MaskRevision revision)
        => MaskRevisionDocument.TryParse(revision.Document, out var document, out var problems)
            ? document.Mask
            : throw new InvalidDataException($"The mask {revision.MaskId} cannot be read: {problems[0].Path}: {problems[0].Sentence}");

    /// <summary>What keeps a mask from being released; a mask without criteria would pass everything, so it is one of them.</summary>
    public static IReadOnlyList<DocumentProblem> Problems(MaskDocument document)
    {
        var problems = document.ReleaseProblems();
        var empty = document.Mask.Limits.Count == 0 && document.Mask.Requirements.Count == 0;
        return empty && problems.Count == 0
            ? [new DocumentProblem(string.Empty, "The mask has no criterion: every run would pass. Add a limit or a requirement.")]
            : problems;
    }

    private static MaskView Released(MaskRow row, MaskRevision revision)
    {
        var json = Document(revision).ToJson();
        return new MaskView(
            row.Head.Id, row.Head.DeviceId, row.Head.ConditionId, row.Condition, "released", revision.Number,
            (string)json["title"]!, json["limits"]!.AsArray(), json["requirements"]!.AsArray(),
            null, Convert.ToHexStringLower(revision.Sha256), revision.Reason, revision.At, row.By, null, null, []);
    }

    private static MaskView Drafted(MaskRow row, MaskDraft draft)
    {
        var document = Document(draft);
        var json = document.ToJson();
        return new MaskView(
            row.Head.Id, row.Head.DeviceId, row.Head.ConditionId, row.Condition, "draft", null,
            document.Title, json["limits"]!.AsArray(), json["requirements"]!.AsArray(),
            ETag(draft), null, null, null, null, draft.ChangedAt, row.By, Problems(document));
    }
}

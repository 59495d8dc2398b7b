using System.Text.Json.Nodes;
using Microsoft.AspNetCore.Http.HttpResults;
using Microsoft.EntityFrameworkCore;
using ResponseLedger.Records.Masks;
using ResponseLedger.Records.Verdicts;
using ResponseLedger.Server.Runs.Upload;
using ResponseLedger.Store;
using ResponseLedger.Store.Judging;

namespace ResponseLedger.Server.Runs;

/// <summary>
/// GET /api/runs/{id}/verdict: the verdict with <c>maskId</c>, <c>runId</c>, <c>pinned</c> (a decision rests on it) and <c>stored</c> beside it.
/// Without a released mask the members are the same, empty, with <c>verdict: null</c> and <c>reason: "noReleasedMask"</c>.
/// </summary>
internal static class RunVerdictRoute
{
    public static async Task<Ok<JsonObject>> GetAsync(Guid id, ResponseLedgerContext db, RunVerdicts verdicts, CancellationToken cancellationToken)
    {
        await ReadRuns.ReadingOfAsync(db, id, cancellationToken);
        var verdict = await verdicts.OfAsync(id, cancellationToken);
        var json = verdict is null
            ? Nothing()
            : VerdictDocument.Write(verdict.Evaluation, verdict.Basis.Mask.Mask, verdict.Basis.Mask.Revision, verdict.EngineVersion);
        json["maskId"] = verdict is null ? null : (await MaskIdAsync(db, verdict.Basis.Mask, cancellationToken)).ToString();
        json["runId"] = id.ToString();
        json["pinned"] = verdict?.Pinned ?? false;
        json["stored"] = verdict?.Stored ?? false;
        return TypedResults.Ok(json);
    }

    private static Task<Guid> MaskIdAsync(ResponseLedgerContext db, MaskRevisionDocument mask, CancellationToken cancellationToken)
        => db.MaskRevisions.Where(m => m.ConditionId == mask.ConditionId && m.Number == mask.Revision).Select(m => m.MaskId).SingleAsync(cancellationToken);

    private static JsonObject Nothing() => new()
    {
        ["verdict"] = null,
        ["reason"] = UploadResult.NoReleasedMask,
        ["outcome"] = null,
        ["worst"] = null,
        ["criteria"] = new JsonArray(),
        ["measures"] = new JsonObject(),
        ["maskRevision"] = null,
        ["engine"] = Judge.EngineVersion,
    };
}

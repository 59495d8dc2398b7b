using System.Security.Cryptography;
using System.Text.Json.Nodes;
using Microsoft.EntityFrameworkCore;
using Microsoft.Extensions.DependencyInjection;
using ResponseLedger.Ledger;
using ResponseLedger.Store;
using ResponseLedger.Store.Acts;
using ResponseLedger.Store.Model;

namespace ResponseLedger.Server.Tests.Runs;

/// <summary>Decides a lot by rows alone, so that these tests stand without the routes of sign-off.</summary>
internal static class SceneDecision
{
    public static async Task DecideAsync(this RunScene scene)
    {
        var lotId = Guid.Parse(scene.LotId);
        await scene.Lab.Services.GetRequiredService<ActRunner>().RunAsync(
            Actor.Server,
            async (act, token) =>
            {
                var decision = new Decision
                {
                    Id = act.NewId(),
                    LotId = lotId,
                    Ordinal = 1,
                    Kind = "reject",
                    Reason = "for the test",
                    Record = """{"conditions":[]}"""u8.ToArray(),
                    Sha256 = SHA256.HashData("""{"conditions":[]}"""u8),
                    At = act.At,
                    ById = Guid.Empty,
                };
                act.Db.Decisions.Add(decision);
                var pins = await (
                    from assignment in act.Db.RunAssignments
                    join reading in act.Db.Readings on assignment.RunId equals reading.RunId
                    join verdict in act.Db.Verdicts on reading.Id equals verdict.ReadingId
                    where assignment.LotId == lotId
                    select new { assignment.UnitId, assignment.ConditionId, assignment.RunId, reading.Id, VerdictId = verdict.Id }).ToListAsync(token);
                act.Db.DecisionVerdicts.AddRange(pins.Select(p => new DecisionVerdict
                {
                    DecisionId = decision.Id,
                    UnitId = p.UnitId,
                    ConditionId = p.ConditionId,
                    RunId = p.RunId,
                    ReadingId = p.Id,
                    VerdictId = p.VerdictId,
                }));
                act.Record("lot.decided", new JsonObject { ["lotId"] = scene.LotId }, new JsonObject { ["decision"] = "reject" });
                return true;
            },
            default);
    }

    /// <summary>How many rows there are of the things that an upload makes.</summary>
    public static async Task<(int Runs, int Files, int Units, int Entries)> CountAsync(this Lab lab)
    {
        await using var scope = lab.Services.CreateAsyncScope();
        var db = scope.ServiceProvider.GetRequiredService<ResponseLedgerContext>();
        return (await db.Runs.CountAsync(), await db.Files.CountAsync(), await db.Units.CountAsync(), await db.LedgerEntries.CountAsync());
    }

    /// <summary>The kinds of ledger entries whose bytes mention a text.</summary>
    public static async Task<List<string>> LedgerKindsAsync(this Lab lab, string mentioned)
    {
        await using var scope = lab.Services.CreateAsyncScope();
        var db = scope.ServiceProvider.GetRequiredService<ResponseLedgerContext>();
        var entries = await db.LedgerEntries.AsNoTracking().ToListAsync();
        return [.. entries.Where(e => System.Text.Encoding.UTF8.GetString(e.Bytes).Contains(mentioned, StringComparison.Ordinal)).Select(e => e.Kind)];
    }
}

using Microsoft.EntityFrameworkCore;
using ResponseLedger.Engine.Masks;
using ResponseLedger.Store.Judging;

namespace ResponseLedger.Server.Tests.Reevaluation;

/// <summary>What the store says of runs' verdicts.</summary>
internal static class Verdicts
{
    /// <summary>Outcomes of the newest readings of these runs on the basis in force, in the order of the runs; null where there is none.</summary>
    public static async Task<List<Outcome?>> OutcomesAsync(this Lab lab, Guid conditionId, IReadOnlyList<Guid> runIds)
    {
        await using var db = lab.Look();
        var basis = await CurrentBases.FindAsync(db, conditionId, TestContext.Current.CancellationToken) ?? throw new InvalidOperationException("No basis is in force.");
        var found = await (
            from run in db.Runs
            where runIds.Contains(run.Id)
            let reading = db.Readings.Where(r => r.RunId == run.Id).OrderByDescending(r => r.Number).First()
            select new
            {
                run.Id,
                Outcome = db.Verdicts.Where(v => v.ReadingId == reading.Id && v.BasisId == basis.BasisId).Select(v => (short?)v.Outcome).SingleOrDefault(),
            }).ToDictionaryAsync(row => row.Id, row => (Outcome?)row.Outcome);
        return [.. runIds.Select(id => found[id])];
    }

    /// <summary>How many verdicts these runs have, on whatever basis.</summary>
    public static async Task<int> CountAsync(this Lab lab, IReadOnlyList<Guid> runIds)
    {
        await using var db = lab.Look();
        return await db.Verdicts.CountAsync(v => db.Readings.Any(r => r.Id == v.ReadingId && runIds.Contains(r.RunId)));
    }

    /// <summary>Signs a lot off without looking at it: only that it is decided matters here.</summary>
    public static Task<Guid> DecideAsync(this Lab lab, Guid lotId, int ordinal = 1)
        => lab.ActAsync("lot.decided", act =>
        {
            var record = """{"conditions":[],"meaning":"rejected","signer":{"personId":"0199aaaa-0000-7000-8000-000000000002","name":"Test","email":"test@example.test"}}"""u8.ToArray();
            var decision = new Store.Model.Decision
            {
                Id = act.NewId(),
                LotId = lotId,
                Ordinal = ordinal,
                Kind = "reject",
                Reason = "For a test",
                Record = record,
                Sha256 = System.Security.Cryptography.SHA256.HashData(record),
                At = act.At,
                ById = act.ById,
            };
            act.Db.Add(decision);
            return decision.Id;
        });

    /// <summary>Reopens a decided lot.</summary>
    public static Task<bool> ReopenAsync(this Lab lab, Guid lotId, Guid decisionId)
        => lab.ActAsync("lot.reopened", act =>
        {
            act.Db.Add(new Store.Model.Reopening { DecisionId = decisionId, LotId = lotId, Reason = "For a test", At = act.At, ById = act.ById });
            return true;
        });
}

using System.Net;
using System.Net.Http.Json;
using Microsoft.EntityFrameworkCore;
using Microsoft.Extensions.DependencyInjection;
using ResponseLedger.Store;

namespace ResponseLedger.Server.Tests.Runs;

/// <summary>What these tests need around runs: a decided lot, and looks at the store.</summary>
internal static class SceneDecision
{
    public static async Task DecideAsync(this RunScene scene)
        => await (await scene.Engineer.PostAsJsonAsync($"/api/lots/{scene.LotId}/decisions", new { decision = "reject", reason = "For the test.", password = Lab.Password }))
            .ShouldBeAsync(HttpStatusCode.Created);

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

using System.Net;
using System.Text.Json;
using Microsoft.EntityFrameworkCore;
using Microsoft.Extensions.DependencyInjection;
using Microsoft.Extensions.Time.Testing;
using ResponseLedger.Engine.Masks;
using ResponseLedger.Server.Tests.Devices;
using ResponseLedger.Server.Tests.Masks;
using ResponseLedger.Store.Judging;
using ResponseLedger.Store.Reevaluation;

namespace ResponseLedger.Server.Tests.Reevaluation;

/// <summary>Re-evaluation of more runs than a request waits for.</summary>
public sealed class LongReevaluationTests(Lab lab)
{
    private const int Runs = 2_000;

    private static readonly TimeSpan Patience = TimeSpan.FromMinutes(2);

    [Fact]
    public async Task Two_thousand_runs_get_their_verdicts_and_the_ledger_tells_of_each()
    {
        var device = await lab.NewDeviceAsync();
        var lot = await lab.NewLotAsync(device.Id, Runs);
        var runs = await lab.AddRunsAsync(device.Id, device.ConditionId, lot, Enumerable.Range(0, Runs).Select(i => i % 2 == 0 ? 0.0 : 2.0));

        var since = TimeProvider.System.GetTimestamp();
        var view = await lab.ReleaseAsync(device.Id, MaskJson.Upper(1));
        Assert.InRange(view.GetProperty("reevaluation").GetProperty("pending").GetInt32(), 0, Runs);

        var auditor = await lab.SignInAsync("auditor");
        while (await PendingAsync(auditor, device.ConditionId) > 0)
        {
            Assert.True(TimeProvider.System.GetElapsedTime(since) < Patience, "The background did not finish.");
            await Task.Delay(50, TestContext.Current.CancellationToken);
        }

        var outcomes = await lab.OutcomesAsync(device.ConditionId, runs);
        Assert.Equal((Runs / 2, Runs / 2), (outcomes.Count(o => o == Outcome.Pass), outcomes.Count(o => o == Outcome.Fail)));
        Assert.Equal(Runs, await ToldAsync(lab, device.ConditionId));
    }

    [Fact]
    public async Task What_was_interrupted_goes_on_where_it_stopped_and_doubles_nothing()
    {
        // A lab whose clock stands still: nothing but this test evaluates there.
        await using var still = await Lab.StartAsync(clock: new FakeTimeProvider(TimeProvider.System.GetUtcNow()));
        var device = await still.NewDeviceAsync();
        var lot = await still.NewLotAsync(device.Id, Runs);
        await still.ReleaseAsync(device.Id, MaskJson.Upper(1));
        var runs = await still.AddRunsAsync(device.Id, device.ConditionId, lot, Enumerable.Repeat(0.0, Runs));
        var reevaluator = still.Services.GetRequiredService<Reevaluator>();

        using (var interruption = CancellationTokenSource.CreateLinkedTokenSource(TestContext.Current.CancellationToken))
        {
            var sweep = reevaluator.SweepAsync(device.ConditionId, null, interruption.Token);
            while (!sweep.IsCompleted && await still.CountAsync(runs) == 0)
                await Task.Delay(1, TestContext.Current.CancellationToken);
            await interruption.CancelAsync();
            await Assert.ThrowsAnyAsync<OperationCanceledException>(() => sweep);
        }

        var kept = await still.CountAsync(runs);
        Assert.InRange(kept, 1, Runs);
        Assert.Equal(0, kept % Reevaluator.BatchSize);

        // Two at once, as on two servers: each verdict is written once all the same.
        using var second = ActivatorUtilities.CreateInstance<Reevaluator>(still.Services);
        await Task.WhenAll(
            reevaluator.SweepAsync(device.ConditionId, null, TestContext.Current.CancellationToken),
            second.SweepAsync(device.ConditionId, null, TestContext.Current.CancellationToken));
        Assert.Equal(Runs, await still.CountAsync(runs));
        Assert.All(await still.OutcomesAsync(device.ConditionId, runs), o => Assert.Equal(Outcome.Pass, o));
        Assert.Equal(Runs, await ToldAsync(still, device.ConditionId));
    }

    private static async Task<int> PendingAsync(HttpClient client, Guid conditionId)
    {
        var report = await (await client.GetAsync("/api/reevaluation", TestContext.Current.CancellationToken)).ShouldBeAsync(HttpStatusCode.OK);
        return report.GetProperty("items").EnumerateArray()
            .Where(i => i.GetProperty("conditionId").GetGuid() == conditionId)
            .Select(i => i.GetProperty("pending").GetInt32()).SingleOrDefault();
    }

    private static async Task<int> ToldAsync(Lab lab, Guid conditionId)
    {
        await using var db = lab.Look();
        var basis = await CurrentBases.FindAsync(db, conditionId, TestContext.Current.CancellationToken);
        var entries = await db.LedgerEntries.Where(e => e.Kind == "verdicts.reevaluated").Select(e => e.Bytes).ToListAsync();
        return entries.Select(bytes => JsonDocument.Parse(bytes).RootElement)
            .Where(e => e.GetProperty("subject").TryGetProperty("basisId", out var id) && id.GetGuid() == basis!.BasisId)
            .Sum(e => e.GetProperty("detail").GetProperty("count").GetInt32());
    }
}

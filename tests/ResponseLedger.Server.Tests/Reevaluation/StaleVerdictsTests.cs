using Microsoft.Extensions.DependencyInjection;
using Microsoft.Extensions.Time.Testing;
using ResponseLedger.Server.Tests.Devices;
using ResponseLedger.Server.Tests.Masks;
using ResponseLedger.Store.Judging;
using ResponseLedger.Store.Model;
using ResponseLedger.Store.Reevaluation;

namespace ResponseLedger.Server.Tests.Reevaluation;

/// <summary>What counts as stale, in a lab whose clock stands still: nothing but the test evaluates there.</summary>
public sealed class StaleVerdictsTests : IAsyncLifetime
{
    private Lab lab = null!;

    private Reevaluator Reevaluator => lab.Services.GetRequiredService<Reevaluator>();

    public async ValueTask InitializeAsync() => lab = await Lab.StartAsync(clock: new FakeTimeProvider(TimeProvider.System.GetUtcNow()));

    public ValueTask DisposeAsync() => lab.DisposeAsync();

    [Fact]
    public async Task Counting_runs_without_a_verdict_in_force_are_stale_and_others_are_not_counted()
    {
        var device = await lab.NewDeviceAsync();
        var lot = await lab.NewLotAsync(device.Id);
        await lab.ReleaseAsync(device.Id, MaskJson.Upper(1));
        var runs = await lab.AddRunsAsync(device.Id, device.ConditionId, lot, [0, 0, 0]);
        await lab.AddRunsAsync(device.Id, device.ConditionId, lot, [0], "study");
        await lab.ActAsync("run.invalidated", act =>
        {
            act.Db.Add(new RunInvalidation { RunId = runs[0], Cause = "cable", Reason = "For a test", At = act.At, ById = act.ById });
            return true;
        });

        Assert.Equal(2, await StaleAsync(lot));
        await Reevaluator.SweepAsync(device.ConditionId, null, TestContext.Current.CancellationToken);
        Assert.Equal(0, await StaleAsync(lot));
    }

    [Fact]
    public async Task What_is_reported_as_in_force_is_what_intake_looks_up()
    {
        var device = await lab.NewDeviceAsync();
        var lot = await lab.NewLotAsync(device.Id);
        await lab.ReleaseAsync(device.Id, MaskJson.Upper(1));
        await lab.ReleaseAsync(device.Id, MaskJson.Upper(2));
        await lab.AddRunsAsync(device.Id, device.ConditionId, lot, [0, 1]);

        await using var db = lab.Look();
        var expected = await CurrentBases.FindAsync(db, device.ConditionId, TestContext.Current.CancellationToken);
        var (basis, pending) = Assert.Single(await Reevaluator.PendingAsync(TestContext.Current.CancellationToken));

        Assert.Equal((expected!.BasisId, expected.MaskRevision, 2), (basis.BasisId!.Value, basis.MaskRevision, pending));
    }

    private async Task<int> StaleAsync(Guid lotId)
    {
        await using var db = lab.Look();
        return await StaleVerdicts.CountAsync(db, lotId, TestContext.Current.CancellationToken);
    }
}

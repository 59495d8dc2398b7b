using Microsoft.EntityFrameworkCore;
using Microsoft.Extensions.DependencyInjection;
using ResponseLedger.Engine.Masks;
using ResponseLedger.Server.Tests.Devices;
using ResponseLedger.Server.Tests.Masks;
using ResponseLedger.Store.Model;
using ResponseLedger.Store.Reevaluation;

namespace ResponseLedger.Server.Tests.Reevaluation;

public sealed class ReevaluationTests(Lab lab)
{
    private Reevaluator Reevaluator => lab.Services.GetRequiredService<Reevaluator>();

    [Fact]
    public async Task Open_lots_follow_a_release_and_what_was_found_before_stays()
    {
        var device = await lab.NewDeviceAsync();
        var lot = await lab.NewLotAsync(device.Id);
        var runs = await lab.AddRunsAsync(device.Id, device.ConditionId, lot, [0, 2, 4]);

        var first = await lab.ReleaseAsync(device.Id, MaskJson.Upper(1));
        Assert.Equal(0, first.GetProperty("reevaluation").GetProperty("pending").GetInt32());
        Assert.Equal([Outcome.Pass, Outcome.Fail, Outcome.Fail], await lab.OutcomesAsync(device.ConditionId, runs));

        await lab.ReleaseAsync(device.Id, MaskJson.Upper(3));
        Assert.Equal([Outcome.Pass, Outcome.Pass, Outcome.Fail], await lab.OutcomesAsync(device.ConditionId, runs));
        Assert.Equal(6, await lab.CountAsync(runs));
    }

    [Fact]
    public async Task A_decided_lot_keeps_what_it_was_signed_on_until_it_is_reopened()
    {
        var device = await lab.NewDeviceAsync();
        var lot = await lab.NewLotAsync(device.Id);
        var other = await lab.NewLotAsync(device.Id);
        var runs = await lab.AddRunsAsync(device.Id, device.ConditionId, lot, [0, 2]);
        var others = await lab.AddRunsAsync(device.Id, device.ConditionId, other, [2]);
        await lab.ReleaseAsync(device.Id, MaskJson.Upper(1));

        var decision = await lab.DecideAsync(lot);
        await lab.ReleaseAsync(device.Id, MaskJson.Upper(3));
        await Reevaluator.SweepAllAsync(TestContext.Current.CancellationToken);
        Assert.Equal(2, await lab.CountAsync(runs));
        Assert.Equal([Outcome.Pass], await lab.OutcomesAsync(device.ConditionId, others));
        Assert.Equal(0, await StaleAsync(lot));

        await lab.ReopenAsync(lot, decision);
        await Reevaluator.SweepAsync(device.ConditionId, null, TestContext.Current.CancellationToken);
        Assert.Equal([Outcome.Pass, Outcome.Pass], await lab.OutcomesAsync(device.ConditionId, runs));
        Assert.Equal(0, await StaleAsync(lot));
    }

    [Fact]
    public async Task Without_a_lot_or_a_mask_nothing_is_stale()
    {
        var device = await lab.NewDeviceAsync();
        var lot = await lab.NewLotAsync(device.Id);
        var unjudged = await lab.AddRunsAsync(device.Id, device.ConditionId, lot, [0]);
        Assert.Equal(0, await StaleAsync(lot));
        Assert.Equal(0, await Reevaluator.SweepAsync(device.ConditionId, null, TestContext.Current.CancellationToken));
        Assert.Equal(0, await lab.CountAsync(unjudged));

        var lotless = await lab.AddRunsAsync(device.Id, device.ConditionId, null, [0], "golden");
        await lab.ReleaseAsync(device.Id, MaskJson.Upper(1));
        Assert.Equal(0, await lab.CountAsync(lotless));
    }

    [Fact]
    public async Task A_run_moved_to_another_condition_and_a_new_reading_are_evaluated_by_what_is_in_force_there()
    {
        var device = await lab.NewDeviceAsync();
        var lot = await lab.NewLotAsync(device.Id);
        var hot = await lab.ActAsync("condition.added", act =>
        {
            var condition = new Condition { Id = act.NewId(), DeviceId = device.Id, Ordinal = 1, Name = "hot", At = act.At, ById = act.ById };
            act.Db.Add(condition);
            return condition.Id;
        });
        var runs = await lab.AddRunsAsync(device.Id, device.ConditionId, lot, [2, 0]);
        await lab.ReleaseAsync(device.Id, MaskJson.Upper(1));
        await lab.ReleaseAsync(device.Id, MaskJson.Upper(3, condition: "hot"));

        await using (var db = lab.Look())
        {
            var was = await db.RunAssignments.SingleAsync(a => a.RunId == runs[0]);
            await lab.ActAsync("run.reassigned", act =>
            {
                act.Db.Add(new RunAssignment { RunId = was.RunId, Number = 1, UnitId = was.UnitId, LotId = was.LotId, ConditionId = hot, Reason = "For a test", At = act.At });
                return true;
            });
        }

        await lab.ReadAgainAsync(runs[1], 2, 5);
        await Reevaluator.SweepAllAsync(TestContext.Current.CancellationToken);

        Assert.Equal([Outcome.Pass], await lab.OutcomesAsync(hot, [runs[0]]));
        Assert.Equal([Outcome.Fail], await lab.OutcomesAsync(device.ConditionId, [runs[1]]));
    }

    [Fact]
    public async Task A_reading_that_cannot_be_evaluated_stays_stale_and_keeps_no_other_waiting()
    {
        var device = await lab.NewDeviceAsync();
        var lot = await lab.NewLotAsync(device.Id);
        var broken = await lab.AddRunsAsync(device.Id, device.ConditionId, lot, [0]);
        await lab.ActAsync("run.readAgain", act =>
        {
            var sha = act.Db.Readings.Where(r => r.RunId == broken[0]).Select(r => r.GridSha256).First();
            var reading = new Reading { Id = act.NewId(), RunId = broken[0], Number = 2, Reader = "delimited", ReaderVersion = 1, GridSha256 = sha, Form = 1, Points = 7, Notes = "[]", At = act.At };
            act.Db.AddRange(reading, new Curve { ReadingId = reading.Id, Planes = new byte[16] });
            return true;
        });
        var sound = await lab.AddRunsAsync(device.Id, device.ConditionId, lot, [0, 0]);

        var view = await lab.ReleaseAsync(device.Id, MaskJson.Upper(1));

        Assert.Equal(1, view.GetProperty("reevaluation").GetProperty("pending").GetInt32());
        Assert.Equal([Outcome.Pass, Outcome.Pass], await lab.OutcomesAsync(device.ConditionId, sound));
        Assert.Equal(1, await StaleAsync(lot));
        await lab.DecideAsync(lot);
    }

    private async Task<int> StaleAsync(Guid lotId)
    {
        await using var db = lab.Look();
        return await StaleVerdicts.CountAsync(db, lotId, TestContext.Current.CancellationToken);
    }
}

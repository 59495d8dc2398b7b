using System.Text.Json.Nodes;
using Microsoft.EntityFrameworkCore;
using ResponseLedger.Ledger;
using ResponseLedger.TestDatabase;

namespace ResponseLedger.Store.Tests;

public sealed class ActTests
{
    private static readonly Actor Ada = Actor.Person(SampleRows.NewId(), "Ada");
    private static CancellationToken Cancellation => TestContext.Current.CancellationToken;

    [Fact]
    public async Task A_fault_at_any_command_leaves_the_whole_act_or_nothing()
    {
        await using var store = await TestDatabases.CreateAsync();
        for (var at = 1; ; at++)
        {
            var before = await CountAsync(store);
            var faults = new Faults(at, transient: false);
            var failed = await Record.ExceptionAsync(() => RunAsync(store, faults, $"fault {at}"));
            var after = await CountAsync(store);
            if (!faults.Struck)
            {
                Assert.Null(failed);
                Assert.Equal(before.Whole(), after);
                Assert.True(at > 5, "The act has two saves, a read, its entries and a commit: fewer faults than that were tried.");
                return;
            }

            Assert.IsType<InjectedFaultException>(failed?.GetBaseException());
            Assert.True(after == before || after == before.Whole(), $"fault {at}: {before} became {after}");
        }
    }

    [Fact]
    public async Task A_connection_cut_at_any_command_or_around_the_commit_leaves_the_act_done_exactly_once()
    {
        await using var store = await TestDatabases.CreateAsync();
        for (var at = 1; ; at++)
        {
            var before = await CountAsync(store);
            var faults = new Faults(at, transient: true);
            var answered = await RunAsync(store, faults, $"cut {at}");
            Assert.True(before.Whole() == await CountAsync(store), $"cut {at}: the act was not done exactly once");
            await using var db = Contexts.Open(store.ServerConnectionString);
            Assert.Equal(answered, await db.Benches.Where(b => b.Name == $"cut {at}").Select(b => b.Id).SingleAsync(Cancellation));
            if (!faults.Struck)
                return;
        }
    }

    [Fact]
    public async Task An_act_that_tells_the_ledger_nothing_is_not_done()
    {
        await using var store = await TestDatabases.CreateAsync();
        await using var contexts = new Contexts(store.ServerConnectionString);
        using var sequencer = contexts.Sequencer();
        await Assert.ThrowsAsync<InvalidOperationException>(() => contexts.Acts(sequencer).RunAsync(
            Ada,
            (act, _) =>
            {
                act.Db.Add(new Model.Bench { Id = act.NewId(), Name = "silent", At = act.At, ById = act.ById });
                return Task.FromResult(0);
            },
            Cancellation));
        Assert.Equal(new Counts(0, 0, 0, 0), await CountAsync(store));
    }

    private static async Task<Guid> RunAsync(TestStore store, Faults faults, string name)
    {
        await using var contexts = new Contexts(store.ServerConnectionString, faults);
        using var sequencer = contexts.Sequencer();
        return await contexts.Acts(sequencer).RunAsync(
            Ada,
            async (act, token) =>
            {
                var bench = new Model.Bench { Id = act.NewId(), Name = name, At = act.At, ById = act.ById };
                act.Db.Add(bench);
                await act.Db.SaveChangesAsync(token);
                Assert.Equal(1, await act.Db.Benches.CountAsync(b => b.Name == name, token));
                act.Db.Add(new Model.BenchSetting { Id = act.NewId(), BenchId = bench.Id, Number = 1, At = act.At, ById = act.ById });
                act.Record("bench.made", new JsonObject { ["bench"] = bench.Id.ToString() }, new JsonObject { ["name"] = name });
                act.Record("bench.set", new JsonObject { ["bench"] = bench.Id.ToString() }, []);
                return bench.Id;
            },
            Cancellation);
    }

    private static async Task<Counts> CountAsync(TestStore store)
    {
        await using var db = Contexts.Open(store.ServerConnectionString);
        return new Counts(
            await db.Benches.CountAsync(Cancellation),
            await db.BenchSettings.CountAsync(Cancellation),
            await db.LedgerEntries.CountAsync(Cancellation),
            await db.LedgerQueue.CountAsync(Cancellation));
    }

    private sealed record Counts(int Benches, int Settings, int Entries, int Waiting)
    {
        public Counts Whole() => new(Benches + 1, Settings + 1, Entries + 2, Waiting + 2);
    }
}

using System.Text.Json.Nodes;
using Microsoft.EntityFrameworkCore;
using ResponseLedger.Ledger;
using ResponseLedger.TestDatabase;

namespace ResponseLedger.Store.Tests;

public sealed class LedgerSequencerTests
{
    private const int Writers = 8;
    private const int ActsPerWriter = 25;
    private const int EntriesPerAct = 3;

    [Fact]
    public async Task Eight_writers_and_two_sequencers_give_positions_without_gaps_in_each_writers_order()
    {
        var cancellation = TestContext.Current.CancellationToken;
        await using var store = await TestDatabases.CreateAsync();
        await using var contexts = new Contexts(store.ServerConnectionString);
        using var first = contexts.Sequencer();
        using var second = contexts.Sequencer();
        var writing = Task.WhenAll(Enumerable.Range(0, Writers).Select(writer => Task.Run(
            async () =>
            {
                var acts = contexts.Acts(writer % 2 == 0 ? first : second);
                for (var n = 0; n < ActsPerWriter; n++)
                {
                    await acts.RunAsync(
                        Actor.Server,
                        (act, _) =>
                        {
                            for (var e = 0; e < EntriesPerAct; e++)
                                act.Record($"w{writer}", [], new JsonObject { ["order"] = (n * EntriesPerAct) + e });
                            return Task.FromResult(0);
                        },
                        cancellation);
                }
            },
            cancellation)));
        await Task.WhenAll(GiveUntilWrittenAsync(first), GiveUntilWrittenAsync(second));
        await first.GiveAsync(cancellation);

        await using var db = contexts.CreateDbContext();
        Assert.Equal(0, await db.LedgerQueue.CountAsync(cancellation));
        var given = await db.LedgerPositions.Join(db.LedgerEntries, p => p.EntryId, e => e.Id, (p, e) => new { p.Position, e.Kind, e.Bytes })
            .OrderBy(p => p.Position).ToListAsync(cancellation);
        Assert.Equal(Enumerable.Range(0, Writers * ActsPerWriter * EntriesPerAct).Select(n => (long)n), given.Select(p => p.Position));
        foreach (var writer in given.GroupBy(p => p.Kind))
            Assert.Equal(Enumerable.Range(0, ActsPerWriter * EntriesPerAct), writer.Select(p => JsonNode.Parse(p.Bytes)!["detail"]!["order"]!.GetValue<int>()));

        async Task GiveUntilWrittenAsync(Acts.LedgerSequencer sequencer)
        {
            while (!writing.IsCompleted)
            {
                await sequencer.WaitAsync(cancellation);
                await sequencer.GiveAsync(cancellation);
            }

            await writing;
        }
    }
}

using System.Data;
using System.Text.Json.Nodes;
using Microsoft.EntityFrameworkCore;
using Npgsql;
using ResponseLedger.Ledger;
using ResponseLedger.Store.Acts;
using ResponseLedger.TestDatabase;
using static ResponseLedger.Store.Queries.PreparedBatch;

namespace ResponseLedger.Store.Tests;

/// <summary>A connection that breaks between two statements of an act, unseen by the one that was just sent.</summary>
public sealed class BrokenConnectionTests
{
    private static readonly Actor Ada = Actor.Person(SampleRows.NewId(), "Ada");
    private static CancellationToken Cancellation => TestContext.Current.CancellationToken;

    [Theory]
    [InlineData("nothing", true)]
    [InlineData("nothing", false)]
    [InlineData("rows", true)]
    [InlineData("rows", false)]
    [InlineData("a query", true)]
    [InlineData("a batch", true)]
    public async Task The_act_is_done_whole_and_once_whatever_follows_the_break(string follows, bool savepoints)
    {
        await using var store = await TestDatabases.CreateAsync();
        await using var contexts = new Contexts(store.ServerConnectionString);
        using var sequencer = contexts.Sequencer();
        var attempts = 0;

        await contexts.Acts(sequencer).RunAsync(
            Ada,
            async (act, token) =>
            {
                var breaks = ++attempts == 1;
                act.Db.Database.AutoSavepointsEnabled = savepoints;
                act.Record("bench.made", new JsonObject { ["attempt"] = attempts }, []);
                await WriteAsync(act, "before the break", token);
                if (breaks)
                    await BreakAsync((NpgsqlConnection)act.Db.Database.GetDbConnection(), store);
                if (follows == "rows")
                    act.Db.Add(new Model.Bench { Id = act.NewId(), Name = "after", At = act.At, ById = act.ById });
                else if (follows == "a query")
                    Assert.Equal(1, await act.Db.Benches.CountAsync(token));
                else if (follows == "a batch")
                    await WriteAsync(act, "after", token);
                return true;
            },
            Cancellation);

        Assert.Equal(2, attempts);
        await using var db = Contexts.Open(store.ServerConnectionString);
        Assert.Equal(follows is "rows" or "a batch" ? ["after", "before the break"] : ["before the break"], await db.Benches.Select(b => b.Name).Order().ToListAsync(Cancellation));
        var entry = Assert.Single(await db.LedgerEntries.ToListAsync(Cancellation));
        Assert.Equal(2, JsonNode.Parse(entry.Bytes)!["subject"]!["attempt"]!.GetValue<int>());
        Assert.Single(await db.LedgerQueue.ToListAsync(Cancellation));
    }

    // As the intake writes: by a batch on the connection, which the context knows nothing of.
    private static async Task WriteAsync(Act act, string name, CancellationToken cancellationToken)
    {
        await using var batch = On(act.Db);
        batch.Add("insert into bench (id, name, at, by_id) values ($1, $2, $3, $4)", Of(act.NewId()), Of(name), Of(act.At), Of(act.ById));
        await batch.PrepareAsync(cancellationToken);
        await batch.ExecuteNonQueryAsync(cancellationToken);
    }

    private static async Task BreakAsync(NpgsqlConnection connection, TestStore store)
    {
        await using var other = await Sql.OpenAsync(store.OwnerConnectionString);
        await Sql.RunAsync(other, $"select pg_terminate_backend({connection.ProcessID})");
        await Assert.ThrowsAnyAsync<NpgsqlException>(async () =>
        {
            await using var probe = new NpgsqlCommand("select 1", connection);
            while (true)
                await probe.ExecuteScalarAsync(Cancellation);
        });
        Assert.NotEqual(ConnectionState.Open, connection.State);
    }
}

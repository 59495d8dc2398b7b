using System.Net;
using System.Security.Cryptography;
using System.Text;
using Microsoft.Extensions.Time.Testing;
using Npgsql;
using ResponseLedger.Server.Tests.Lots;
using ResponseLedger.Server.Tests.Reevaluation;

namespace ResponseLedger.Server.Tests.SignOff;

/// <summary>What is signed stays readable, and is dated after everything that it rests on.</summary>
public sealed class SignedRecordTests(Lab lab)
{
    [Theory]
    [InlineData("")]
    [InlineData("/units")]
    [InlineData("/statistics")]
    [InlineData("/overlay")]
    public async Task No_text_in_a_signed_record_can_break_the_pages_of_its_lot(string page)
    {
        var scene = await LotScene.NewAsync(lab, 1);
        var conditionId = (await scene.GetAsync($"/api/devices/{scene.DeviceId}")).GetProperty("conditions")[0].GetProperty("id").GetString();
        var record = Encoding.UTF8.GetBytes(
            $$"""
            {"conditions":[{"conditionId":"{{conditionId}}","goldenReadingId":null,"goldenRunId":null,"maskRevision":null,"maskRevisionId":null,"name":"a\u0000b"}],"meaning":"rej\u0000ected","signer":{"email":"t@example.test","name":"T\u0000est \\u0000","personId":"0199aaaa-0000-7000-8000-000000000002"},"units":[{"serial":"\u0000"}]}
            """);
        await lab.ActAsync("lot.decided", act =>
        {
            act.Db.Add(new Store.Model.Decision
            {
                Id = act.NewId(), LotId = scene.LotId, Ordinal = 1, Kind = "reject", Reason = "For a test", Record = record, Sha256 = SHA256.HashData(record), At = act.At, ById = act.ById,
            });
            return true;
        });

        await scene.GetAsync($"/api/lots/{scene.LotId}{page}");

        var listed = (await scene.GetAsync($"/api/lots?search={scene.LotNumber}")).Item("id", scene.LotId.ToString());
        Assert.Equal("rejected", listed.GetProperty("state").GetString());
        Assert.StartsWith("T\uFFFDest", listed.GetProperty("decision").GetProperty("signedBy").GetProperty("name").GetString(), StringComparison.Ordinal);
    }

    [Fact]
    public async Task An_act_on_a_lot_is_dated_when_it_got_the_lots_lock_and_not_when_it_began_to_wait()
    {
        var clock = new FakeTimeProvider(TimeProvider.System.GetUtcNow());
        await using var own = await Lab.StartAsync(clock: clock);
        var scene = await LotScene.NewAsync(own, 1);
        await scene.SendAsync("a", 3);

        var disposition = await WaitingAsync(own, scene, () => scene.DispositionAsync("a", "scrap"));
        Assert.True(disposition.Answer.GetProperty("at").GetDateTimeOffset() >= disposition.Free);

        var decision = await WaitingAsync(own, scene, () => scene.DecideAsync("reject"));
        Assert.True(decision.Answer.GetProperty("signedAt").GetDateTimeOffset() >= decision.Free);

        var reopening = await WaitingAsync(own, scene, () => scene.ReopenAsync());
        Assert.True(reopening.Answer.GetProperty("at").GetDateTimeOffset() >= reopening.Free);
    }

    // Holds the lot as an upload does, for five seconds of the lab's clock, while the act is under way; Free is when the lock was given back.
    private static async Task<(System.Text.Json.JsonElement Answer, DateTimeOffset Free)> WaitingAsync(Lab own, LotScene scene, Func<Task<HttpResponseMessage>> send)
    {
        await using var connection = new NpgsqlConnection(own.Store.OwnerConnectionString);
        await connection.OpenAsync();
        var transaction = await connection.BeginTransactionAsync();
        await using (var hold = new NpgsqlCommand("select from lot where id = $1 for share", connection, transaction) { Parameters = { new() { Value = scene.LotId } } })
            await hold.ExecuteNonQueryAsync();

        var answer = send();
        await using (var watch = new NpgsqlConnection(own.Store.OwnerConnectionString))
        {
            await watch.OpenAsync();
            await using var waits = new NpgsqlCommand("select exists (select from pg_locks l join pg_stat_activity a on a.pid = l.pid where not l.granted and a.datname = current_database())", watch);
            while (await waits.ExecuteScalarAsync() is false)
            {
                Assert.False(answer.IsCompleted, "The act went past the lot's lock.");
                await Task.Delay(10);
            }
        }

        own.Clock.Advance(TimeSpan.FromSeconds(5));
        var free = Ledger.Microseconds.Cut(own.Clock.GetUtcNow());
        await transaction.RollbackAsync();
        return (await (await answer).ShouldBeAsync(HttpStatusCode.Created), free);
    }
}

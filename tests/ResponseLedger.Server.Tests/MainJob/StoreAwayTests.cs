using System.Net;
using System.Net.Http.Json;
using ResponseLedger.Server.Tests.Runs;
using ResponseLedger.TestDatabase;

namespace ResponseLedger.Server.Tests.MainJob;

public sealed class StoreAwayTests
{
    [Fact]
    public async Task While_the_database_does_not_answer_a_sender_is_told_to_come_again_and_once_it_does_the_file_is_taken_once()
    {
        await using var store = await TestDatabases.CreateAsync();
        await using var line = new CutLine(store.ServerConnectionString);
        await using var server = await (await RunningServer.StartAsync(new Dictionary<string, string?>
        {
            ["urls"] = "http://127.0.0.1:0",
            ["ConnectionStrings:Ledger"] = line.ConnectionString,
            ["ConnectionStrings:LedgerOwner"] = store.OwnerConnectionString,
            ["RESPONSELEDGER_ADMIN_EMAIL"] = Lab.ManagerEmail,
            ["RESPONSELEDGER_ADMIN_PASSWORD"] = Lab.Password,
        })).ReadyAsync();
        using var client = server.Client();
        await (await client.PostAsJsonAsync("/api/session", new { email = Lab.ManagerEmail, password = Lab.Password })).ShouldBeAsync(HttpStatusCode.NoContent);
        var device = await client.MadeAsync("/api/devices", new { partNumber = "PN", revision = "A", title = "Board", kind = "transfer" });
        await client.MadeAsync("/api/lots", new { deviceId = device.Text("id"), number = "17", size = 2 });
        Task<HttpResponseMessage> SendAsync() => RunScene.SendAsync(client, [("device", "PN"), ("lot", "17"), ("bench", "Bay")], [("a.csv", RunScene.Csv(0))]);

        await line.CutAsync();
        using (var away = await SendAsync())
        {
            await away.ShouldRefuseAsync(HttpStatusCode.ServiceUnavailable, "storeAway");
            Assert.NotNull(away.Headers.RetryAfter?.Delta);
        }

        line.Mend();
        var taken = await (await SendAsync()).ShouldBeAsync(HttpStatusCode.Created);
        var again = await (await SendAsync()).ShouldBeAsync(HttpStatusCode.OK);
        Assert.Equal(taken.GetProperty("results")[0].Text("runId"), again.GetProperty("results")[0].Text("runId"));
    }
}

using System.Collections.Concurrent;
using System.Net;
using ResponseLedger.Server.Tests.Runs;

namespace ResponseLedger.Server.Tests.MainJob;

/// <summary>Lots that are signed while the server is killed; it remembers which signatures were acknowledged.</summary>
internal sealed class LotsInFlight
{
    private readonly KilledLab lab;
    private readonly List<string> lots = [];
    private readonly ConcurrentBag<string> signed = [];

    private LotsInFlight(KilledLab lab) => this.lab = lab;

    /// <summary>How many signatures were acknowledged.</summary>
    public int Acknowledged => signed.Count;

    /// <summary>Opens lots of two units that pass.</summary>
    public static async Task<LotsInFlight> OpenAsync(KilledLab lab, int count)
    {
        var flight = new LotsInFlight(lab);
        for (var i = 0; i < count; i++)
        {
            var number = Lab.Unique("signed");
            flight.lots.Add(await lab.OpenLotAsync(number, 2));
            using var sent = await lab.SendAsync(number, ("a.csv", RunScene.Csv(0, $"{number} a")), ("b.csv", RunScene.Csv(0, $"{number} b")));
            await sent.ShouldBeAsync(HttpStatusCode.Created);
        }

        return flight;
    }

    /// <summary>One of several signers approves every so manieth lot until stopped.</summary>
    public async Task SignAsync(int signer, int signers, CancellationToken stop)
    {
        foreach (var lot in lots.Where((_, i) => i % signers == signer).TakeWhile(_ => !stop.IsCancellationRequested))
        {
            try
            {
                using var response = await lab.ApproveAsync(lot);
                if (response.StatusCode == HttpStatusCode.Created)
                    signed.Add(lot);
                else
                    await lab.ToldToComeAgainAsync(response);
            }
            catch (HttpRequestException)
            {
                // The server was killed under it: nobody knows whether this one was signed.
            }
        }
    }

    /// <summary>Each is open or decided, a signed one decided; an open one can be decided, and none a second time.</summary>
    public async Task AreDecidedOrOpenAsync()
    {
        foreach (var lot in lots)
        {
            if ((await lab.Quality.SeeAsync($"/api/lots/{lot}")).Text("state") == "open")
            {
                Assert.DoesNotContain(lot, signed);
                await (await lab.ApproveAsync(lot)).ShouldBeAsync(HttpStatusCode.Created);
            }

            Assert.Equal("approved", (await lab.Quality.SeeAsync($"/api/lots/{lot}")).Text("state"));
            var decision = Assert.Single((await lab.Quality.SeeAsync($"/api/lots/{lot}/decisions")).GetProperty("items").EnumerateArray());
            Assert.Equal(1, decision.GetProperty("ordinal").GetInt32());
        }

        await (await lab.ApproveAsync(lots[0])).ShouldRefuseAsync(HttpStatusCode.Conflict, "lotDecided");
    }
}

using System.Collections.Concurrent;
using System.Net;
using System.Text.Json;
using ResponseLedger.Server.Tests.Runs;

namespace ResponseLedger.Server.Tests.MainJob;

/// <summary>Files that benches send, each another one, while the server is killed; it remembers which were acknowledged.</summary>
internal sealed class FilesInFlight
{
    private const int Points = 201;

    private readonly KilledLab lab;
    private readonly string lot;
    private readonly ConcurrentDictionary<string, byte[]> begun = new();
    private readonly ConcurrentDictionary<string, string> acknowledged = new();

    private FilesInFlight(KilledLab lab, string lot) => (this.lab, this.lot) = (lab, lot);

    /// <summary>How many were acknowledged.</summary>
    public int Acknowledged => acknowledged.Count;

    /// <summary>Opens a lot for them.</summary>
    public static async Task<FilesInFlight> OpenAsync(KilledLab lab)
    {
        var number = Lab.Unique("files");
        await lab.OpenLotAsync(number, 10_000);
        return new FilesInFlight(lab, number);
    }

    /// <summary>One bench sends file after file until it is stopped.</summary>
    public async Task SendAsync(CancellationToken stop)
    {
        for (var i = 0; !stop.IsCancellationRequested; i++)
        {
            var file = Lab.Unique("unit") + ".csv";
            begun[file] = RunScene.Csv(i % 2 == 0 ? 0 : 3, file, Points);
            try
            {
                await SendOneAsync(file);
            }
            catch (HttpRequestException)
            {
                // The server was killed under it: nobody knows whether this one was taken.
                await Task.Delay(10, CancellationToken.None);
            }
        }
    }

    /// <summary>Each acknowledged one is there with its verdict and its bytes.</summary>
    public async Task AreThereAsync()
    {
        foreach (var (file, runId) in acknowledged)
        {
            var run = await lab.Quality.SeeAsync($"/api/runs/{runId}");
            Assert.Equal(Path.GetFileNameWithoutExtension(file), run.Text("serial"));
            Assert.True(run.Text("outcome") is "pass" or "fail", run.ToString());
            var kept = await lab.Quality.GetByteArrayAsync($"/api/runs/{runId}/file");
            Assert.True(kept.AsSpan().SequenceEqual(begun[file]), $"{file} has other bytes.");
        }
    }

    /// <summary>All can be sent again: acknowledged ones are duplicates of their runs, the others are taken once.</summary>
    public async Task CanBeSentAgainAsync()
    {
        foreach (var file in begun.Keys)
        {
            var known = acknowledged.GetValueOrDefault(file);
            var outcome = await SendOneAsync(file);
            Assert.True(outcome == "duplicate" || (outcome == "accepted" && known is null), $"{file}: {outcome}");
            if (known is null)
                Assert.Equal("duplicate", await SendOneAsync(file));
            else
                Assert.Equal(known, acknowledged[file]);
        }

        var runs = new HashSet<string>();
        string? cursor = null;
        do
        {
            var page = await lab.Quality.SeeAsync($"/api/runs?lot={lot}&limit=500{cursor}");
            runs.UnionWith(page.GetProperty("items").EnumerateArray().Select(r => r.Text("id")));
            cursor = page.GetProperty("next").GetString() is { } next ? $"&cursor={Uri.EscapeDataString(next)}" : null;
        }
        while (cursor is not null);
        Assert.Equal(begun.Keys.Select(f => acknowledged[f]).Order(), runs.Order());
    }

    // What became of the file; null when the server could not say.
    private async Task<string?> SendOneAsync(string file)
    {
        using var response = await lab.SendAsync(lot, (file, begun[file]));
        if (response.StatusCode is not (HttpStatusCode.OK or HttpStatusCode.Created))
        {
            await lab.ToldToComeAgainAsync(response);
            return null;
        }

        var body = JsonElement.Parse(await response.Content.ReadAsByteArrayAsync());
        var result = Assert.Single(body.GetProperty("results").EnumerateArray());
        acknowledged[file] = result.Text("runId");
        return result.Text("outcome");
    }
}

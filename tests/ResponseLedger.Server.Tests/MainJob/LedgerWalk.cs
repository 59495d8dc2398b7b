using System.Security.Cryptography;
using System.Text.Json;
using ResponseLedger.Ledger;

namespace ResponseLedger.Server.Tests.MainJob;

/// <summary>The ledger, read from its first entry to its last as an auditor does: every position, every digest, every page.</summary>
internal static class LedgerWalk
{
    private static readonly TimeSpan Longest = TimeSpan.FromSeconds(10);

    /// <summary>Reads it all, once an entry of a kind has got its position.</summary>
    public static async Task<List<JsonElement>> ReadAsync(HttpClient client, string lastKind, int pageSize)
    {
        var since = TimeProvider.System.GetTimestamp();
        while (true)
        {
            var entries = await ReadAsync(client, pageSize);
            if (entries.Exists(e => e.Text("kind") == lastKind))
                return entries;
            Assert.True(TimeProvider.System.GetElapsedTime(since) < Longest, $"{lastKind} has no position after {Longest}.");
            await Task.Delay(50);
        }
    }

    private static async Task<List<JsonElement>> ReadAsync(HttpClient client, int pageSize)
    {
        var entries = new List<JsonElement>();
        string? after = null;
        do
        {
            var page = await client.SeeAsync($"/api/ledger/entries?limit={pageSize}{after}");
            foreach (var item in page.GetProperty("items").EnumerateArray())
            {
                Assert.Equal(entries.Count, item.GetProperty("position").GetInt64());
                var bytes = item.GetProperty("bytes").GetBytesFromBase64();
                Assert.True(CanonicalJson.IsCanonical(bytes), item.ToString());
                Assert.Equal(Convert.ToHexStringLower(SHA256.HashData(bytes)), item.Text("sha256"));
                entries.Add(JsonDocument.Parse(bytes).RootElement);
            }

            after = page.GetProperty("next") is { ValueKind: JsonValueKind.Number } next ? $"&after={next.GetInt64()}" : null;
        }
        while (after is not null);
        return entries;
    }
}

using System.Net;
using System.Security.Cryptography;
using System.Text.Json;
using ResponseLedger.Ledger;

namespace ResponseLedger.Server.Tests.MainJob;

/// <summary>The signed record as somebody checks it who trusts bytes alone: its digest worked out anew, and every file found in it.</summary>
internal static class RecordCheck
{
    /// <summary>Checks the record of a decision, and gives its SHA-256 in hexadecimal.</summary>
    public static async Task<string> DigestAsync(
        HttpClient client, JsonElement signed, IReadOnlyDictionary<string, (string Condition, string Name, byte[] Content)> sent, LowPassDevice device)
    {
        using var response = await client.GetAsync($"/api/decisions/{signed.Text("id")}/record");
        Assert.Equal(HttpStatusCode.OK, response.StatusCode);
        var bytes = await response.Content.ReadAsByteArrayAsync();
        var digest = Sha256(bytes);
        Assert.Equal(digest, signed.Text("sha256"));
        Assert.Equal($"\"{digest}\"", response.Headers.ETag?.Tag);
        Assert.True(CanonicalJson.IsCanonical(bytes));
        Assert.True(JsonElement.DeepEquals(JsonElement.Parse(bytes), signed.GetProperty("record")), signed.ToString());

        var record = JsonElement.Parse(bytes);
        Assert.Equal("quality@example.test", record.GetProperty("signer").Text("email"));
        Assert.Equal(signed.Text("decision"), record.Text("decision"));
        Assert.Equal("LPF-1", record.GetProperty("device").Text("partNumber"));
        foreach (var condition in record.GetProperty("conditions").EnumerateArray())
        {
            Assert.Equal(1, condition.GetProperty("maskRevision").GetInt32());
            Assert.Equal(device.GoldenRuns[condition.Text("name")], condition.Text("goldenRunId"));
        }

        // Every file that the bench sent for the lot and nothing else, the invalidated one among those that do not count.
        Assert.Equal(
            sent.Where(s => s.Key != "SN003 bad contact").Select(s => Sha256(s.Value.Content)).Order(),
            FilesOf(record, "runs").Order());
        Assert.Equal([Sha256(sent["SN003 bad contact"].Content)], FilesOf(record, "otherRuns"));
        await PinsMasksAsync(client, record, device);
        return digest;
    }

    private static async Task PinsMasksAsync(HttpClient client, JsonElement record, LowPassDevice device)
    {
        var masks = await client.SeeAsync($"/api/devices/{device.Id}/masks");
        foreach (var condition in record.GetProperty("conditions").EnumerateArray())
            Assert.Equal(masks.Item("id", condition.Text("maskRevisionId")).Text("sha256"), condition.Text("maskSha256"));
    }

    private static IEnumerable<string> FilesOf(JsonElement record, string member)
        => from unit in record.GetProperty("units").EnumerateArray()
           from run in unit.GetProperty(member).EnumerateArray()
           from file in run.GetProperty("files").EnumerateArray()
           select file.GetString()!;

    private static string Sha256(byte[] content) => Convert.ToHexStringLower(SHA256.HashData(content));
}

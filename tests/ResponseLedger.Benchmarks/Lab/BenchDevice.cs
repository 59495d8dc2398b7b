using System.Net;
using System.Text;
using System.Text.Json.Nodes;

namespace ResponseLedger.Benchmarks.Lab;

/// <summary>A device with a released mask, and the way to send runs of it.</summary>
internal sealed class BenchDevice
{
    /// <summary>Four limits (two on gain, one of them relative to a reference level, two on phase) and two requirements, bandwidth one of them.</summary>
    public const string Mask =
        """
        {
          "title": "Low-pass, 1 kHz",
          "limits": [
            {"name":"ceiling","quantity":"gainDb","side":"upper","basis":"absolute",
             "corners":[{"frequencyHz":10,"value":0.5},{"frequencyHz":1500,"value":0.5},{"frequencyHz":10000,"value":-36},{"frequencyHz":100000,"value":-76}]},
            {"name":"pass band","quantity":"gainDb","side":"lower","basis":"reference","reference":{"kind":"frequency","frequencyHz":20},
             "corners":[{"frequencyHz":10,"value":-0.2},{"frequencyHz":200,"value":-0.2},{"frequencyHz":900,"value":-4}]},
            {"name":"phase ceiling","quantity":"phaseDeg","side":"upper","basis":"absolute",
             "corners":[{"frequencyHz":10,"value":5},{"frequencyHz":1000,"value":-70},{"frequencyHz":100000,"value":-160}]},
            {"name":"phase floor","quantity":"phaseDeg","side":"lower","basis":"absolute",
             "corners":[{"frequencyHz":10,"value":-10},{"frequencyHz":1000,"value":-110},{"frequencyHz":100000,"value":-185}]}
          ],
          "requirements": [
            {"name":"bandwidth","measure":"bandwidth","parameters":{"dropDb":3.010299956639812,"reference":{"kind":"frequency","frequencyHz":20}},"output":"upperHz","min":950,"max":1050},
            {"name":"ripple","measure":"ripple","parameters":{"fromHz":10,"toHz":200},"output":"rippleDb","max":0.1}
          ]
        }
        """;

    private readonly BenchLab lab;

    private BenchDevice(BenchLab lab, Guid id, Guid conditionId)
    {
        this.lab = lab;
        Id = id;
        ConditionId = conditionId;
    }

    public Guid Id { get; }

    public Guid ConditionId { get; }

    public static async Task<BenchDevice> NewAsync(BenchLab lab)
    {
        var made = await lab.PostAsync("/api/devices", new { partNumber = lab.Unique("LPF"), revision = "A", title = "Low-pass", kind = "transfer" });
        var id = made.GetProperty("id").GetGuid();
        var condition = (await lab.GetAsync(lab.Manager, $"/api/devices/{id}/conditions")).Json.GetProperty("items")[0].GetProperty("id").GetGuid();
        var draft = await lab.PostAsync($"/api/devices/{id}/masks", JsonNode.Parse(Mask)!);
        await lab.PostAsync($"/api/masks/{draft.GetProperty("id").GetString()}/release", new { reason = "For the benchmark." });
        return new BenchDevice(lab, id, condition);
    }

    public async Task<Guid> NewLotAsync(int size)
        => (await lab.PostAsync("/api/lots", new { deviceId = Id, number = lab.Unique("L"), size })).GetProperty("id").GetGuid();

    /// <summary>The request that sends one file.</summary>
    public HttpRequestMessage Upload(Guid? lotId, string serial, byte[] content, string purpose = "production")
    {
        var form = new MultipartFormDataContent();
        void Field(string name, string value) => form.Add(new ByteArrayContent(Encoding.UTF8.GetBytes(value)), name);
        Field("device", Id.ToString());
        if (lotId is { } lot)
            Field("lot", lot.ToString());
        Field("bench", BenchLab.BenchName);
        Field("serial", serial);
        Field("purpose", purpose);
        form.Add(new ByteArrayContent(content), "file", serial + "_sweep.csv");
        return new HttpRequestMessage(HttpMethod.Post, "/api/runs") { Content = form };
    }

    /// <summary>Sends one file that must be taken and judged, and takes its times.</summary>
    public async Task<TimedAnswer> SendAsync(HttpClient client, Guid? lotId, string serial, byte[] content, string purpose = "production")
    {
        using var request = Upload(lotId, serial, content, purpose);
        var answer = await lab.TimeAsync(client, request);
        var taken = answer.Status == HttpStatusCode.Created && answer.Json.GetProperty("results")[0].GetProperty("verdict").ValueKind == System.Text.Json.JsonValueKind.Object;
        return taken ? answer : throw new InvalidOperationException($"An upload answered {(int)answer.Status}: {Encoding.UTF8.GetString(answer.Body)}");
    }

    /// <summary>Sends a golden run and sets it.</summary>
    public async Task SetGoldenAsync(int points, int unit)
    {
        var sent = await SendAsync(lab.Manager, null, lab.Unique("GOLD"), SweepFile.Csv(points, unit), "golden");
        await lab.PostAsync(
            $"/api/devices/{Id}/golden", new { runId = sent.Json.GetProperty("results")[0].GetProperty("runId").GetString(), reason = "Typical" }, HttpMethod.Put);
    }
}

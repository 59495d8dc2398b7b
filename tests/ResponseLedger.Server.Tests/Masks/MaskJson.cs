using System.Net;
using System.Net.Http.Json;
using System.Text.Json;

namespace ResponseLedger.Server.Tests.Masks;

/// <summary>Masks for tests, and the way from a draft to a release.</summary>
internal static class MaskJson
{
    /// <summary>A mask with one upper limit in dB from 100 Hz to 10 kHz.</summary>
    public static object Upper(double valueDb, string basis = "absolute", string title = "Flat", string? condition = null) => new
    {
        title,
        condition,
        limits = new object[]
        {
            new
            {
                name = "upper",
                quantity = "gainDb",
                side = "upper",
                basis,
                corners = new[] { new { frequencyHz = 100.0, value = valueDb }, new { frequencyHz = 10_000.0, value = valueDb } },
            },
        },
        requirements = Array.Empty<object>(),
    };

    /// <summary>A mask with everything in it that the contract knows.</summary>
    public static JsonElement Rich => JsonDocument.Parse(
        """
        {
          "title": "Band pass, gain 10",
          "limits": [
            {"name":"upper","quantity":"gainDb","side":"upper","basis":"reference","reference":{"kind":"frequency","frequencyHz":1000},
             "minPointsPerDecade":20,"scale":0.5,"corners":[{"frequencyHz":20,"value":0.5},{"frequencyHz":200,"value":0.5},{"frequencyHz":200,"value":0.25},{"frequencyHz":20000,"value":0.25}]},
            {"name":"golden phase","quantity":"phaseDeg","side":"lower","basis":"golden","corners":[{"frequencyHz":20,"value":-3},{"frequencyHz":20000,"value":-3}]},
            {"name":"band","quantity":"gainDb","side":"lower","basis":"reference","reference":{"kind":"band","fromHz":100,"toHz":1000},"corners":[{"frequencyHz":20,"value":-0.1},{"frequencyHz":20000,"value":-12.125}]}
          ],
          "requirements": [
            {"name":"upper cutoff","measure":"bandwidth","parameters":{"dropDb":3.010299956639812,"reference":{"kind":"peak"}},"output":"upperHz","min":9000,"max":11000,"scale":100},
            {"name":"ripple","measure":"ripple","parameters":{"fromHz":100,"toHz":1000},"output":"rippleDb","max":0.3}
          ]
        }
        """).RootElement;

    /// <summary>Makes a draft and gives its view.</summary>
    public static async Task<JsonElement> DraftAsync(this Lab lab, Guid deviceId, object mask)
    {
        var engineer = await lab.SignInAsync("engineer");
        return await (await engineer.PostAsJsonAsync($"/api/devices/{deviceId}/masks", mask)).ShouldBeAsync(HttpStatusCode.Created);
    }

    /// <summary>Makes a draft, releases it, and gives the answer.</summary>
    public static async Task<JsonElement> ReleaseAsync(this Lab lab, Guid deviceId, object mask)
    {
        var draft = await lab.DraftAsync(deviceId, mask);
        var engineer = await lab.SignInAsync("engineer");
        return await (await engineer.PostAsJsonAsync($"/api/masks/{draft.GetProperty("id").GetGuid()}/release", new { reason = "Agreed" })).ShouldBeAsync(HttpStatusCode.OK);
    }

    /// <summary>A PUT with an If-Match, or without where it is null.</summary>
    public static async Task<HttpResponseMessage> PutAsync(this HttpClient client, Guid maskId, object mask, string? ifMatch)
    {
        using var request = new HttpRequestMessage(HttpMethod.Put, $"/api/masks/{maskId}") { Content = JsonContent.Create(mask) };
        if (ifMatch is not null)
            request.Headers.TryAddWithoutValidation("If-Match", ifMatch);
        return await client.SendAsync(request);
    }

    /// <summary>Asserts that every member of the first stands in the second with the same value; numbers by value, objects member by member.</summary>
    public static void AssertSame(JsonElement sent, JsonElement received)
        => Assert.True(JsonElement.DeepEquals(sent, received), $"sent {sent.GetRawText()}\nreceived {received.GetRawText()}");
}

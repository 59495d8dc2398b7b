using System.Net;
using System.Text.Json;

namespace ResponseLedger.Server.Tests;

/// <summary>Reads answers; whatever is not as expected is told together with the body.</summary>
public static class Answers
{
    /// <summary>Asserts the status and gives the body as JSON; an undefined element when there is none.</summary>
    public static async Task<JsonElement> ShouldBeAsync(this HttpResponseMessage response, HttpStatusCode expected)
    {
        var body = await response.Content.ReadAsStringAsync();
        Assert.True(
            response.StatusCode == expected,
            $"{response.RequestMessage?.Method} {response.RequestMessage?.RequestUri?.PathAndQuery} answered {(int)response.StatusCode} instead of {(int)expected}: {body}{(response.StatusCode == HttpStatusCode.InternalServerError ? FaultLog.Last : "")}");
        return body.Length == 0 ? default : JsonDocument.Parse(body).RootElement;
    }

    /// <summary>Asserts that it is a problem document, of whatever status, and gives it.</summary>
    public static async Task<JsonElement> ShouldBeProblemAsync(this HttpResponseMessage response)
    {
        var body = await response.Content.ReadAsStringAsync();
        Assert.True(response.Content.Headers.ContentType?.MediaType == "application/problem+json", $"{(int)response.StatusCode}: {body}");
        return JsonDocument.Parse(body).RootElement;
    }

    /// <summary>Asserts that it is a problem document with this status and code, and gives it.</summary>
    public static async Task<JsonElement> ShouldRefuseAsync(this HttpResponseMessage response, HttpStatusCode expected, string? code = null)
    {
        var body = await response.ShouldBeAsync(expected);
        Assert.Equal("application/problem+json", response.Content.Headers.ContentType?.MediaType);
        Assert.Equal((int)expected, body.GetProperty("status").GetInt32());
        if (code is not null)
            Assert.Equal(code, body.GetProperty("code").GetString());
        return body;
    }

    /// <summary>The item of a member "items" whose member has this value.</summary>
    public static JsonElement Item(this JsonElement page, string member, string value)
        => page.GetProperty("items").EnumerateArray().Single(item => item.GetProperty(member).GetString() == value);
}

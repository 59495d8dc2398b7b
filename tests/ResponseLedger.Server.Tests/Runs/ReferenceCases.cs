using System.Globalization;
using System.Net;
using System.Net.Http.Json;
using System.Text;
using System.Text.Json;

namespace ResponseLedger.Server.Tests.Runs;

/// <summary>Cases of the reference set as files that a bench would send, and what the API measures on them.</summary>
internal static class ReferenceCases
{
    public static Dictionary<string, JsonElement> Of(string file, string list)
        => JsonDocument.Parse(File.ReadAllBytes(Path.Combine(Folder(), file))).RootElement.GetProperty(list).EnumerateArray().ToDictionary(c => c.GetProperty("id").GetString()!);

    /// <summary>The case's grid as CSV, with digits that read back as the same doubles.</summary>
    public static byte[] FileOf(JsonElement reference)
    {
        var grid = reference.GetProperty("grid");
        var (hz, re, im) = (grid.GetProperty("frequencyHz"), grid.GetProperty("re"), grid.GetProperty("im"));
        var text = new StringBuilder("frequency_hz,real,imag\n");
        for (var i = 0; i < hz.GetArrayLength(); i++)
            text.Append(CultureInfo.InvariantCulture, $"{hz[i].GetDouble():R},{re[i].GetDouble():R},{im[i].GetDouble():R}\n");
        return Encoding.UTF8.GetBytes(text.ToString());
    }

    public static async Task<List<JsonElement>> MeasureAsync(this RunScene scene, string runId, params object[] measures)
        => [.. (await (await scene.Engineer.PostAsJsonAsync($"/api/runs/{runId}/measures", new { measures })).ShouldBeAsync(HttpStatusCode.OK)).GetProperty("results").EnumerateArray()];

    public static double? Output(this JsonElement result, string name) => Number(result.GetProperty("outputs"), name);

    public static double? Number(JsonElement parent, string name)
        => parent.TryGetProperty(name, out var value) && value.ValueKind == JsonValueKind.Number ? value.GetDouble() : null;

    public static JsonElement? Part(JsonElement parent, string name)
        => parent.TryGetProperty(name, out var part) && part.ValueKind == JsonValueKind.Object ? part : null;

    public static void Close(double? expected, double? found, double tolerance, string what)
    {
        if (expected is null || found is null)
        {
            Assert.True(expected is null && found is null, $"{what}: expected {expected?.ToString("R", CultureInfo.InvariantCulture) ?? "absent"}, found {found?.ToString("R", CultureInfo.InvariantCulture) ?? "absent"}.");
            return;
        }

        Assert.True(Math.Abs(expected.Value - found.Value) <= tolerance, FormattableString.Invariant($"{what}: expected {expected:R}, found {found:R}, allowed {tolerance:E3}."));
    }

    /// <summary>To a share of the value, and to as much absolutely under 1.</summary>
    public static void Near(double? expected, double? found, double relative, string what)
        => Close(expected, found, relative * Math.Max(1, Math.Abs(expected ?? 0)), what);

    public static string Folder()
    {
        for (var folder = new DirectoryInfo(AppContext.BaseDirectory); folder is not null; folder = folder.Parent)
        {
            if (File.Exists(Path.Combine(folder.FullName, "ResponseLedger.sln")))
                return Path.Combine(folder.FullName, "tests", "reference");
        }

        throw new InvalidOperationException("No folder above the tests holds ResponseLedger.sln.");
    }
}

using System.Text.Json;

namespace ResponseLedger.Server.Runs.Upload;

/// <summary>Under which circumstances a run was measured: <c>{temperatureC, driveVrms, sourceOhm, loadOhm, instruments[]}</c>, each of them optional.</summary>
internal static class RunCircumstances
{
    private const double AbsoluteZeroC = -273.15;
    private const string Instruments = "instruments";

    private static readonly Dictionary<string, double> LeastValues = new(StringComparer.Ordinal)
    {
        ["temperatureC"] = AbsoluteZeroC,
        ["driveVrms"] = 0,
        ["sourceOhm"] = 0,
        ["loadOhm"] = 0,
    };

    /// <summary>What is wrong with the text, or null.</summary>
    public static string? ProblemOf(string text)
    {
        try
        {
            using var document = JsonDocument.Parse(text, new JsonDocumentOptions { MaxDepth = 8 });
            return document.RootElement.ValueKind == JsonValueKind.Object
                ? document.RootElement.EnumerateObject().Select(ProblemOf).FirstOrDefault(p => p is not null)
                : "The circumstances are a JSON object.";
        }
        catch (JsonException)
        {
            return "The circumstances are not well-formed JSON.";
        }
    }

    private static string? ProblemOf(JsonProperty member)
    {
        if (member.NameEquals(Instruments))
            return member.Value.ValueKind == JsonValueKind.Array && member.Value.EnumerateArray().All(i => i.ValueKind is JsonValueKind.String or JsonValueKind.Object)
                ? null
                : "instruments is a list of names, or of objects that describe an instrument each.";
        if (!LeastValues.TryGetValue(member.Name, out var least))
            return $"There is no circumstance \"{member.Name}\". Known are {string.Join(", ", LeastValues.Keys)} and {Instruments}.";
        return member.Value.ValueKind == JsonValueKind.Number && member.Value.TryGetDouble(out var value) && double.IsFinite(value) && value >= least
            ? null
            : string.Create(System.Globalization.CultureInfo.InvariantCulture, $"{member.Name} is a number of {least} or more.");
    }
}

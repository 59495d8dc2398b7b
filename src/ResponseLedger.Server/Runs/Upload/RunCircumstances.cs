using System.Globalization;
using System.Text.Encodings.Web;
using System.Text.Json;
using System.Text.Json.Nodes;
using ResponseLedger.Records;

namespace ResponseLedger.Server.Runs.Upload;

/// <summary>What a bench may say of the circumstances of a sweep: quantities in stated units, and the instruments.</summary>
internal static class RunCircumstances
{
    private const double AbsoluteZeroC = -273.15;
    private const string Instruments = "instruments";
    private const int MostInstruments = 50;
    private const int MostMembers = 20;
    private const int LongestText = 200;
    private const string InstrumentRule = "instruments is a list of at most 50 names, or of objects that describe an instrument each by at most 20 texts, numbers or truths. A text has 1 to 200 characters, none of them a control character.";

    private static readonly Dictionary<string, double> LeastValues = new(StringComparer.Ordinal)
    {
        ["temperatureC"] = AbsoluteZeroC,
        ["driveVrms"] = 0,
        ["sourceOhm"] = 0,
        ["loadOhm"] = 0,
    };

    // Texts are kept readable; what is dangerous in a page is the page's to escape.
    private static readonly JsonSerializerOptions Plain = new() { Encoder = JavaScriptEncoder.UnsafeRelaxedJsonEscaping };

    /// <summary>What is wrong with the text, or null.</summary>
    public static string? ProblemOf(string text)
    {
        Read(text, out var problem);
        return problem;
    }

    /// <summary>The circumstances as they are kept: read in full and written anew, so that nothing is stored that cannot be read back. Null where there is a problem.</summary>
    public static string? Kept(string text) => Read(text, out _)?.ToJsonString(Plain);

    private static JsonObject? Read(string text, out string? problem)
    {
        try
        {
            using var document = JsonDocument.Parse(text, new JsonDocumentOptions { MaxDepth = 8 });
            if (document.RootElement.ValueKind != JsonValueKind.Object)
            {
                problem = "The circumstances are a JSON object.";
                return null;
            }

            var kept = new JsonObject();
            problem = document.RootElement.EnumerateObject().Select(member => Take(member, kept)).FirstOrDefault(p => p is not null);
            return problem is null ? kept : null;
        }
        catch (Exception fault) when (fault is JsonException or InvalidOperationException)
        {
            // The second one is thrown by a text that is half of a surrogate pair.
            problem = "The circumstances are not well-formed JSON.";
            return null;
        }
    }

    private static string? Take(JsonProperty member, JsonObject kept)
    {
        var name = member.Name;
        if (kept.ContainsKey(name))
            return $"{name} stands twice; keep one.";
        if (name == Instruments)
        {
            var list = InstrumentsOf(member.Value);
            kept[name] = list;
            return list is null ? InstrumentRule : null;
        }

        if (!LeastValues.TryGetValue(name, out var least))
            return $"There is no such circumstance. Known are {string.Join(", ", LeastValues.Keys)} and {Instruments}.";
        if (member.Value.ValueKind != JsonValueKind.Number || !member.Value.TryGetDouble(out var value) || !double.IsFinite(value) || value < least)
            return string.Create(CultureInfo.InvariantCulture, $"{name} is a number of {least} or more.");
        kept[name] = value;
        return null;
    }

    private static JsonArray? InstrumentsOf(JsonElement json)
    {
        if (json.ValueKind != JsonValueKind.Array || json.GetArrayLength() > MostInstruments)
            return null;
        var list = new JsonArray();
        foreach (var element in json.EnumerateArray())
        {
            JsonNode? instrument = element.ValueKind switch
            {
                JsonValueKind.Object => Described(element),
                JsonValueKind.String => Plainly(element),
                _ => null,
            };
            if (instrument is null)
                return null;
            list.Add(instrument);
        }

        return list;
    }

    private static JsonObject? Described(JsonElement json)
    {
        var instrument = new JsonObject();
        foreach (var member in json.EnumerateObject())
        {
            if (instrument.Count == MostMembers || !IsSound(member.Name) || instrument.ContainsKey(member.Name) || Plainly(member.Value) is not { } value)
                return null;
            instrument[member.Name] = value;
        }

        return instrument;
    }

    private static JsonValue? Plainly(JsonElement json) => json.ValueKind switch
    {
        JsonValueKind.String => json.GetString() is { } text && IsSound(text) ? JsonValue.Create(text) : null,
        JsonValueKind.Number => json.TryGetDouble(out var number) && double.IsFinite(number) ? JsonValue.Create(number) : null,
        JsonValueKind.True or JsonValueKind.False => JsonValue.Create(json.GetBoolean()),
        _ => null,
    };

    private static bool IsSound(string text) => text.Length is >= 1 and <= LongestText && TextRules.AgainstName(text) is null;
}

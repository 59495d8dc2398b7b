using System.Text.Json;
using System.Text.Json.Nodes;
using System.Text.Json.Serialization;
using ResponseLedger.Records;
using ResponseLedger.Records.Masks;

namespace ResponseLedger.Server.Masks;

/// <summary>What a draft says. Limits and requirements are read strictly by the records' own reader, so they are taken as they came.</summary>
internal record MaskContent
{
    /// <summary>The mask's title.</summary>
    public string? Title { get; init; }

    /// <summary>Name or id of the condition; of a draft that is there it may only be repeated.</summary>
    public string? Condition { get; init; }

    /// <summary>Curve limits.</summary>
    public JsonElement? Limits { get; init; }

    /// <summary>Scalar requirements.</summary>
    public JsonElement? Requirements { get; init; }

    /// <summary>Members that are not known; each is refused by name.</summary>
    [JsonExtensionData]
    public IDictionary<string, JsonElement>? Others { get; init; }

    /// <summary>Reads the mask, or tells everything that is not of its shape.</summary>
    public MaskDocument? Read(out IReadOnlyList<DocumentProblem> problems)
    {
        var json = new JsonObject { ["title"] = Title, ["limits"] = Node(Limits), ["requirements"] = Node(Requirements) };
        foreach (var (name, value) in Others ?? new Dictionary<string, JsonElement>())
            json[name] = Node(value);
        return MaskDocument.TryParse(JsonSerializer.SerializeToElement(json), out var document, out problems) ? document : null;
    }

    private static JsonNode? Node(JsonElement? json) => json?.ValueKind switch
    {
        JsonValueKind.Object => JsonObject.Create(json.Value),
        JsonValueKind.Array => JsonArray.Create(json.Value),
        null or JsonValueKind.Null or JsonValueKind.Undefined => null,
        _ => JsonValue.Create(json.Value),
    };
}

/// <summary>A draft to be made, of its own content or as a copy.</summary>
internal sealed record NewMask : MaskContent
{
    /// <summary>A mask of the same device to copy; then limits and requirements are left out, and title and condition are those of the copy unless stated.</summary>
    public Guid? From { get; init; }
}

/// <summary>The release of a draft.</summary>
/// <param name="Reason">Why; 1 to 1,000 characters.</param>
internal sealed record MaskRelease(string? Reason);

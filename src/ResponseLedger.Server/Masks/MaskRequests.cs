using System.Buffers;
using System.Text.Json;
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
        // As they were written: the strict reader behind this tells by path what is no text, and a rewriting would stumble over it.
        var written = new ArrayBufferWriter<byte>();
        using (var writer = new Utf8JsonWriter(written, new JsonWriterOptions { SkipValidation = true }))
        {
            writer.WriteStartObject();
            writer.WriteString("title", Title);
            Write(writer, "limits", Limits);
            Write(writer, "requirements", Requirements);
            foreach (var (name, value) in Others ?? new Dictionary<string, JsonElement>())
                Write(writer, name, value);
            writer.WriteEndObject();
        }

        return MaskDocument.TryParse(written.WrittenMemory, out var document, out problems) ? document : null;
    }

    private static void Write(Utf8JsonWriter writer, string name, JsonElement? json)
    {
        writer.WritePropertyName(name);
        if (json is { ValueKind: not JsonValueKind.Undefined } given)
            writer.WriteRawValue(given.GetRawText(), skipInputValidation: true);
        else
            writer.WriteNullValue();
    }
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

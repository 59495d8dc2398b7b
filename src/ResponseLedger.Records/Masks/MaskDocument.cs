using System.Diagnostics.CodeAnalysis;
using System.Text.Json;
using System.Text.Json.Nodes;
using ResponseLedger.Engine.Masks;
using ResponseLedger.Ledger;
using ResponseLedger.Records.Strict;

namespace ResponseLedger.Records.Masks;

/// <summary>A mask as people send and read it: title, limits and requirements, in JSON.</summary>
/// <param name="Title">The mask's title, not empty.</param>
/// <param name="Mask">Its criteria as the engine takes them.</param>
public sealed record MaskDocument(string Title, Mask Mask)
{
    /// <summary>Reads a mask strictly: a member that is not known, a wrong type or a number as text is a problem. Never throws.</summary>
    /// <remarks>The shape alone is judged here; what the criteria say is judged by <see cref="ReleaseProblems"/>.</remarks>
    public static bool TryParse(
        JsonElement json,
        [NotNullWhen(true)] out MaskDocument? document,
        out IReadOnlyList<DocumentProblem> problems)
    {
        document = StrictDocument.Read(json, ReadRoot, out problems);
        return document is not null;
    }

    /// <summary>Reads a mask from UTF-8 JSON. Never throws.</summary>
    public static bool TryParse(
        ReadOnlyMemory<byte> utf8,
        [NotNullWhen(true)] out MaskDocument? document,
        out IReadOnlyList<DocumentProblem> problems)
    {
        document = StrictDocument.Read(utf8, ReadRoot, out problems);
        return document is not null;
    }

    /// <summary>What keeps the mask from being released; empty when nothing does.</summary>
    public IReadOnlyList<DocumentProblem> ReleaseProblems()
        => [.. MaskEvaluator.ProblemsOf(Mask).Select(p => new DocumentProblem(p.Path, p.Sentence))];

    /// <summary>The mask as JSON in the API's shape; what is not stated is left out.</summary>
    /// <exception cref="ArgumentException">A number is not finite.</exception>
    public JsonObject ToJson()
    {
        var json = new JsonObject();
        WriteMembers(json);
        return json;
    }

    /// <summary>The canonical bytes, RFC 8785.</summary>
    public byte[] ToCanonicalBytes() => CanonicalJson.Serialize(ToJson());

    /// <summary>Reads the mask's members of an object that may have others; the caller finishes the object.</summary>
    internal static MaskDocument? Read(ObjectReader reader)
    {
        var title = reader.Name("title");
        var limits = reader.Items("limits", CriteriaJson.ReadLimit);
        var requirements = reader.Items("requirements", CriteriaJson.ReadRequirement);
        return title is null ? null : new MaskDocument(title, new Mask(limits, requirements));
    }

    internal void WriteMembers(JsonObject json)
    {
        json["title"] = Title;
        json["limits"] = new JsonArray([.. Mask.Limits.Select(CriteriaJson.Write)]);
        json["requirements"] = new JsonArray([.. Mask.Requirements.Select(CriteriaJson.Write)]);
    }

    private static MaskDocument? ReadRoot(JsonElement root, ProblemList problems)
    {
        if (ObjectReader.Open(root, string.Empty, problems) is not { } reader)
            return null;
        var document = Read(reader);
        reader.Finish();
        return document;
    }
}

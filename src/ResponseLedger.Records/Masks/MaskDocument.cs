using System.Diagnostics.CodeAnalysis;
using System.Text.Json;
using System.Text.Json.Nodes;
using ResponseLedger.Engine.Masks;
using ResponseLedger.Ledger;

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
        out IReadOnlyList<DocumentProblem> problems) => throw new NotImplementedException();

    /// <summary>Reads a mask from UTF-8 JSON. Never throws.</summary>
    public static bool TryParse(
        ReadOnlyMemory<byte> utf8,
        [NotNullWhen(true)] out MaskDocument? document,
        out IReadOnlyList<DocumentProblem> problems) => throw new NotImplementedException();

    /// <summary>What keeps the mask from being released; empty when nothing does.</summary>
    public IReadOnlyList<DocumentProblem> ReleaseProblems()
        => [.. MaskEvaluator.ProblemsOf(Mask).Select(p => new DocumentProblem(p.Path, p.Sentence))];

    /// <summary>The mask as JSON in the API's shape; what is not stated is left out.</summary>
    public JsonObject ToJson() => throw new NotImplementedException();

    /// <summary>The canonical bytes, RFC 8785.</summary>
    public byte[] ToCanonicalBytes() => CanonicalJson.Serialize(ToJson());
}

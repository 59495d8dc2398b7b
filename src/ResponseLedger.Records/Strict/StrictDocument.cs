using System.Text.Json;
using ResponseLedger.Ledger;

namespace ResponseLedger.Records.Strict;

/// <summary>Reads a whole document: parses the bytes, hands the root on, and tells problems instead of throwing.</summary>
internal static class StrictDocument
{
    public delegate T? RootReader<T>(JsonElement root, ProblemList problems)
        where T : class;

    /// <summary>What was read, or null with problems.</summary>
    public static T? Read<T>(ReadOnlyMemory<byte> utf8, RootReader<T> read, out IReadOnlyList<DocumentProblem> problems)
        where T : class
    {
        try
        {
            using var document = JsonDocument.Parse(utf8, new JsonDocumentOptions { MaxDepth = CanonicalJson.MaxDepth });
            return Read(document.RootElement, read, out problems);
        }
        catch (JsonException wrong)
        {
            problems = [new(string.Empty, $"This is not JSON: line {wrong.LineNumber + 1}, byte {wrong.BytePositionInLine + 1} of it.")];
            return null;
        }
    }

    /// <inheritdoc cref="Read{T}(ReadOnlyMemory{byte}, RootReader{T}, out IReadOnlyList{DocumentProblem})"/>
    public static T? Read<T>(JsonElement root, RootReader<T> read, out IReadOnlyList<DocumentProblem> problems)
        where T : class
    {
        var found = new ProblemList();
        var value = read(root, found);
        problems = found.Problems;
        return found.Count == 0 ? value : null;
    }
}

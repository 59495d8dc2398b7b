using System.Buffers;
using System.Security.Cryptography;
using System.Text.Json;
using System.Text.Json.Nodes;

namespace ResponseLedger.Ledger;

/// <summary>The JSON Canonicalization Scheme of RFC 8785: one sequence of UTF-8 bytes for one JSON value.</summary>
public static class CanonicalJson
{
    /// <summary>Nesting beyond this depth is refused, so that no document can exhaust the stack.</summary>
    public const int MaxDepth = 64;

    /// <summary>Writes a value canonically; a null node is JSON null.</summary>
    /// <exception cref="CanonicalJsonException">The value has no canonical form.</exception>
    public static byte[] Serialize(JsonNode? node)
    {
        var buffer = new ArrayBufferWriter<byte>();
        new CanonicalWriter(buffer).Write(node, 0);
        return buffer.WrittenSpan.ToArray();
    }

    /// <summary>Writes a value canonically. A member name that stands twice in an object is refused.</summary>
    /// <exception cref="CanonicalJsonException">The value has no canonical form.</exception>
    public static byte[] Serialize(JsonElement element)
    {
        var buffer = new ArrayBufferWriter<byte>();
        new CanonicalWriter(buffer).Write(element, 0);
        return buffer.WrittenSpan.ToArray();
    }

    /// <summary>Whether bytes are one JSON value in canonical form. Never throws.</summary>
    public static bool IsCanonical(ReadOnlyMemory<byte> utf8)
    {
        try
        {
            using var document = JsonDocument.Parse(utf8, new JsonDocumentOptions { MaxDepth = MaxDepth });
            return Serialize(document.RootElement).AsSpan().SequenceEqual(utf8.Span);
        }
        catch (Exception refused) when (refused is JsonException or CanonicalJsonException)
        {
            return false;
        }
    }

    /// <summary>SHA-256 of bytes as they stand, 32 bytes.</summary>
    public static byte[] Digest(ReadOnlySpan<byte> bytes) => SHA256.HashData(bytes);
}

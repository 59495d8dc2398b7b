using System.Diagnostics.CodeAnalysis;
using ResponseLedger.Ledger;

namespace ResponseLedger.Records.Decisions;

/// <summary>The signed record of a decision: its exact canonical bytes, made once and never serialised again.</summary>
public sealed class DecisionDocument
{
    /// <summary>The member <c>format</c> of the bytes.</summary>
    public const string Format = "responseledger.decision/1";

    private readonly byte[] bytes;

    private DecisionDocument(DecisionRecord record, byte[] bytes)
    {
        Record = record;
        this.bytes = bytes;
        Sha256 = CanonicalJson.Digest(bytes);
    }

    /// <summary>What the bytes say, in their order.</summary>
    public DecisionRecord Record { get; }

    /// <summary>SHA-256 of the bytes, 32 bytes: what the signature covers.</summary>
    public ReadOnlyMemory<byte> Sha256 { get; }

    /// <summary>Makes the document. Whatever order conditions, units and runs come in, the bytes are the same.</summary>
    /// <exception cref="ArgumentException">The record contradicts itself, a number is not finite, or a hash is not 32 bytes long.</exception>
    public static DecisionDocument Create(DecisionRecord record) => throw new NotImplementedException();

    /// <summary>Reads the bytes of a decision; bytes that are not exactly the canonical ones are refused. Never throws.</summary>
    public static bool TryParse(
        ReadOnlyMemory<byte> bytes,
        [NotNullWhen(true)] out DecisionDocument? document,
        out IReadOnlyList<DocumentProblem> problems) => throw new NotImplementedException();

    /// <summary>The canonical bytes, a copy.</summary>
    public byte[] ToCanonicalBytes() => [.. bytes];
}

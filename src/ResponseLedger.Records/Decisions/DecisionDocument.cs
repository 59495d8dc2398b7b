using System.Diagnostics.CodeAnalysis;
using System.Text.Json;
using ResponseLedger.Ledger;
using ResponseLedger.Records.Strict;

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
    public static DecisionDocument Create(DecisionRecord record)
    {
        ArgumentNullException.ThrowIfNull(record);
        byte[] bytes;
        try
        {
            bytes = CanonicalJson.Serialize(DecisionWriter.Write(record));
        }
        catch (CanonicalJsonException wrong)
        {
            throw new ArgumentException("The decision has no canonical form.", nameof(record), wrong);
        }

        // What is signed is what its bytes say: the document is the one that anybody reads out of them.
        return TryParse(bytes, out var document, out var problems)
            ? document
            : throw new ArgumentException($"The decision contradicts itself. {problems[0].Path}: {problems[0].Sentence}", nameof(record));
    }

    /// <summary>Reads the bytes of a decision; bytes that are not exactly the canonical ones are refused. Never throws.</summary>
    public static bool TryParse(
        ReadOnlyMemory<byte> bytes,
        [NotNullWhen(true)] out DecisionDocument? document,
        out IReadOnlyList<DocumentProblem> problems)
    {
        document = StrictDocument.Read(bytes, (root, found) => ReadRoot(root, found, bytes), out problems);
        return document is not null;
    }

    /// <summary>The canonical bytes, a copy.</summary>
    public byte[] ToCanonicalBytes() => [.. bytes];

    private static DecisionDocument? ReadRoot(JsonElement root, ProblemList problems, ReadOnlyMemory<byte> bytes)
    {
        if (DecisionReader.Read(root, problems) is not { } record)
            return null;
        DecisionConsistency.Check(record, problems);
        if (problems.Count > 0)
            return null;

        var exact = CanonicalJson.Serialize(DecisionWriter.Write(record));
        if (!bytes.Span.SequenceEqual(exact))
        {
            problems.Add(string.Empty, "These are not the canonical bytes of this decision.");
            return null;
        }

        return new DecisionDocument(record, exact);
    }
}

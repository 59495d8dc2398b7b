using System.Diagnostics.CodeAnalysis;
using ResponseLedger.Ledger;

namespace ResponseLedger.Records.Masks;

/// <summary>A released revision of a mask: its exact bytes, which verdicts and decisions rest on.</summary>
public sealed class MaskRevisionDocument
{
    /// <summary>The member <c>format</c> of the bytes.</summary>
    public const string Format = "responseledger.maskRevision/1";

    private MaskRevisionDocument(Guid deviceId, Guid conditionId, int revision, MaskDocument mask, byte[] bytes)
    {
        DeviceId = deviceId;
        ConditionId = conditionId;
        Revision = revision;
        Mask = mask;
        Bytes = bytes;
        Sha256 = CanonicalJson.Digest(bytes);
    }

    /// <summary>The device.</summary>
    public Guid DeviceId { get; }

    /// <summary>The condition of the device.</summary>
    public Guid ConditionId { get; }

    /// <summary>Number of the revision within the condition, from 1.</summary>
    public int Revision { get; }

    /// <summary>Title, limits and requirements.</summary>
    public MaskDocument Mask { get; }

    /// <summary>The canonical bytes.</summary>
    public ReadOnlyMemory<byte> Bytes { get; }

    /// <summary>SHA-256 of the bytes, 32 bytes.</summary>
    public ReadOnlyMemory<byte> Sha256 { get; }

    /// <summary>Releases a mask as a revision.</summary>
    /// <exception cref="ArgumentOutOfRangeException">The revision is under 1.</exception>
    public static MaskRevisionDocument Create(Guid deviceId, Guid conditionId, int revision, MaskDocument mask)
        => throw new NotImplementedException();

    /// <summary>Reads the bytes of a revision; bytes that are not exactly the canonical ones are refused. Never throws.</summary>
    public static bool TryParse(
        ReadOnlyMemory<byte> bytes,
        [NotNullWhen(true)] out MaskRevisionDocument? document,
        out IReadOnlyList<DocumentProblem> problems) => throw new NotImplementedException();
}

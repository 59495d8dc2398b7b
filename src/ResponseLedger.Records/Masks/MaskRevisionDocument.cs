using System.Diagnostics.CodeAnalysis;
using System.Text.Json;
using System.Text.Json.Nodes;
using ResponseLedger.Ledger;
using ResponseLedger.Records.Strict;

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
    /// <exception cref="ArgumentException">The revision is under 1, or the mask would not be read back: an empty name, a number that is not finite.</exception>
    public static MaskRevisionDocument Create(Guid deviceId, Guid conditionId, int revision, MaskDocument mask)
    {
        ArgumentNullException.ThrowIfNull(mask);
        var bytes = BytesOf(deviceId, conditionId, revision, mask);

        // What is released is what its bytes say: the document is the one that anybody reads out of them.
        return TryParse(bytes, out var document, out var problems)
            ? document
            : throw new ArgumentException($"The mask has no released form: {problems[0].Path}: {problems[0].Sentence}", nameof(mask));
    }

    /// <summary>Reads the bytes of a revision; bytes that are not exactly the canonical ones are refused. Never throws.</summary>
    public static bool TryParse(
        ReadOnlyMemory<byte> bytes,
        [NotNullWhen(true)] out MaskRevisionDocument? document,
        out IReadOnlyList<DocumentProblem> problems)
    {
        document = StrictDocument.Read(bytes, (root, found) => ReadRoot(root, found, bytes), out problems);
        return document is not null;
    }

    private static MaskRevisionDocument? ReadRoot(JsonElement root, ProblemList problems, ReadOnlyMemory<byte> bytes)
    {
        if (ObjectReader.Open(root, string.Empty, problems) is not { } reader)
            return null;
        var format = reader.Text("format", ObjectReader.LongestName);
        if (format is not null && format != Format)
            reader.Add("format", $"Expected {Format}.");
        var deviceId = reader.Id("deviceId");
        var conditionId = reader.Id("conditionId");
        var revision = reader.WholeNumber("revision", 1);
        var mask = MaskDocument.Read(reader);
        reader.Finish();
        if (problems.Count > 0 || deviceId is null || conditionId is null || revision is null || mask is null)
            return null;

        var exact = BytesOf(deviceId.Value, conditionId.Value, revision.Value, mask);
        if (!bytes.Span.SequenceEqual(exact))
        {
            problems.Add(string.Empty, "These are not the canonical bytes of this mask revision.");
            return null;
        }

        return new MaskRevisionDocument(deviceId.Value, conditionId.Value, revision.Value, mask, exact);
    }

    private static byte[] BytesOf(Guid deviceId, Guid conditionId, int revision, MaskDocument mask)
    {
        var json = new JsonObject
        {
            ["format"] = Format,
            ["deviceId"] = deviceId.ToString("D"),
            ["conditionId"] = conditionId.ToString("D"),
            ["revision"] = revision,
        };
        mask.WriteMembers(json);
        return CanonicalJson.Serialize(json);
    }
}

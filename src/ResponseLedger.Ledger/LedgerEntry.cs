using System.Text.Json.Nodes;

namespace ResponseLedger.Ledger;

/// <summary>One entry of the ledger: its exact canonical bytes, made once and never serialised again.</summary>
public sealed class LedgerEntry
{
    /// <summary>The version of the entry's shape, its member <c>v</c>.</summary>
    public const int FormatVersion = 1;

    private LedgerEntry(DateTimeOffset at, string kind, byte[] bytes)
    {
        At = at;
        Kind = kind;
        Bytes = bytes;
        Sha256 = CanonicalJson.Digest(bytes);
    }

    /// <summary>When it happened, in UTC, cut to microseconds.</summary>
    public DateTimeOffset At { get; }

    /// <summary>What happened, a stable word such as <c>maskReleased</c>.</summary>
    public string Kind { get; }

    /// <summary>The canonical bytes, RFC 8785.</summary>
    public ReadOnlyMemory<byte> Bytes { get; }

    /// <summary>SHA-256 of the bytes, 32 bytes. The leaf of the tree has another hash: <see cref="MerkleTree.LeafHash"/>.</summary>
    public ReadOnlyMemory<byte> Sha256 { get; }

    /// <summary>Makes an entry; <paramref name="subject"/> and <paramref name="detail"/> are copied.</summary>
    /// <param name="at">When it happened; cut to microseconds.</param>
    /// <param name="kind">What happened, a stable camelCase word.</param>
    /// <param name="actor">Who did it.</param>
    /// <param name="subject">Ids of what it happened to, by name.</param>
    /// <param name="detail">What else must be known; old values beside new ones.</param>
    /// <exception cref="CanonicalJsonException">A value has no canonical form.</exception>
    /// <exception cref="ArgumentException">The kind or the actor's name is empty.</exception>
    public static LedgerEntry Create(DateTimeOffset at, string kind, Actor actor, JsonObject subject, JsonObject detail)
    {
        ArgumentException.ThrowIfNullOrWhiteSpace(kind);
        ArgumentNullException.ThrowIfNull(actor);
        ArgumentException.ThrowIfNullOrWhiteSpace(actor.Name, nameof(actor));
        ArgumentNullException.ThrowIfNull(subject);
        ArgumentNullException.ThrowIfNull(detail);
        var entry = new JsonObject
        {
            ["v"] = FormatVersion,
            ["at"] = Microseconds.Format(at),
            ["kind"] = kind,
            ["actor"] = new JsonObject { ["kind"] = WordOf(actor.Kind), ["id"] = actor.Id?.ToString("D"), ["name"] = actor.Name },
            ["subject"] = subject.DeepClone(),
            ["detail"] = detail.DeepClone(),
        };
        return new LedgerEntry(Microseconds.Cut(at), kind, CanonicalJson.Serialize(entry));
    }

    private static string WordOf(ActorKind kind) => kind switch
    {
        ActorKind.Person => "person",
        ActorKind.Bench => "bench",
        ActorKind.Server => "server",
        _ => throw new ArgumentOutOfRangeException(nameof(kind), kind, "An actor is a person, a bench or the server."),
    };
}

using System.Text.Json.Nodes;
using ResponseLedger.Ledger;
using ResponseLedger.Store.Model;

namespace ResponseLedger.Store.Acts;

/// <summary>One act in progress: its context, its time, and the ledger entries that belong to it. Made by <see cref="ActRunner"/> alone.</summary>
public sealed class Act
{
    internal Act(ResponseLedgerContext db, Actor actor, DateTimeOffset at, TimeProvider time)
    {
        Db = db;
        Actor = actor;
        At = at;
        this.time = time;
    }

    private readonly TimeProvider time;
    private readonly List<LedgerEntryRow> entries = [];

    /// <summary>The context inside the act's transaction. Add rows; the runner saves and commits.</summary>
    public ResponseLedgerContext Db { get; }

    /// <summary>Who acts.</summary>
    public Actor Actor { get; }

    /// <summary>The act's time, UTC, cut to microseconds; all its rows and entries carry it.</summary>
    public DateTimeOffset At { get; private set; }

    /// <summary>
    /// Takes the time anew. An act that waited for a lock happens when it holds it, not when it began to wait: else it would be
    /// dated before what others did meanwhile and it rests on. Call it before any row or entry is made.
    /// </summary>
    /// <exception cref="InvalidOperationException">An entry with the earlier time is there already.</exception>
    public void HappensNow()
    {
        if (entries.Count > 0)
            throw new InvalidOperationException("The act has an entry already, which carries the time before.");
        At = Microseconds.Cut(time.GetUtcNow());
    }

    /// <summary>A new id in the order of time.</summary>
    public Guid NewId() => Guid.CreateVersion7(time.GetUtcNow());

    /// <summary>Adds an entry to the ledger, in the act's own transaction. Every act has at least one.</summary>
    /// <param name="kind">A stable dotted word, such as <c>lot.decided</c>.</param>
    /// <param name="subject">Ids and names of what was acted on.</param>
    /// <param name="detail">What changed: new values and, where there were any, old ones.</param>
    public void Record(string kind, JsonObject subject, JsonObject detail)
    {
        var entry = LedgerEntry.Create(At, kind, Actor, subject, detail);
        entries.Add(new LedgerEntryRow { Id = NewId(), Kind = kind, Bytes = entry.Bytes.ToArray(), At = At });
    }

    /// <summary>The acting person's id, or null when a bench or the server acts.</summary>
    public Guid? PersonId => Actor.Kind == ActorKind.Person ? Actor.Id : null;

    /// <summary>The acting token's id, or null when no bench acts.</summary>
    public Guid? TokenId => Actor.Kind == ActorKind.Bench ? Actor.Id : null;

    /// <summary>The acting person's id where a row needs one; empty for the server.</summary>
    public Guid ById => Actor.Id ?? Guid.Empty;

    internal IReadOnlyList<LedgerEntryRow> Entries => entries;

    /// <summary>How many of the entries, from the first on, the act has written itself, in a batch with its rows.</summary>
    internal int EntriesWritten { get; set; }
}

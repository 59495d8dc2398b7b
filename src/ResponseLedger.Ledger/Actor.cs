namespace ResponseLedger.Ledger;

/// <summary>Who did what an entry tells.</summary>
public enum ActorKind
{
    /// <summary>A signed-in person.</summary>
    Person = 1,

    /// <summary>A bench, by its token.</summary>
    Bench = 2,

    /// <summary>The server itself.</summary>
    Server = 3,
}

/// <summary>Who did what an entry tells, as named at that time.</summary>
/// <param name="Kind">Person, bench or server.</param>
/// <param name="Id">The person's or bench's id; null for the server.</param>
/// <param name="Name">The name at that time, so that the entry reads without the database.</param>
public sealed record Actor(ActorKind Kind, Guid? Id, string Name)
{
    /// <summary>The server, acting on its own.</summary>
    public static Actor Server { get; } = new(ActorKind.Server, null, "server");

    /// <summary>A person.</summary>
    public static Actor Person(Guid id, string name) => new(ActorKind.Person, id, name);

    /// <summary>A bench.</summary>
    public static Actor Bench(Guid id, string name) => new(ActorKind.Bench, id, name);
}

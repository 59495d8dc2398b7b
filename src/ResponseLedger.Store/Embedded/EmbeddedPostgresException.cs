namespace ResponseLedger.Store.Embedded;

/// <summary>The embedded PostgreSQL cannot be started or used; the message says what to do about it.</summary>
public sealed class EmbeddedPostgresException : Exception
{
    public EmbeddedPostgresException()
    {
    }

    public EmbeddedPostgresException(string message)
        : base(message)
    {
    }

    public EmbeddedPostgresException(string message, Exception inner)
        : base(message, inner)
    {
    }

    /// <summary>Whether there are no programs of PostgreSQL to run at all.</summary>
    public bool IsAbsence { get; init; }
}

namespace ResponseLedger.Ledger;

/// <summary>A value has no canonical form: a name twice, a lone surrogate, a number that is not finite, or nesting too deep.</summary>
public sealed class CanonicalJsonException : FormatException
{
    /// <summary>Makes an exception without a message of its own.</summary>
    public CanonicalJsonException()
    {
    }

    /// <summary>Makes an exception that says what has no canonical form.</summary>
    public CanonicalJsonException(string message)
        : base(message)
    {
    }

    /// <summary>Makes an exception that says what has no canonical form, and what was met below.</summary>
    public CanonicalJsonException(string message, Exception innerException)
        : base(message, innerException)
    {
    }
}

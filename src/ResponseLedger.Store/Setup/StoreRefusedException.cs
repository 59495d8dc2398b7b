namespace ResponseLedger.Store.Setup;

/// <summary>The database cannot be used as it is; the message says what to change.</summary>
public sealed class StoreRefusedException : Exception
{
    public StoreRefusedException()
    {
    }

    public StoreRefusedException(string message)
        : base(message)
    {
    }

    public StoreRefusedException(string message, Exception inner)
        : base(message, inner)
    {
    }
}

namespace ResponseLedger.Bench;

/// <summary>What a command's exit code says to the script that called it.</summary>
internal static class ExitCodes
{
    /// <summary>Every file is in order.</summary>
    public const int InOrder = 0;

    /// <summary>At least one file is refused or its unit does not pass; the output says which and why.</summary>
    public const int NotInOrder = 1;

    /// <summary>Nothing could be done: the server does not answer or refuses the token, or the call is wrong.</summary>
    public const int NotDone = 2;
}

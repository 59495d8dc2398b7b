namespace ResponseLedger.Bench;

/// <summary>What a command's exit code says to the script that called it.</summary>
internal static class ExitCodes
{
    /// <summary>Every file is in order: read, or taken, and each production run passes.</summary>
    public const int InOrder = 0;

    /// <summary>At least one file is refused, or a production run does not pass or has no verdict; the output says which and why.</summary>
    public const int NotInOrder = 1;

    /// <summary>At least one file was not dealt with: the call is wrong, the file cannot be opened, or the server does not answer or lets nobody in.</summary>
    public const int NotDone = 2;
}

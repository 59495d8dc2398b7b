namespace ResponseLedger.Server.Start;

/// <summary>How far the start has come. The server listens from the first moment, and takes requests once it is ready.</summary>
internal sealed class Readiness
{
    private volatile string? waitingFor = "the database";

    /// <summary>What the start waits for now; null once it is done.</summary>
    public string? WaitingFor => waitingFor;

    /// <summary>Whether the start is done.</summary>
    public bool IsReady => waitingFor is null;

    /// <summary>Says what the start waits for from now on.</summary>
    public void Await(string what) => waitingFor = what;

    /// <summary>Whether the migrations are through, so that background work may query.</summary>
    public bool TablesStand { get; set; }

    /// <summary>Says that the start is done.</summary>
    public void Done() => waitingFor = null;
}

namespace ResponseLedger.Server.Demo;

/// <summary>The time of the demo lab's invented weeks: it stands where it is set. Everything else of time is the server's own.</summary>
internal sealed class DemoClock(TimeProvider real) : TimeProvider
{
    private DateTimeOffset now = real.GetUtcNow();

    /// <summary>Sets the time of what is done next.</summary>
    public void Set(DateTimeOffset time) => now = time;

    public override DateTimeOffset GetUtcNow() => now;
}

namespace ResponseLedger.Server.Demo;

/// <summary>The invented demo lab. It fills the demo database through the real intake, once.</summary>
internal static class DemoLab
{
    public static Task RunAsync(IServiceProvider services, CancellationToken cancellationToken) => Task.CompletedTask;
}

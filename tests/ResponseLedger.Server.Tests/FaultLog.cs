using Microsoft.Extensions.Logging;

namespace ResponseLedger.Server.Tests;

/// <summary>Keeps the last error that a server logged, so that a test that met a 500 can tell why.</summary>
internal sealed class FaultLog : ILoggerProvider, ILogger
{
    private static volatile string last = "";

    /// <summary>The last error of any server of this process.</summary>
    public static string Last => last;

    public ILogger CreateLogger(string categoryName) => this;

    public IDisposable? BeginScope<TState>(TState state)
        where TState : notnull
        => null;

    public bool IsEnabled(LogLevel logLevel) => logLevel >= LogLevel.Error;

    public void Log<TState>(LogLevel logLevel, EventId eventId, TState state, Exception? exception, Func<TState, Exception?, string> formatter)
    {
        if (IsEnabled(logLevel))
            last = $"{Environment.NewLine}{formatter(state, exception)} {exception}";
    }

    public void Dispose()
    {
    }
}

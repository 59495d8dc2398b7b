using System.Collections.Concurrent;
using System.Diagnostics;
using Microsoft.AspNetCore.Http;

namespace ResponseLedger.Benchmarks.Lab;

/// <summary>Takes the server's own time of a request, from the first middleware to the end of the last, by an id that the request carries.</summary>
internal sealed class ServerTimes
{
    public const string Header = "X-Bench-Request";

    private readonly ConcurrentDictionary<string, TaskCompletionSource<double>> waiting = new();
    private int last;

    /// <summary>An id to send, and the time in milliseconds once the server has answered it.</summary>
    public (string Id, Task<double> Milliseconds) Expect()
    {
        var id = Interlocked.Increment(ref last).ToString(System.Globalization.CultureInfo.InvariantCulture);
        var source = new TaskCompletionSource<double>(TaskCreationOptions.RunContinuationsAsynchronously);
        waiting[id] = source;
        return (id, source.Task);
    }

    public async Task MeasureAsync(HttpContext http, RequestDelegate next)
    {
        var start = Stopwatch.GetTimestamp();
        try
        {
            await next(http);
        }
        finally
        {
            if (waiting.TryRemove(http.Request.Headers[Header].ToString(), out var source))
                source.SetResult(Stopwatch.GetElapsedTime(start).TotalMilliseconds);
        }
    }
}

using System.Globalization;
using System.Net;
using System.Net.Http.Headers;

namespace ResponseLedger.Bench;

/// <summary>What came of sending: the server's answer, or why there is none.</summary>
/// <param name="Status">The status of the answer; null without one.</param>
/// <param name="Body">The answer's body.</param>
/// <param name="Reason">Why there is no answer, or where a redirect leads.</param>
internal sealed record Sent(HttpStatusCode? Status, byte[] Body, string? Reason);

/// <summary>Sends one file as a run. A try that fails is made again: what was taken already is answered as a duplicate, so that is always safe.</summary>
/// <param name="client">The client; its base address is the server's.</param>
/// <param name="errors">Told why it takes longer.</param>
/// <param name="time">The clock that waits.</param>
internal sealed class Sender(HttpClient client, TextWriter errors, TimeProvider time)
{
    private static readonly TimeSpan LongestPause = TimeSpan.FromSeconds(30);

    // With what lies between them some 30 s: longer than a restart of the server.
    private static readonly TimeSpan[] Pauses = [.. new[] { 1, 2, 4, 8, 15 }.Select(s => TimeSpan.FromSeconds(s))];

    /// <summary>Sends a file with the fields of its run.</summary>
    public async Task<Sent> SendAsync(GivenFile file, byte[] content, IReadOnlyDictionary<string, string> fields, CancellationToken cancellationToken)
    {
        for (var failed = 0; ; failed++)
        {
            var (sent, pause, again) = await TryAsync(file, content, fields, cancellationToken);
            if (!again || failed == Pauses.Length)
                return sent;

            var wait = pause ?? Pauses[failed];
            var why = sent.Reason ?? $"the server answered {((int)sent.Status!).ToString(CultureInfo.InvariantCulture)}";
            await errors.WriteLineAsync($"{file.Shown}: {why}; trying again in {wait.TotalSeconds.ToString("0", CultureInfo.InvariantCulture)} s.");
            await Task.Delay(wait, time, cancellationToken);
        }
    }

    private async Task<(Sent Sent, TimeSpan? Pause, bool Again)> TryAsync(
        GivenFile file, byte[] content, IReadOnlyDictionary<string, string> fields, CancellationToken cancellationToken)
    {
        try
        {
            using var form = new MultipartFormDataContent();
            foreach (var (name, value) in fields)
                form.Add(new StringContent(value), name);
            form.Add(new ByteArrayContent(content), "file", file.Name);
            using var response = await client.PostAsync(new Uri("api/runs", UriKind.Relative), form, cancellationToken);
            var sent = new Sent(response.StatusCode, await response.Content.ReadAsByteArrayAsync(cancellationToken), response.Headers.Location?.ToString());
            return (sent, Pause(response.Headers.RetryAfter), (int)response.StatusCode >= 500 || response.StatusCode is HttpStatusCode.TooManyRequests or HttpStatusCode.RequestTimeout);
        }
        catch (HttpRequestException exception)
        {
            return (new Sent(null, [], Innermost(exception)), null, exception.HttpRequestError is not HttpRequestError.SecureConnectionError);
        }
        catch (OperationCanceledException) when (!cancellationToken.IsCancellationRequested)
        {
            return (new Sent(null, [], $"no answer within {client.Timeout.TotalSeconds.ToString("0", CultureInfo.InvariantCulture)} s"), null, true);
        }
    }

    private static TimeSpan? Pause(RetryConditionHeaderValue? asked)
        => asked?.Delta is { } delta ? TimeSpan.FromTicks(Math.Clamp(delta.Ticks, TimeSpan.TicksPerSecond, LongestPause.Ticks)) : null;

    // The outer ones say no more than that something failed.
    private static string Innermost(Exception exception) => exception.GetBaseException().Message.TrimEnd('.');
}

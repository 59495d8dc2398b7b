using System.Net;
using System.Text;

namespace ResponseLedger.Bench.Tests;

/// <summary>What the network answers to one request after the other, and what it was asked. The last answer holds for all that follow.</summary>
internal sealed class ScriptedServer(params Func<HttpResponseMessage>[] answers) : HttpMessageHandler
{
    public List<Request> Requests { get; } = [];

    /// <summary>Done before each answer.</summary>
    public Action<int>? Before { get; init; }

    public static Func<HttpResponseMessage> Says(HttpStatusCode status, string body, int? retryAfterSeconds = null, string? location = null) => () =>
    {
        var response = new HttpResponseMessage(status) { Content = new StringContent(body, Encoding.UTF8, "application/json") };
        if (retryAfterSeconds is { } seconds)
            response.Headers.RetryAfter = new(TimeSpan.FromSeconds(seconds));
        if (location is not null)
            response.Headers.Location = new Uri(location);
        return response;
    };

    /// <summary>One file's result, as the server writes it.</summary>
    public static Func<HttpResponseMessage> Result(string outcome, string? verdict = "pass", string more = "")
    {
        var worst = """{"criterion":"top","outcome":"pass","frequencyHz":1250,"margin":0.24999999999997,"unit":"dB"}""";
        var json = verdict is null ? "null" : $$"""{"outcome":"{{verdict}}","worst":{{worst}}}""";
        return Says(
            outcome switch { "accepted" => HttpStatusCode.Created, "duplicate" => HttpStatusCode.OK, _ => HttpStatusCode.UnprocessableEntity },
            $$"""{"results":[{"fileName":"x","outcome":"{{outcome}}","runId":null,"serial":"SN1","verdict":{{json}},"notes":[],"issues":[]{{more}}}]}""");
    }

    public static Func<HttpResponseMessage> Fails(Exception exception) => () => throw exception;

    protected override async Task<HttpResponseMessage> SendAsync(HttpRequestMessage request, CancellationToken cancellationToken)
    {
        cancellationToken.ThrowIfCancellationRequested();
        var parts = new Dictionary<string, string>();
        foreach (var part in (MultipartFormDataContent)request.Content!)
            parts.Add(part.Headers.ContentDisposition!.Name!.Trim('"'), await part.ReadAsStringAsync(cancellationToken));
        var file = ((MultipartFormDataContent)request.Content!).Single(p => p.Headers.ContentDisposition!.FileName is not null).Headers.ContentDisposition!.FileName!.Trim('"');
        Requests.Add(new Request(request.RequestUri!.ToString(), request.Headers.Authorization?.ToString(), file, parts));
        Before?.Invoke(Requests.Count);
        cancellationToken.ThrowIfCancellationRequested();
        return answers[Math.Min(Requests.Count, answers.Length) - 1]();
    }

    internal sealed record Request(string Address, string? Authorization, string FileName, Dictionary<string, string> Parts);
}

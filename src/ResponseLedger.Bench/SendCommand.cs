using System.CommandLine;
using System.Net;
using System.Net.Http.Headers;
using System.Text.Json;

namespace ResponseLedger.Bench;

/// <summary>
/// <c>send FILE...</c>: sends each file as a run of its own and prints its verdict. A file that was sent before is answered
/// as a duplicate, so a broken connection is simply tried again.
/// </summary>
internal static class SendCommand
{
    private const int MostTries = 5;

    public static Command Create(TextWriter output, Func<HttpClient> connect)
    {
        var files = new Argument<FileInfo[]>("files") { Description = "Sweep files, one a run.", Arity = ArgumentArity.OneOrMore };
        files.AcceptExistingOnly();
        var server = new Option<Uri>("--server") { Description = "Address of the server.", DefaultValueFactory = _ => new Uri("http://127.0.0.1:5080") };
        var token = new Option<FileInfo>("--token-file") { Description = "File that holds the bench's token. Left out: the environment variable RESPONSELEDGER_TOKEN." };
        token.AcceptExistingOnly();
        var device = new Option<string>("--device") { Description = "Part number, PART/REV or id of the device.", Required = true };
        string[] plain = ["lot", "bench", "serial", "purpose", "condition"];
        var fields = plain.ToDictionary(name => name, name => new Option<string?>($"--{name}") { Description = $"The run's {name}." });
        var command = new Command("send", "Sends sweep files and prints each unit's verdict.") { files, server, token, device };
        foreach (var option in fields.Values)
            command.Options.Add(option);
        command.SetAction(async (parsed, cancellationToken) =>
        {
            var secret = parsed.GetValue(token) is { } secretFile
                ? (await File.ReadAllTextAsync(secretFile.FullName, cancellationToken)).Trim()
                : Environment.GetEnvironmentVariable("RESPONSELEDGER_TOKEN");
            if (string.IsNullOrEmpty(secret))
            {
                output.WriteLine("No token: name its file with --token-file, or set RESPONSELEDGER_TOKEN.");
                return ExitCodes.NotDone;
            }

            using var client = connect();
            client.BaseAddress = parsed.GetRequiredValue(server);
            client.DefaultRequestHeaders.Authorization = new AuthenticationHeaderValue("Bearer", secret);
            var told = new Dictionary<string, string> { ["device"] = parsed.GetRequiredValue(device) };
            foreach (var (name, option) in fields)
            {
                if (parsed.GetValue(option) is { } value)
                    told[name] = value;
            }

            var worst = ExitCodes.InOrder;
            foreach (var file in parsed.GetRequiredValue(files))
                worst = Math.Max(worst, await SendAsync(output, client, told, file, cancellationToken));
            return worst;
        });
        return command;
    }

    private static async Task<int> SendAsync(TextWriter output, HttpClient client, Dictionary<string, string> told, FileInfo file, CancellationToken cancellationToken)
    {
        for (var attempt = 1; ; attempt++)
        {
            try
            {
                using var form = new MultipartFormDataContent();
                foreach (var (name, value) in told)
                    form.Add(new StringContent(value), name);
                form.Add(new ByteArrayContent(await File.ReadAllBytesAsync(file.FullName, cancellationToken)), "file", file.Name);
                using var response = await client.PostAsync(new Uri("/api/runs", UriKind.Relative), form, cancellationToken);
                if (response.StatusCode is not (HttpStatusCode.ServiceUnavailable or HttpStatusCode.TooManyRequests) || attempt >= MostTries)
                    return Tell(output, file.Name, response.StatusCode, await response.Content.ReadAsByteArrayAsync(cancellationToken));
            }
            catch (HttpRequestException exception) when (attempt >= MostTries)
            {
                output.WriteLine($"{file.Name}: the server does not answer ({exception.Message})");
                return ExitCodes.NotDone;
            }
            catch (HttpRequestException)
            {
                // Sending again is safe: what was taken already is answered as a duplicate.
            }

            await Task.Delay(TimeSpan.FromSeconds(Math.Pow(2, attempt - 1)), cancellationToken);
        }
    }

    private static int Tell(TextWriter output, string name, HttpStatusCode status, byte[] body)
    {
        try
        {
            using var answer = JsonDocument.Parse(body);
            if (answer.RootElement.TryGetProperty("results", out var results) && results.GetArrayLength() > 0)
                return Tell(output, name, results[0]);
            output.WriteLine($"{name}: {(int)status}, {(answer.RootElement.TryGetProperty("detail", out var detail) ? detail.GetString() : "no reason given")}");
        }
        catch (JsonException)
        {
            output.WriteLine($"{name}: {(int)status}, and no answer that this client understands");
        }

        return ExitCodes.NotDone;
    }

    private static int Tell(TextWriter output, string name, JsonElement result)
    {
        var outcome = result.GetProperty("outcome").GetString();
        var verdict = result.TryGetProperty("verdict", out var found) && found.ValueKind == JsonValueKind.Object
            && found.TryGetProperty("outcome", out var word) ? word.GetString() : null;
        output.WriteLine($"{name}: {outcome}{(verdict is null ? "" : $", {verdict}")}");
        if (verdict is not null && found.TryGetProperty("worst", out var worst) && worst.ValueKind == JsonValueKind.Object)
            output.WriteLine($"  nearest to a limit: {worst.GetProperty("criterion").GetString()}, margin {worst.GetProperty("margin").GetRawText()} {worst.GetProperty("unit").GetString()}");
        foreach (var note in Items(result, "notes"))
            output.WriteLine($"  {Sentence(note)}");
        foreach (var issue in Items(result, "issues"))
            output.WriteLine($"  {CheckCommand.Place(Number(issue, "line"), Number(issue, "column"))}{Sentence(issue)}");
        return outcome != "refused" && verdict is null or "pass" or "conditionalPass" ? ExitCodes.InOrder : ExitCodes.NotInOrder;
    }

    private static JsonElement.ArrayEnumerator Items(JsonElement result, string name)
        => result.TryGetProperty(name, out var items) && items.ValueKind == JsonValueKind.Array ? items.EnumerateArray() : default;

    private static string Sentence(JsonElement item)
        => item.ValueKind == JsonValueKind.String ? item.GetString()! : item.TryGetProperty("message", out var message) ? message.GetString()! : item.GetRawText();

    private static int? Number(JsonElement item, string name)
        => item.TryGetProperty(name, out var value) && value.ValueKind == JsonValueKind.Number ? value.GetInt32() : null;
}

using System.CommandLine;
using System.Net.Http.Headers;

namespace ResponseLedger.Bench;

/// <summary>
/// <c>send FILE...</c>: sends each file as a run of its own and prints its verdict. A file that was sent before is answered
/// as a duplicate, so a call that was broken off is simply made again.
/// </summary>
internal static class SendCommand
{
    private const string AddressVariable = "RESPONSELEDGER_SERVER";

    // The name in the call, the name in the request, and what it is.
    private static readonly (string Option, string Field, string Description)[] Fields =
    [
        ("--device", "device", "Part number, PART/REV or id of the device."),
        ("--lot", "lot", "Number or id of the lot."),
        ("--bench", "bench", "Name or id of the bench; only for a token that is not bound to one."),
        ("--serial", "serial", "Serial number of the unit, for one file. Left out: found in each file's name."),
        ("--purpose", "purpose", "production (where left out), golden, through, check or study."),
        ("--condition", "condition", "Name or id of the condition. Left out: the device's first."),
        ("--measured-at", "measuredAt", "When it was measured, such as 2026-03-01T09:30:00Z. Left out: when it is received."),
        ("--columns", "columns", "What the columns hold, where the heads leave it open: JSON, as the refusal of such a file shows it."),
        ("--circumstances", "circumstances", "JSON with temperatureC, driveVrms, sourceOhm, loadOhm, instruments."),
        ("--acknowledge", "acknowledge", "sameFileOtherUnit: the same bytes are meant for another unit of the lot too."),
    ];

    public static Command Create(Surroundings surroundings)
    {
        var files = new Argument<string[]>("files") { Description = "Sweep files or patterns such as *.csv, one file a run.", Arity = ArgumentArity.OneOrMore };
        var server = new Option<string?>("--server") { Description = $"Address of the server. Left out: the environment variable {AddressVariable}, else {ServerAddress.Usual}." };
        var plain = new Option<bool>("--allow-plain-http") { Description = "Lets the token go unencrypted to another machine." };
        var token = new Option<string?>("--token-file") { Description = $"File that holds the bench's token. Left out: the environment variable {BenchToken.Variable}." };
        var command = new Command("send", "Sends sweep files and prints each unit's verdict.") { files, server, plain, token };
        var options = Fields.ToDictionary(f => f.Field, f => new Option<string?>(f.Option) { Description = f.Description });
        foreach (var option in options.Values)
            command.Options.Add(option);
        command.SetAction(async (parsed, cancellationToken) =>
        {
            var problems = new List<string>();
            var found = GivenFiles.Find(parsed.GetRequiredValue(files), out var missing);
            problems.AddRange(missing);
            var secret = BenchToken.Read(parsed.GetValue(token), surroundings.Variable, out var tokenProblem);
            var address = ServerAddress.Read(
                parsed.GetValue(server) ?? (surroundings.Variable(AddressVariable) is { Length: > 0 } named ? named : ServerAddress.Usual),
                parsed.GetValue(plain), out var addressProblem);
            if (parsed.GetValue(options["serial"]) is not null && found.Count > 1)
                problems.Add("--serial names one unit, and there are several files. Send each with its own, or leave it out.");
            problems.AddRange(new[] { tokenProblem, addressProblem }.OfType<string>());
            if (problems.Count > 0)
            {
                foreach (var problem in problems)
                    await surroundings.Errors.WriteLineAsync(problem);
                return ExitCodes.NotDone;
            }

            using var client = surroundings.Connect();
            client.BaseAddress = address;
            client.DefaultRequestHeaders.Authorization = new AuthenticationHeaderValue("Bearer", secret);
            var told = options.Select(o => (o.Key, Value: parsed.GetValue(o.Value))).Where(o => o.Value is not null).ToDictionary(o => o.Key, o => o.Value!);
            return await SendAllAsync(surroundings, client, found, told, cancellationToken);
        });
        return command;
    }

    private static async Task<int> SendAllAsync(
        Surroundings surroundings, HttpClient client, IReadOnlyList<GivenFile> files, Dictionary<string, string> fields, CancellationToken cancellationToken)
    {
        var report = new Report(surroundings.Output, files.Count);
        var sender = new Sender(client, surroundings.Errors, surroundings.Time);
        var isProduction = fields.GetValueOrDefault("purpose", "production") == "production";
        var done = 0;
        try
        {
            for (var goesOn = true; goesOn && done < files.Count; done++)
                goesOn = await SendAsync(sender, report, files[done], fields, isProduction, client.BaseAddress!, cancellationToken);
        }
        catch (OperationCanceledException)
        {
            await surroundings.Errors.WriteLineAsync("Stopped.");
        }

        if (done < files.Count)
        {
            report.Count("not sent", files.Count - done, ExitCodes.NotDone);
            await surroundings.Errors.WriteLineAsync($"Not sent: {files[done].Shown}{(files.Count - done > 1 ? " and all after it" : "")}. Make the same call again: what was taken is answered as sent before.");
        }

        report.Summary();
        return report.ExitCode;
    }

    // Whether to go on with the next file: not when what stands against this one stands against all.
    private static async Task<bool> SendAsync(
        Sender sender, Report report, GivenFile file, Dictionary<string, string> fields, bool isProduction, Uri server, CancellationToken cancellationToken)
    {
        byte[] content;
        try
        {
            content = await File.ReadAllBytesAsync(file.Path, cancellationToken);
        }
        catch (Exception barred) when (barred is IOException or UnauthorizedAccessException)
        {
            report.File(file, $"cannot be opened. {barred.Message}", "cannot be opened", ExitCodes.NotDone);
            return true;
        }

        var sent = await sender.SendAsync(file, content, fields, cancellationToken);
        return RunAnswer.Tell(report, file, sent, isProduction, server);
    }
}

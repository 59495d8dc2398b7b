using System.Globalization;
using System.Net;
using System.Text.Json;

namespace ResponseLedger.Bench;

/// <summary>Tells what the server answered to a file.</summary>
internal static class RunAnswer
{
    private const string Unsent = "not taken";

    /// <summary>Tells it; false when what stands against this file stands against all that follow.</summary>
    public static bool Tell(Report report, GivenFile file, Sent sent, bool isProduction, Uri server)
    {
        if (sent.Status is not { } status)
        {
            report.File(file, $"not sent. {server} does not answer: {sent.Reason}.", "not sent", ExitCodes.NotDone);
            return false;
        }

        if ((int)status is >= 300 and < 400)
        {
            report.File(file, $"not sent. {server} sends callers on to {sent.Reason}; give the address that is meant with --server.", "not sent", ExitCodes.NotDone);
            return false;
        }

        try
        {
            using var answer = JsonDocument.Parse(sent.Body);
            if (answer.RootElement.ValueKind == JsonValueKind.Object)
            {
                if (answer.RootElement.TryGetProperty("results", out var results) && results.GetArrayLength() > 0)
                    TellResult(report, file, results[0], isProduction);
                else
                    TellProblem(report, file, status, answer.RootElement);
                return results.ValueKind == JsonValueKind.Array || status == HttpStatusCode.RequestEntityTooLarge;
            }
        }
        catch (JsonException)
        {
            // No JSON: something between us and the server answered.
        }

        report.File(file, $"{Unsent}. {server} answered {Number(status)} and nothing that a ResponseLedger server says.", Unsent, ExitCodes.NotDone);
        return false;
    }

    private static void TellProblem(Report report, GivenFile file, HttpStatusCode status, JsonElement problem)
    {
        report.File(file, $"{Unsent} ({Number(status)}). {Text(problem, "detail") ?? "The server gave no reason."}", Unsent, ExitCodes.NotDone);
        if (!problem.TryGetProperty("errors", out var errors) || errors.ValueKind != JsonValueKind.Object)
            return;
        foreach (var field in errors.EnumerateObject())
        {
            foreach (var sentence in field.Value.EnumerateArray())
                report.Line($"{field.Name}: {sentence.GetString()}");
        }
    }

    private static void TellResult(Report report, GivenFile file, JsonElement result, bool isProduction)
    {
        var outcome = Text(result, "outcome");
        if (outcome == "refused")
        {
            report.File(file, "REFUSED", "refused", ExitCodes.NotInOrder);
        }
        else
        {
            var verdict = Member(result, "verdict", JsonValueKind.Object);
            var word = verdict is { } given ? Text(given, "outcome") : null;
            var words = word is null ? "no verdict" : Words(word);
            var passes = word is "pass" or "conditionalPass" || !isProduction;
            var unit = Text(result, "serial") is { } serial ? $", unit {serial}" : "";
            report.File(
                file,
                (word is null ? $"taken{unit}, without a verdict{Why(result)}" : $"{words.ToUpperInvariant()}{unit}{Worst(verdict!.Value)}") + (outcome == "duplicate" ? " (sent before)" : ""),
                words, passes ? ExitCodes.InOrder : ExitCodes.NotInOrder);
        }

        foreach (var issue in Items(result, "issues"))
            report.Line($"{Report.Place(Whole(issue, "line"), Whole(issue, "column"))}{Text(issue, "message")}");
        foreach (var candidate in Items(result, "candidates"))
            report.Line($"perhaps --columns '{candidate.GetRawText()}'");
        foreach (var note in Items(result, "notes"))
            report.Note(Text(note, "message") ?? note.GetRawText());
    }

    private static string Why(JsonElement result)
        => Text(result, "verdictReason") switch
        {
            null => "",
            "noReleasedMask" => ": no mask is released for this condition",
            var code => $": {code}",
        };

    // "; nearest to a limit: pass band top, margin 0.25 dB at 1.2 kHz", or why it could not be told.
    private static string Worst(JsonElement verdict)
    {
        if (Member(verdict, "worst", JsonValueKind.Object) is not { } worst)
            return "";
        var criterion = Text(worst, "criterion");
        if (Member(worst, "margin", JsonValueKind.Number) is not { } margin)
            return $"; {criterion}: {Text(worst, "explanation") ?? "no margin"}";
        var at = Member(worst, "frequencyHz", JsonValueKind.Number) is { } frequency ? $" at {NumberWords.Frequency(frequency.GetDouble())}" : "";
        var unit = Text(worst, "unit") is { } named and not "1" ? $" {named}" : "";
        return $"; nearest to a limit: {criterion}, margin {NumberWords.Short(margin.GetDouble())}{unit}{at}";
    }

    // conditionalPass is "conditional pass".
    private static string Words(string word) => string.Concat(word.Select(c => char.IsUpper(c) ? $" {char.ToLowerInvariant(c)}" : $"{c}"));

    private static string Number(HttpStatusCode status) => ((int)status).ToString(CultureInfo.InvariantCulture);

    private static JsonElement.ArrayEnumerator Items(JsonElement element, string name)
        => Member(element, name, JsonValueKind.Array) is { } items ? items.EnumerateArray() : default;

    private static string? Text(JsonElement element, string name) => Member(element, name, JsonValueKind.String)?.GetString();

    private static int? Whole(JsonElement element, string name)
        => Member(element, name, JsonValueKind.Number) is { } number && number.TryGetInt32(out var value) ? value : null;

    private static JsonElement? Member(JsonElement element, string name, JsonValueKind kind)
        => element.ValueKind == JsonValueKind.Object && element.TryGetProperty(name, out var value) && value.ValueKind == kind ? value : null;
}

using System.CommandLine;
using ResponseLedger.Formats;

namespace ResponseLedger.Bench;

/// <summary><c>check FILE...</c>: reads files without any server and tells what was found or what is wrong.</summary>
internal static class CheckCommand
{
    public static Command Create(Surroundings surroundings)
    {
        var files = new Argument<string[]>("files") { Description = "Sweep files, or patterns such as *.csv.", Arity = ArgumentArity.OneOrMore };
        var columns = new Option<string?>("--columns") { Description = "What the columns hold, where the heads leave it open: JSON, as the refusal of such a file shows it." };
        var command = new Command("check", "Reads sweep files and tells what was found in them; sends nothing.") { files, columns };
        command.SetAction((parsed, cancellationToken) => RunAsync(surroundings, parsed.GetRequiredValue(files), parsed.GetValue(columns), cancellationToken));
        return command;
    }

    private static async Task<int> RunAsync(Surroundings surroundings, string[] given, string? columns, CancellationToken cancellationToken)
    {
        var files = GivenFiles.Find(given, out var problems);
        ColumnChoices? chosen = null;
        if (columns is not null && !ColumnChoices.TryParse(columns, out chosen, out var wrong))
            problems = [.. problems, $"--columns: {wrong}"];
        if (problems.Count > 0)
        {
            foreach (var problem in problems)
                await surroundings.Errors.WriteLineAsync(problem);
            return ExitCodes.NotDone;
        }

        var report = new Report(surroundings.Output, files.Count);
        foreach (var file in files)
        {
            try
            {
                Tell(report, file, SweepFileReader.Read(await File.ReadAllBytesAsync(file.Path, cancellationToken), file.Name, chosen, cancellationToken));
            }
            catch (Exception barred) when (barred is IOException or UnauthorizedAccessException)
            {
                report.File(file, $"cannot be opened. {barred.Message}", "cannot be opened", ExitCodes.NotDone);
            }
        }

        report.Summary();
        return report.ExitCode;
    }

    private static void Tell(Report report, GivenFile file, FileReading reading)
    {
        if (reading.Sweep is { } sweep)
        {
            var span = $"{sweep.Count} points from {NumberWords.Frequency(sweep.FrequencyHz[0])} to {NumberWords.Frequency(sweep.FrequencyHz[^1])}";
            report.File(file, $"in order, {span}, {(sweep.HasPhase ? "with phase" : "magnitude only")}", "in order", ExitCodes.InOrder);
        }
        else
        {
            report.File(file, $"refused, {reading.IssueCount} {(reading.IssueCount == 1 ? "problem" : "problems")}", "refused", ExitCodes.NotInOrder);
        }

        foreach (var issue in reading.Issues)
            report.Line($"{Report.Place(issue.Line, issue.Column)}{issue.Message}");
        if (reading.IssueCount > reading.Issues.Count)
            report.Line($"and {reading.IssueCount - reading.Issues.Count} more.");
        foreach (var candidate in reading.Candidates)
            report.Line($"perhaps --columns '{candidate.ToJson()}'");
        foreach (var note in reading.Notes)
            report.Note(note.Message);
    }
}

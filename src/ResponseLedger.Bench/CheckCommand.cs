using System.CommandLine;
using System.Globalization;
using ResponseLedger.Formats;

namespace ResponseLedger.Bench;

/// <summary><c>check FILE...</c>: reads files without any server and tells what was found or what is wrong.</summary>
internal static class CheckCommand
{
    public static Command Create(TextWriter output)
    {
        var files = new Argument<FileInfo[]>("files") { Description = "Sweep files.", Arity = ArgumentArity.OneOrMore };
        files.AcceptExistingOnly();
        var command = new Command("check", "Reads sweep files and tells what was found in them; sends nothing.") { files };
        command.SetAction(async (parsed, cancellationToken) =>
        {
            var inOrder = true;
            foreach (var file in parsed.GetRequiredValue(files))
                inOrder &= Tell(output, file.Name, SweepFileReader.Read(await File.ReadAllBytesAsync(file.FullName, cancellationToken), file.Name, ct: cancellationToken));
            return inOrder ? ExitCodes.InOrder : ExitCodes.NotInOrder;
        });
        return command;
    }

    private static bool Tell(TextWriter output, string name, FileReading reading)
    {
        if (reading.Sweep is { } sweep)
        {
            output.WriteLine(string.Create(CultureInfo.InvariantCulture,
                $"{name}: {sweep.Count} points, {sweep.FrequencyHz[0]:G6} Hz to {sweep.FrequencyHz[^1]:G6} Hz, {(sweep.HasPhase ? "with phase" : "magnitude only")}"));
        }
        else
        {
            output.WriteLine($"{name}: refused, {reading.IssueCount} {(reading.IssueCount == 1 ? "problem" : "problems")}");
        }

        foreach (var note in reading.Notes)
            output.WriteLine($"  {note.Message}");
        foreach (var issue in reading.Issues)
            output.WriteLine($"  {Place(issue.Line, issue.Column)}{issue.Message}");
        return reading.Sweep is not null;
    }

    /// <summary>"line 7, column 2: ", as much of it as is known.</summary>
    internal static string Place(int? line, int? column) => (line, column) switch
    {
        (null, _) => "",
        ({ } at, null) => $"line {at}: ",
        ({ } at, { } across) => $"line {at}, column {across}: ",
    };
}

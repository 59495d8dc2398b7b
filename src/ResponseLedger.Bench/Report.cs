namespace ResponseLedger.Bench;

/// <summary>What is printed of a call: a line for each file, more lines under it, and a summary where there are several files.</summary>
/// <param name="output">Where it is printed.</param>
/// <param name="files">How many files there are.</param>
internal sealed class Report(TextWriter output, int files)
{
    private readonly HashSet<string> told = new(StringComparer.Ordinal);
    private readonly List<(string What, int Count)> tally = [];
    private int at;

    /// <summary>The worst exit code so far.</summary>
    public int ExitCode { get; private set; } = ExitCodes.InOrder;

    /// <summary>The line of the next file; of several it begins with how far the work is.</summary>
    /// <param name="file">The file.</param>
    /// <param name="outcome">What became of it.</param>
    /// <param name="countedAs">Under which words the summary counts it.</param>
    /// <param name="exitCode">What that means for the caller.</param>
    public void File(GivenFile file, string outcome, string countedAs, int exitCode)
    {
        at++;
        var place = files > 1 ? $"[{at.ToString().PadLeft(files.ToString().Length)}/{files}] " : "";
        output.WriteLine($"{place}{file.Shown}: {outcome}");
        Count(countedAs, 1, exitCode);
    }

    /// <summary>A line under the file's.</summary>
    public void Line(string sentence) => output.WriteLine($"  {sentence}");

    /// <summary>A line under the file's that says something about a whole kind of files: it is told once.</summary>
    public void Note(string sentence)
    {
        if (told.Add(sentence))
            Line(sentence);
    }

    /// <summary>Counts files that have no line of their own.</summary>
    public void Count(string countedAs, int count, int exitCode)
    {
        ExitCode = Math.Max(ExitCode, exitCode);
        var known = tally.FindIndex(t => t.What == countedAs);
        if (known < 0)
            tally.Add((countedAs, count));
        else
            tally[known] = (countedAs, tally[known].Count + count);
    }

    /// <summary>The summary.</summary>
    public void Summary()
    {
        if (files > 1)
            output.WriteLine($"{files} files: {string.Join(", ", tally.Select(t => $"{t.Count} {t.What}"))}.");
    }

    /// <summary>"line 7, column 2: ", as much of it as is known.</summary>
    public static string Place(int? line, int? column) => (line, column) switch
    {
        (null, _) => "",
        ({ } at, null) => $"line {at}: ",
        ({ } at, { } across) => $"line {at}, column {across}: ",
    };
}

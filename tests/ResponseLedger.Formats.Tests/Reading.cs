using System.Text;
using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Formats.Tests;

/// <summary>Says in a test what is read and what is expected, with the reading's own words in a failure.</summary>
internal static class Reading
{
    public static FileReading Of(string text, ColumnChoices? chosen = null, string name = "unit_1.csv")
        => SweepFileReader.Read(Encoding.UTF8.GetBytes(text), name, chosen, TestContext.Current.CancellationToken);

    public static FileReading OfFile(params string[] path)
    {
        string file = Path.Combine([ReferenceFolder, .. path]);
        return SweepFileReader.Read(File.ReadAllBytes(file), Path.GetFileName(file), null, TestContext.Current.CancellationToken);
    }

    public static string ReferenceFolder
    {
        get
        {
            DirectoryInfo? folder = new(AppContext.BaseDirectory);
            while (folder is not null && !File.Exists(Path.Combine(folder.FullName, "ResponseLedger.sln")))
                folder = folder.Parent;
            Assert.NotNull(folder);
            return Path.Combine(folder.FullName, "tests", "reference");
        }
    }

    public static Sweep Taken(this FileReading reading)
    {
        Assert.True(reading.Sweep is not null, reading.Words());
        Assert.Empty(reading.Issues);
        Assert.Equal(0, reading.IssueCount);
        Assert.NotNull(reading.Choices);
        return reading.Sweep;
    }

    public static FileReading Refused(this FileReading reading, string code, int? line, int? column)
    {
        Assert.True(reading.Sweep is null, "The file was taken. " + reading.Words());
        Assert.True(reading.Issues.Any(i => i.Code == code && i.Line == line && i.Column == column),
            $"No {code} at {line}:{column}. " + reading.Words());
        return reading;
    }

    public static string Words(this FileReading reading)
        => string.Join(" | ", reading.Issues.Select(i => $"{i.Line}:{i.Column} {i.Code} {i.Message}"))
            + " notes: " + string.Join(" | ", reading.Notes.Select(n => n.Code + " " + n.Message))
            + " candidates: " + string.Join(" ", reading.Candidates.Select(c => c.ToJson()));

    public static void Same(ReadOnlySpan<double> actual, params double[] expected) => Assert.Equal(expected, actual.ToArray());

    public static void Near(ReadOnlySpan<double> actual, params double[] expected)
    {
        Assert.Equal(expected.Length, actual.Length);
        for (int i = 0; i < expected.Length; i++)
            Assert.True(Math.Abs(actual[i] - expected[i]) <= 1e-12 * Math.Max(1, Math.Abs(expected[i])), $"Value {i}: {actual[i]:R} for {expected[i]:R}");
    }
}

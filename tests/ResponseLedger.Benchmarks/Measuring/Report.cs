using System.Globalization;

namespace ResponseLedger.Benchmarks.Measuring;

/// <summary>Prints markdown tables and keeps what failed. A time never fails; lost rows and errors do.</summary>
internal sealed class Report(TextWriter output)
{
    private readonly List<string> failures = [];

    /// <summary>Prints a table with its title in the head of the first column.</summary>
    public void Table(string[] heads, params IEnumerable<string[]> rows)
    {
        Line(heads);
        Line([.. heads.Select((_, i) => i == 0 ? "---" : "---:")]);
        foreach (var row in rows)
            Line(row);
        output.WriteLine();
    }

    /// <summary>Prints a sentence.</summary>
    public void Say(string sentence) => output.WriteLine(sentence + "\n");

    /// <summary>Keeps a failure; the run goes on and ends with a code that is not zero.</summary>
    public void Fail(string sentence)
    {
        failures.Add(sentence);
        Console.Error.WriteLine("FAILED: " + sentence);
    }

    /// <summary>Fails unless two counts are the same.</summary>
    public void Same(string what, long expected, long found)
    {
        if (expected != found)
            Fail($"{what}: {found} instead of {expected}.");
    }

    /// <summary>The exit code.</summary>
    public int End() => failures.Count == 0 ? 0 : 1;

    public static string Ms(double milliseconds) => milliseconds.ToString(Math.Abs(milliseconds) < 0.1 ? "0.0000" : Math.Abs(milliseconds) < 10 ? "0.00" : Math.Abs(milliseconds) < 100 ? "0.0" : "0", CultureInfo.InvariantCulture);

    public static string Ratio(double ratio) => ratio.ToString(Math.Abs(ratio) < 0.1 ? "0.000" : "0.00", CultureInfo.InvariantCulture);

    public static string Number(double value) => value.ToString("#,0", CultureInfo.InvariantCulture);

    private void Line(string[] cells) => output.WriteLine("| " + string.Join(" | ", cells) + " |");
}

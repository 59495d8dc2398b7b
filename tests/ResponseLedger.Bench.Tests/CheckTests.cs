namespace ResponseLedger.Bench.Tests;

public sealed class CheckTests : IDisposable
{
    private readonly Call call = new();

    public void Dispose() => call.Dispose();

    [Fact]
    public async Task A_good_file_is_told_by_its_points_and_span()
    {
        Assert.Equal(ExitCodes.InOrder, await call.RunAsync(["check", call.File("SN1.csv")]));
        Assert.Equal("SN1.csv: in order, 3 points from 10 Hz to 10 kHz, with phase", call.Output[0]);
        Assert.DoesNotContain(call.Output, line => line.Contains("files:", StringComparison.Ordinal));
        Assert.Empty(call.Errors);
    }

    [Fact]
    public async Task A_bad_file_among_good_ones_is_told_with_line_and_column_and_the_others_as_ever()
    {
        string[] files = [call.File("A.csv"), call.File("B.csv", "frequency_hz,gain_db\n10,0\n20,zero\n30,0\n"), call.File("C.s1p", "# Hz S RI R 50\n1 1 0\n2 1 0\n")];
        Assert.Equal(ExitCodes.NotInOrder, await call.RunAsync(["check", .. files]));
        Assert.StartsWith("[1/3] A.csv: in order, ", call.Output[0], StringComparison.Ordinal);
        var bad = Array.IndexOf(call.Output, "[2/3] B.csv: refused, 1 problem");
        Assert.StartsWith("  line 3, column 2: ", call.Output[bad + 1], StringComparison.Ordinal);
        Assert.Contains("zero", call.Output[bad + 1], StringComparison.Ordinal);
        Assert.Contains(call.Output, line => line.StartsWith("[3/3] C.s1p: in order, 2 points", StringComparison.Ordinal));
        Assert.Equal("3 files: 2 in order, 1 refused.", call.Output[^1]);
    }

    [Fact]
    public async Task Of_very_many_problems_the_rest_is_counted()
    {
        var rows = string.Concat(Enumerable.Range(1, 200).Select(i => $"{i},x{i}\n"));
        Assert.Equal(ExitCodes.NotInOrder, await call.RunAsync(["check", call.File("A.csv", $"frequency_hz,gain_db\n{rows}")]));
        var told = call.Output.Count(line => line.StartsWith("  line ", StringComparison.Ordinal));
        Assert.InRange(told, 1, 199);
        Assert.StartsWith("A.csv: refused, 200 problems", call.Output[0], StringComparison.Ordinal);
        Assert.Contains($"  and {200 - told} more.", call.Output);
    }

    [Fact]
    public async Task What_was_settled_for_many_files_is_told_once()
    {
        Assert.Equal(ExitCodes.InOrder, await call.RunAsync(["check", call.File("A.csv"), call.File("B.csv"), call.File("C.csv")]));
        var notes = call.Output.Where(line => line.StartsWith("  ", StringComparison.Ordinal)).ToList();
        Assert.NotEmpty(notes);
        Assert.Equal(notes.Distinct(), notes);
    }

    [Fact]
    public async Task Open_columns_are_answered_with_choices_that_can_be_given_back()
    {
        var file = call.File("A.csv", "a,b,c\n10,1,2\n20,3,4\n30,5,6\n");
        Assert.Equal(ExitCodes.NotInOrder, await call.RunAsync(["check", file]));
        const string lead = "  perhaps --columns '";
        var choice = call.Output.First(line => line.StartsWith(lead, StringComparison.Ordinal))[lead.Length..].TrimEnd('\'');
        Assert.Equal(ExitCodes.InOrder, await call.RunAsync(["check", file, "--columns", choice]));
        Assert.Equal(ExitCodes.NotDone, await call.RunAsync(["check", file, "--columns", "frequency"]));
        Assert.StartsWith("--columns: ", Assert.Single(call.Errors), StringComparison.Ordinal);
    }

    [Fact]
    public async Task A_pattern_is_resolved_by_name_whether_or_not_the_shell_does_it()
    {
        foreach (var name in (string[])["SN2.csv", "SN1.csv", "other.txt"])
            call.File(name);
        Assert.Equal(ExitCodes.InOrder, await call.RunAsync(["check", Path.Combine(call.Folder, "SN*.csv"), Path.Combine(call.Folder, "SN1.csv")]));
        Assert.Equal(["[1/2] SN1.csv", "[2/2] SN2.csv"], call.Output.Where(line => line[0] == '[').Select(line => line.Split(':')[0]));
        Assert.Equal("2 files: 2 in order.", call.Output[^1]);
    }

    [Fact]
    public async Task A_call_that_names_something_wrong_does_nothing_and_says_what()
    {
        var good = call.File("A.csv");
        string Named(string name) => Path.Combine(call.Folder, name);
        Assert.Equal(ExitCodes.NotDone, await call.RunAsync(["check", good, Named("B.csv"), call.Folder, Named("*.s2p"), "--fast"]));
        Assert.Empty(call.Output);
        Assert.Equal(4, call.Errors.Length);
        Assert.Equal("B.csv: there is no such file.", call.Errors[0]);
        Assert.Contains("is a folder", call.Errors[1], StringComparison.Ordinal);
        Assert.Equal("*.s2p: no file fits.", call.Errors[2]);
        Assert.Equal("--fast: there is no such option.", call.Errors[3]);
    }

    [Fact]
    public async Task A_file_that_cannot_be_opened_is_named_and_the_others_are_read()
    {
        var barred = call.File("A.csv");
        using var held = new FileStream(barred, FileMode.Open, FileAccess.ReadWrite, FileShare.None);
        Assert.Equal(ExitCodes.NotDone, await call.RunAsync(["check", barred, call.File("B.csv")]));
        Assert.StartsWith("[1/2] A.csv: cannot be opened. ", call.Output[0], StringComparison.Ordinal);
        Assert.Equal("2 files: 1 cannot be opened, 1 in order.", call.Output[^1]);
    }

    [Theory]
    [InlineData]
    [InlineData("check")]
    [InlineData("measure", "x.csv")]
    public async Task A_call_that_cannot_be_understood_ends_with_2(params string[] args)
    {
        Assert.Equal(ExitCodes.NotDone, await call.RunAsync(args));
        Assert.Equal("Call it with --help to see what it takes.", call.Errors[^1]);
        Assert.True(call.Errors.Length > 1);
    }

    [Theory]
    [InlineData("--help")]
    [InlineData("send", "--help")]
    [InlineData("--version")]
    public async Task Help_and_version_end_with_0(params string[] args)
    {
        Assert.Equal(ExitCodes.InOrder, await call.RunAsync(args));
        Assert.NotEmpty(call.Output);
        Assert.Empty(call.Errors);
    }
}

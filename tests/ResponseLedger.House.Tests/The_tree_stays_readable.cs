namespace ResponseLedger.House.Tests;

public sealed class The_tree_stays_readable
{
    private const int LongestFile = 400;

    private static readonly string[] vagueNames = ["Helper", "Helpers", "Util", "Utils", "Common", "Misc"];

    private static IEnumerable<string> Code
        => Tree.SourceFiles("src", "*.cs").Concat(Tree.SourceFiles("tests", "*.cs")).Concat(Tree.SourceFiles("web", "*.js"));

    [Fact]
    public void A_long_file_says_in_its_head_why_it_is_long()
        => Assert.Empty(Code
            .Where(file => File.ReadLines(file).Count() > LongestFile)
            .Where(file => !File.ReadLines(file).Take(12).Any(line => line.Contains("long file:", StringComparison.OrdinalIgnoreCase)))
            .Select(Tree.Name));

    [Fact]
    public void No_file_or_folder_has_a_name_that_says_nothing()
        => Assert.Empty(Code.Select(Tree.Name).Where(name => name.Split('/')
            .Any(part => vagueNames.Contains(Path.GetFileNameWithoutExtension(part), StringComparer.OrdinalIgnoreCase)
                || vagueNames.Any(vague => Path.GetFileNameWithoutExtension(part).EndsWith(vague, StringComparison.Ordinal)))).ToList());

    [Fact]
    public void Only_the_act_runner_and_the_sequencer_commit()
    {
        string[] allowed =
        [
            "src/ResponseLedger.Store/Acts/ActRunner.cs",
            "src/ResponseLedger.Store/Acts/LedgerSequencer.cs",
        ];
        Assert.Empty(Tree.SourceFiles("src", "*.cs")
            .Where(file => File.ReadAllText(file).Contains("BeginTransaction", StringComparison.Ordinal))
            .Select(Tree.Name).Except(allowed));
    }
}

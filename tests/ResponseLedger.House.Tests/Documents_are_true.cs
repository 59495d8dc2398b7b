using System.Text.RegularExpressions;

namespace ResponseLedger.House.Tests;

public sealed partial class Documents_are_true
{
    public static TheoryData<string> Documents => ["README.md", "DEVELOPERS.md"];

    [Theory]
    [MemberData(nameof(Documents))]
    public void Every_path_that_a_document_names_exists(string document)
    {
        var text = File.ReadAllText(Path.Combine(Tree.Root, document));
        var named = PathInCode().Matches(text).Select(match => match.Groups[1].Value.TrimEnd('/', '.'))
            .Where(path => path.Split('/')[0] is "src" or "tests" or "web" or "migrations" or "deploy");
        Assert.Empty(named.Where(path => !File.Exists(Path.Combine(Tree.Root, path)) && !Directory.Exists(Path.Combine(Tree.Root, path))).ToList());
    }

    [Fact]
    public void The_readme_gives_the_two_commands_and_they_can_be_run()
    {
        var text = File.ReadAllText(Path.Combine(Tree.Root, "README.md"));
        foreach (var command in new[] { "deploy/start.sh", "tests/run.sh" })
        {
            Assert.Contains(command, text, StringComparison.Ordinal);
            if (!OperatingSystem.IsWindows())
                Assert.True(File.GetUnixFileMode(Path.Combine(Tree.Root, command)).HasFlag(UnixFileMode.UserExecute), $"{command} is not executable");
        }
    }

    [Fact]
    public void The_developers_guide_names_every_room()
    {
        var text = File.ReadAllText(Path.Combine(Tree.Root, "DEVELOPERS.md"));
        Assert.Empty(Rooms.All.Keys.Where(room => !text.Contains($"ResponseLedger.{room}", StringComparison.Ordinal)).ToList());
    }

    [GeneratedRegex(@"[`\s(]((?:src|tests|web|migrations|deploy)/[A-Za-z0-9_./-]+)")]
    private static partial Regex PathInCode();
}

using ResponseLedger.Server.Http;

namespace ResponseLedger.Server.Tests.House;

/// <summary>Where the pages are served from, and whether a browser may keep them. The test's own folder lies inside the checkout, as artifacts/server does.</summary>
public sealed class WebRootTests : IDisposable
{
    private readonly DirectoryInfo program = Directory.CreateDirectory(Path.Combine(AppContext.BaseDirectory, "web-root", Lab.Unique("program")));

    public void Dispose() => program.Delete(recursive: true);

    [Fact]
    public void Pages_beside_the_program_are_those_of_a_published_server_and_may_be_kept()
    {
        var pages = program.CreateSubdirectory("web");
        File.WriteAllText(Path.Combine(pages.FullName, "index.html"), "<p>{version}</p>");

        var web = new WebRoot(program.FullName);

        Assert.Equal(pages.FullName, web.Folder);
        Assert.True(web.IsImmutable);
        Assert.Contains(web.Shell.Version, System.Text.Encoding.UTF8.GetString(web.Shell.Html), StringComparison.Ordinal);
    }

    [Fact]
    public void Without_pages_beside_it_a_program_in_a_checkout_serves_the_source_and_sees_every_edit()
    {
        var web = new WebRoot(program.FullName);

        Assert.True(File.Exists(Path.Combine(web.Folder, "index.html")), web.Folder);
        Assert.True(File.Exists(Path.Combine(web.Folder, "..", "ResponseLedger.sln")), web.Folder);
        Assert.False(web.IsImmutable);
    }

    [Fact]
    public void A_link_beside_the_program_leads_to_pages_that_somebody_edits()
    {
        var source = program.CreateSubdirectory("source");
        var index = Path.Combine(source.FullName, "index.html");
        File.WriteAllText(index, "<p>first</p>");
        Directory.CreateSymbolicLink(Path.Combine(program.FullName, "web"), source.FullName);
        var web = new WebRoot(program.FullName);
        var before = web.Shell.Version;

        File.WriteAllText(index, "<p>the second</p>");

        Assert.False(web.IsImmutable);
        Assert.NotEqual(before, web.Shell.Version);
    }
}

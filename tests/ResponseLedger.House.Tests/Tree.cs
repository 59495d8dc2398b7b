namespace ResponseLedger.House.Tests;

/// <summary>The source tree that the tests were built from.</summary>
internal static class Tree
{
    public static string Root { get; } = Find();

    public static IEnumerable<string> SourceFiles(string folder, string pattern)
        => Directory.EnumerateFiles(Path.Combine(Root, folder), pattern, SearchOption.AllDirectories)
            .Where(file => !Parts(file).Any(part => part is "bin" or "obj" or "node_modules" or "vendor" or "artifacts"))
            .Order(StringComparer.Ordinal);

    public static string Name(string file) => Path.GetRelativePath(Root, file).Replace('\\', '/');

    private static string[] Parts(string file) => Name(file).Split('/');

    private static string Find()
    {
        for (var folder = new DirectoryInfo(AppContext.BaseDirectory); folder is not null; folder = folder.Parent)
        {
            if (File.Exists(Path.Combine(folder.FullName, "ResponseLedger.sln")))
                return folder.FullName;
        }

        throw new InvalidOperationException("The tests run outside a checkout: no ResponseLedger.sln above them.");
    }
}

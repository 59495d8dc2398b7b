namespace ResponseLedger.Records.Tests;

/// <summary>Files of the reference set.</summary>
internal static class ReferenceFiles
{
    public static byte[] Read(string name) => File.ReadAllBytes(PathOf(name));

    /// <summary>The rows of a comma-separated table below its head, without comment lines.</summary>
    public static IReadOnlyList<string[]> Rows(string name)
        => [.. File.ReadLines(PathOf(name)).Where(l => l.Length > 0 && l[0] != '#').Skip(1).Select(l => l.Split(','))];

    private static string PathOf(string name)
    {
        var folder = new DirectoryInfo(AppContext.BaseDirectory);
        while (!File.Exists(Path.Combine(folder.FullName, "ResponseLedger.sln")))
            folder = folder.Parent ?? throw new InvalidOperationException("The tests stand outside the repository.");
        return Path.Combine(folder.FullName, "tests", "reference", name);
    }
}

namespace ResponseLedger.Bench;

/// <summary>A file that was named in the call.</summary>
/// <param name="Shown">Its name as it was given, for messages.</param>
/// <param name="Path">Where it is.</param>
internal sealed record GivenFile(string Shown, string Path)
{
    /// <summary>Its name without folders, as the server gets it.</summary>
    public string Name => System.IO.Path.GetFileName(Path);
}

/// <summary>Finds the files of a call. Patterns are resolved here, because not every shell does.</summary>
internal static class GivenFiles
{
    /// <summary>The files in the order given, those of a pattern by name, each once.</summary>
    /// <param name="given">Names and patterns.</param>
    /// <param name="problems">What cannot be found; then nothing should be done, for the call is not what was meant.</param>
    public static IReadOnlyList<GivenFile> Find(IEnumerable<string> given, out IReadOnlyList<string> problems)
    {
        var files = new List<GivenFile>();
        var missing = new List<string>();
        foreach (var name in given)
        {
            if (File.Exists(name))
                files.Add(new GivenFile(name, Path.GetFullPath(name)));
            else if (Directory.Exists(name))
                missing.Add($"{name} is a folder. Name the files in it, such as {Path.Combine(name, "*.csv")}.");
            else if (Path.GetFileName(name).AsSpan().ContainsAny('*', '?'))
                AddFitting(name, files, missing);
            else
                missing.Add($"{name}: there is no such {(name.StartsWith('-') ? "option" : "file")}.");
        }

        problems = missing;
        return [.. files.DistinctBy(f => f.Path)];
    }

    private static void AddFitting(string pattern, List<GivenFile> files, List<string> missing)
    {
        var folder = Path.GetDirectoryName(pattern) is { Length: > 0 } named ? named : ".";
        var found = Directory.Exists(folder) ? Directory.GetFiles(folder, Path.GetFileName(pattern)) : [];
        if (found.Length == 0)
            missing.Add($"{pattern}: no file fits.");
        files.AddRange(found.Order(StringComparer.Ordinal).Select(f => new GivenFile(Path.GetDirectoryName(pattern) is { Length: > 0 } ? f : Path.GetFileName(f), Path.GetFullPath(f))));
    }
}

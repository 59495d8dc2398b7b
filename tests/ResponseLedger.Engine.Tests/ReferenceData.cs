using System.Globalization;
using System.Text.Json;

namespace ResponseLedger.Engine.Tests;

/// <summary>Reads the reference set from the source tree; nothing is copied to the output.</summary>
public static class ReferenceData
{
    private static readonly string Folder = FindFolder();

    public static JsonElement Json(string name)
    {
        using var document = JsonDocument.Parse(File.ReadAllBytes(Path.Combine(Folder, name)));
        return document.RootElement.Clone();
    }

    /// <summary>Rows of a CSV of the set: comment lines left out, cells by the head row's names. No cell in the files read here is quoted.</summary>
    public static IReadOnlyList<Dictionary<string, string>> Csv(string name)
    {
        var lines = File.ReadLines(Path.Combine(Folder, name)).Where(l => l.Length > 0 && l[0] != '#').ToList();
        string[] heads = lines[0].Split(',');
        return lines.Skip(1).Select(l => heads.Zip(l.Split(',')).ToDictionary(p => p.First, p => p.Second)).ToList();
    }

    public static double Number(string cell) => cell switch
    {
        "inf" => double.PositiveInfinity,
        "-inf" => double.NegativeInfinity,
        _ => double.Parse(cell, CultureInfo.InvariantCulture),
    };

    public static double[] Column(IReadOnlyList<Dictionary<string, string>> rows, string head) => rows.Select(r => Number(r[head])).ToArray();

    public static double[] Numbers(JsonElement array) => array.EnumerateArray().Select(e => e.GetDouble()).ToArray();

    private static string FindFolder()
    {
        for (var folder = new DirectoryInfo(AppContext.BaseDirectory); folder is not null; folder = folder.Parent)
        {
            if (File.Exists(Path.Combine(folder.FullName, "ResponseLedger.sln")))
                return Path.Combine(folder.FullName, "tests", "reference");
        }

        throw new InvalidOperationException("No folder above the tests holds ResponseLedger.sln.");
    }
}

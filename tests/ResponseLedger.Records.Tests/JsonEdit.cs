using System.Text.Json.Nodes;

namespace ResponseLedger.Records.Tests;

/// <summary>Puts a value at a place of a JSON text, such as <c>limits[0].corners[1].value</c>; the value is JSON text, kept as it stands.</summary>
internal static class JsonEdit
{
    private const string Mark = "\"the value that is put in\"";

    public static string Set(string json, string place, string value)
    {
        var root = JsonNode.Parse(json)!;
        var steps = place.Replace("[", ".[", StringComparison.Ordinal).Split('.', StringSplitOptions.RemoveEmptyEntries);
        var parent = root;
        foreach (var step in steps.SkipLast(1))
            parent = step[0] == '[' ? parent[IndexOf(step)]! : parent[step]!;
        var marked = JsonNode.Parse(Mark);
        if (steps[^1][0] == '[')
            parent[IndexOf(steps[^1])] = marked;
        else
            parent[steps[^1]] = marked;
        return root.ToJsonString().Replace(Mark, value, StringComparison.Ordinal);
    }

    private static int IndexOf(string step) => int.Parse(step.Trim('[', ']'), null);
}

using System.Text.Json;

namespace ResponseLedger.Records.Strict;

/// <summary>
/// Reads one JSON object member by member: every member must be asked for, have its type, and stand once.
/// What is wrong becomes a problem with its path; reading goes on, so that all problems are told at once.
/// An explicit null counts as left out.
/// </summary>
internal sealed class ObjectReader
{
    /// <summary>Longest text of a title or name, in UTF-16 code units.</summary>
    public const int LongestName = 200;

    /// <summary>Longest reason or statement, in UTF-16 code units.</summary>
    public const int LongestProse = 10_000;

    private const string NotUnicode = "This text is not Unicode: half of a surrogate pair, or a wrong byte.";

    private readonly Dictionary<string, JsonElement> members = new(StringComparer.Ordinal);
    private readonly HashSet<string> asked = new(StringComparer.Ordinal);

    private ObjectReader(string path, ProblemList problems)
    {
        Path = path;
        Problems = problems;
    }

    public string Path { get; }

    public ProblemList Problems { get; }

    /// <summary>Opens an object, or adds a problem and gives null.</summary>
    public static ObjectReader? Open(JsonElement json, string path, ProblemList problems)
    {
        if (json.ValueKind != JsonValueKind.Object)
        {
            problems.Add(path, $"Expected an object, found {KindOf(json)}.");
            return null;
        }

        var reader = new ObjectReader(path, problems);
        foreach (var member in json.EnumerateObject())
        {
            try
            {
                if (!reader.members.TryAdd(member.Name, member.Value))
                    problems.Add(reader.PathOf(member.Name), "This member stands twice; keep one.");
            }
            catch (InvalidOperationException)
            {
                problems.Add(path, $"A member name is at fault. {NotUnicode}");
            }
        }

        return reader;
    }

    /// <summary>The text of a JSON string; null where it is not Unicode, which JSON's own reader finds only now.</summary>
    public static string? TextOf(JsonElement json)
    {
        try
        {
            return json.GetString();
        }
        catch (InvalidOperationException)
        {
            return null;
        }
    }

    public string PathOf(string name) => Path.Length == 0 ? name : $"{Path}.{name}";

    public bool Has(string name) => Find(name, out _);

    public void Add(string name, string sentence) => Problems.Add(PathOf(name), sentence);

    /// <summary>A text that is there and not blank; else a problem and null.</summary>
    public string? Text(string name, int longest)
    {
        var text = OptionalText(name, longest);
        if (text is null)
        {
            if (!Has(name))
                AddMissing(name, "a text");
            return null;
        }

        if (!string.IsNullOrWhiteSpace(text))
            return text;
        Add(name, "This text must not be empty.");
        return null;
    }

    /// <summary>A name that is there, not blank, and one plain line; else a problem and null.</summary>
    public string? Name(string name)
    {
        if (Text(name, LongestName) is not { } text)
            return null;
        if (TextRules.AgainstName(text) is not { } problem)
            return text;
        Add(name, problem);
        return null;
    }

    /// <summary>A text, empty or not; null where it is left out, or wrong and told.</summary>
    public string? OptionalText(string name, int longest)
    {
        if (!Find(name, out var json))
            return null;
        if (json.ValueKind != JsonValueKind.String)
        {
            Add(name, $"Expected a text, found {KindOf(json)}.");
            return null;
        }

        var text = TextOf(json);
        if (text?.Length <= longest)
            return text;
        Add(name, text is null ? NotUnicode : $"This text is longer than {longest} characters.");
        return null;
    }

    /// <summary>A finite number that is there; else a problem and null.</summary>
    public double? Number(string name)
    {
        if (Has(name))
            return OptionalNumber(name);
        AddMissing(name, "a number");
        return null;
    }

    /// <summary>A finite number; null where it is left out, or wrong and told.</summary>
    public double? OptionalNumber(string name)
    {
        if (!Find(name, out var json))
            return null;
        if (json.ValueKind != JsonValueKind.Number)
        {
            var hint = json.ValueKind == JsonValueKind.String ? "; write it without quotation marks" : string.Empty;
            Add(name, $"Expected a number, found {KindOf(json)}{hint}.");
            return null;
        }

        if (json.TryGetDouble(out var number) && double.IsFinite(number))
            return number;
        Add(name, "This number is too large for a double.");
        return null;
    }

    /// <summary>A whole number of at least <paramref name="least"/> that is there; else a problem and null.</summary>
    public int? WholeNumber(string name, int least)
    {
        if (Number(name) is not { } number)
            return null;
        if (number >= least && number <= int.MaxValue && Math.Floor(number) == number)
            return (int)number;
        Add(name, $"Expected a whole number of {least} or more.");
        return null;
    }

    /// <summary>True or false; false where it is left out.</summary>
    public bool Flag(string name)
    {
        if (!Find(name, out var json))
            return false;
        if (json.ValueKind is not (JsonValueKind.True or JsonValueKind.False))
            Add(name, $"Expected true or false, found {KindOf(json)}.");
        return json.ValueKind == JsonValueKind.True;
    }

    /// <summary>An object that is there; else a problem and null.</summary>
    public ObjectReader? Object(string name)
    {
        if (Has(name))
            return OptionalObject(name);
        AddMissing(name, "an object");
        return null;
    }

    /// <summary>An object; null where it is left out, or wrong and told.</summary>
    public ObjectReader? OptionalObject(string name)
        => Find(name, out var json) ? Open(json, PathOf(name), Problems) : null;

    /// <summary>The items of an array that is there, each read by <paramref name="read"/>; items that come to null are told and left out.</summary>
    public List<T> Items<T>(string name, Func<JsonElement, string, ProblemList, T?> read)
        where T : class
    {
        var items = new List<T>();
        if (!Find(name, out var json))
        {
            AddMissing(name, "an array");
            return items;
        }

        if (json.ValueKind != JsonValueKind.Array)
        {
            Add(name, $"Expected an array, found {KindOf(json)}.");
            return items;
        }

        var index = 0;
        foreach (var element in json.EnumerateArray())
        {
            if (Problems.Count >= ProblemList.Limit)
                break;
            if (read(element, $"{PathOf(name)}[{index++}]", Problems) is { } item)
                items.Add(item);
        }

        return items;
    }

    /// <summary>The names of all members, for objects whose names are data; each still has to be read.</summary>
    public IReadOnlyCollection<string> Names => members.Keys;

    /// <summary>A member that does not go with the others here: a problem where it is there.</summary>
    public void Refuse(string name, string sentence)
    {
        if (Has(name))
            Add(name, sentence);
    }

    /// <summary>Adds a problem for each member that nobody asked for.</summary>
    public void Finish()
    {
        foreach (var name in members.Keys.Where(name => !asked.Contains(name)))
            Add(name, "This member is not known here.");
    }

    private bool Find(string name, out JsonElement json)
    {
        asked.Add(name);
        return members.TryGetValue(name, out json) && json.ValueKind != JsonValueKind.Null;
    }

    private void AddMissing(string name, string expected) => Add(name, $"This member is missing; {expected} is expected.");

    private static string KindOf(JsonElement json) => json.ValueKind switch
    {
        JsonValueKind.Object => "an object",
        JsonValueKind.Array => "an array",
        JsonValueKind.String => "a text",
        JsonValueKind.Number => "a number",
        JsonValueKind.True or JsonValueKind.False => "true or false",
        JsonValueKind.Null => "null",
        _ => "nothing",
    };
}

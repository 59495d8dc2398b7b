namespace ResponseLedger.Ledger.Tests;

/// <summary>The published Merkle vectors in the reference set: named hashes, and proofs that name them.</summary>
internal sealed class MerkleVectors
{
    private readonly Dictionary<string, byte[]> hashes = new(StringComparer.Ordinal);

    public static MerkleVectors Published { get; } = Load();

    public IReadOnlyList<byte[]> Inputs { get; private set; } = [];

    public IReadOnlyList<(int Index, int Size, byte[][] Path)> Inclusion { get; private set; } = [];

    public IReadOnlyList<(int From, int To, byte[][] Path)> Consistency { get; private set; } = [];

    public byte[] this[string name] => hashes[name];

    public byte[] Root(int size) => hashes[$"root{size}"];

    private static MerkleVectors Load()
    {
        var vectors = new MerkleVectors();
        foreach (var line in File.ReadLines(PathOf("merkle", "rfc6962-vectors.txt")))
        {
            var words = line.Split(' ', StringSplitOptions.RemoveEmptyEntries);
            if (words.Length == 0 || words[0].StartsWith('#'))
                continue;
            if (words[0] == "inputs_hex:")
                vectors.Inputs = [.. words.Skip(1).Select(w => Convert.FromHexString(w.Trim('"')))];
            else if (words[0] == "inclusion")
                vectors.Inclusion = [.. words.Skip(2).Select(vectors.Proof)];
            else if (words[0] == "consistency")
                vectors.Consistency = [.. words.Skip(2).Select(vectors.Proof)];
            else if (words.Length == 2 && words[1].Length == 64)
                vectors.hashes[words[0]] = Convert.FromHexString(words[1]);
            else if (words[0].StartsWith("root", StringComparison.Ordinal))
                vectors.AddEqualRoots(words);
        }

        return vectors;
    }

    /// <summary>A line such as <c>root1 = L0, root2 = M0</c>.</summary>
    private void AddEqualRoots(string[] words)
    {
        for (var i = 0; i + 2 < words.Length; i += 3)
            hashes[words[i]] = hashes[words[i + 2].TrimEnd(',')];
    }

    /// <summary>A word such as <c>(5,8)=L4,M3,Q0</c>.</summary>
    private (int First, int Second, byte[][] Path) Proof(string word)
    {
        var halves = word.Split('=');
        var pair = halves[0].Trim('(', ')').Split(',');
        return (int.Parse(pair[0], null), int.Parse(pair[1], null), [.. halves[1].Split(',').Select(name => hashes[name])]);
    }

    private static string PathOf(params string[] parts)
    {
        var folder = new DirectoryInfo(AppContext.BaseDirectory);
        while (!File.Exists(Path.Combine(folder.FullName, "ResponseLedger.sln")))
            folder = folder.Parent ?? throw new InvalidOperationException("The tests stand outside the repository.");
        return Path.Combine([folder.FullName, "tests", "reference", .. parts]);
    }
}

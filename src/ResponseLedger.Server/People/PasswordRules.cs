namespace ResponseLedger.Server.People;

/// <summary>
/// What a password must be: long (NIST SP 800-63B-4, 3.1.1.2: 15 characters where nothing else is asked), and not one that a
/// guesser tries first. No rules of composition; blanks and every script are welcome.
/// </summary>
internal sealed class PasswordRules
{
    public const int ShortestLength = 15;
    public const int LongestLength = 128;

    private const int LeastOfItsOwn = 8;
    private const string Product = "responseledger";
    private const string ListName = "ResponseLedger.Server.People.CommonPasswords.txt";

    private readonly HashSet<string> common = [.. ReadList()];

    /// <summary>What stands against a password, or null.</summary>
    public string? Against(string? password, string email, string name)
    {
        if (password is null || password.Length < ShortestLength)
            return $"A password has at least {ShortestLength} characters; a few words make a good one.";
        if (password.Length > LongestLength)
            return $"A password has at most {LongestLength} characters.";

        var bare = Bare(password);
        if (common.Contains(bare) || IsRepetition(bare) || IsRun(bare))
            return "This password is among those that are tried first. Choose another.";

        var left = bare;
        foreach (var word in Words(email, name))
            left = left.Replace(word, "", StringComparison.Ordinal);
        return left.Length < LeastOfItsOwn ? "This password is little more than the name of the product or of the person. Choose another." : null;
    }

    private static IEnumerable<string> Words(string email, string name)
        => new[] { Product, Bare(email), Bare(email.Split('@')[0]), Bare(name) }
            .Concat(name.Split(' ').Select(Bare))
            .Where(word => word.Length >= 4)
            .OrderByDescending(word => word.Length);

    private static string Bare(string text) => string.Concat(text.Where(c => !char.IsWhiteSpace(c) && c is not ('-' or '_' or '.'))).ToLowerInvariant();

    // "abcabcabcabcabc": a block of up to four characters, again and again.
    private static bool IsRepetition(string text)
    {
        for (var block = 1; block <= 4; block++)
        {
            if (text.Length >= 2 * block && Enumerable.Range(block, text.Length - block).All(i => text[i] == text[i - block]))
                return true;
        }

        return false;
    }

    // "123456789012345", "abcdefghijklmno", and the same backwards.
    private static bool IsRun(string text)
        => text.Length > 1 && (Enumerable.Range(1, text.Length - 1).All(i => Follows(text[i - 1], text[i])) || Enumerable.Range(1, text.Length - 1).All(i => Follows(text[i], text[i - 1])));

    private static bool Follows(char a, char b) => b == a + 1 || (a == '9' && b == '0') || (a == 'z' && b == 'a');

    private static IEnumerable<string> ReadList()
    {
        using var stream = typeof(PasswordRules).Assembly.GetManifestResourceStream(ListName)
            ?? throw new InvalidOperationException("The list of common passwords is not in the assembly.");
        using var reader = new StreamReader(stream);
        while (reader.ReadLine() is { } line)
        {
            if (line.Length > 0)
                yield return Bare(line);
        }
    }
}

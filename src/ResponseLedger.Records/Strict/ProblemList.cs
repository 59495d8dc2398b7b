namespace ResponseLedger.Records.Strict;

/// <summary>Collects what is wrong with a document; keeps the first problems and drops the rest.</summary>
internal sealed class ProblemList
{
    /// <summary>A document that is wrong throughout must not grow an answer of its own size.</summary>
    public const int Limit = 50;

    private const int LongestPath = 200;

    private readonly List<DocumentProblem> problems = [];

    public int Count => problems.Count;

    public IReadOnlyList<DocumentProblem> Problems => problems;

    public void Add(string path, string sentence)
    {
        if (problems.Count < Limit)
            problems.Add(new DocumentProblem(path.Length <= LongestPath ? path : path[..LongestPath], sentence));
    }
}

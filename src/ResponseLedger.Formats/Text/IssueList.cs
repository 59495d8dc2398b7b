namespace ResponseLedger.Formats.Text;

/// <summary>Counts every issue and keeps those that are listed, so that a file of a million faults costs no memory.</summary>
internal sealed class IssueList
{
    private readonly List<ReadIssue> kept = [];

    public int Count { get; private set; }

    public bool IsEmpty => Count == 0;

    /// <summary>Whether a further issue would be listed: spares building sentences that nobody sees.</summary>
    public bool HasRoom => kept.Count < SweepFileReader.MostIssuesListed;

    public void Add(int? line, int? column, string code, string message)
    {
        Count++;
        if (HasRoom)
            kept.Add(new ReadIssue(line, column, code, message));
    }

    /// <summary>Counts an issue found out of the order of lines; it is listed before later lines.</summary>
    public void Insert(int line, int? column, string code, string message)
    {
        Count++;
        kept.Add(new ReadIssue(line, column, code, message));
    }

    public void CountUnlisted() => Count++;

    public IReadOnlyList<ReadIssue> Listed()
        => [.. kept.OrderBy(i => i.Line ?? 0).ThenBy(i => i.Column ?? 0).Take(SweepFileReader.MostIssuesListed)];
}

namespace ResponseLedger.Formats.Text;

/// <summary>Walks the lines of a text: CR, LF and CRLF each end one. Numbers them from 1.</summary>
internal ref struct LineWalk(ReadOnlySpan<char> text)
{
    private readonly ReadOnlySpan<char> all = text;
    private int next;

    /// <summary>The line just read, without its end.</summary>
    public ReadOnlySpan<char> Line { get; private set; }

    /// <summary>Its 1-based number.</summary>
    public int Number { get; private set; }

    /// <summary>Where it begins in the text.</summary>
    public int Offset { get; private set; }

    public bool MoveNext()
    {
        if (next >= all.Length)
            return false;
        Offset = next;
        ReadOnlySpan<char> rest = all[next..];
        int end = rest.IndexOfAny('\r', '\n');
        if (end < 0)
        {
            Line = rest;
            next = all.Length;
        }
        else
        {
            Line = rest[..end];
            bool pair = rest[end] == '\r' && end + 1 < rest.Length && rest[end + 1] == '\n';
            next += end + (pair ? 2 : 1);
        }

        Number++;
        return true;
    }

    /// <summary>Goes on from a place that an earlier walk reported.</summary>
    public static LineWalk From(ReadOnlySpan<char> text, int offset, int number)
    {
        var walk = new LineWalk(text) { next = offset };
        walk.Number = number - 1;
        return walk;
    }
}

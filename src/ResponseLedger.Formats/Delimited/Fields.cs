namespace ResponseLedger.Formats.Delimited;

/// <summary>Walks the fields of one line, trimmed; a field may stand in quotation marks.</summary>
internal ref struct Fields
{
    private readonly ReadOnlySpan<char> line;
    private readonly char delimiter;
    private int next;
    private bool done;

    public Fields(ReadOnlySpan<char> line, char delimiter)
    {
        this.line = delimiter == ' ' ? line.Trim() : line;
        this.delimiter = delimiter;
    }

    public ReadOnlySpan<char> Current { get; private set; }

    /// <summary>How many fields were met so far.</summary>
    public int Count { get; private set; }

    /// <summary>Whether the current field stood in quotation marks.</summary>
    public bool Quoted { get; private set; }

    /// <summary>Whether a quotation mark did not close.</summary>
    public bool Unclosed { get; private set; }

    /// <summary>Whether the current field is the line's last.</summary>
    public readonly bool IsLast => done;

    /// <summary>How many fields the line has when a delimiter at its end is not taken for another one; valid after the walk.</summary>
    public readonly int CountWithoutTrailing => Count > 1 && Current.IsEmpty && !Quoted ? Count - 1 : Count;

    public bool MoveNext()
    {
        if (done)
            return false;
        Count++;
        Quoted = false;
        ReadOnlySpan<char> rest = line[next..];
        int lead = 0;
        while (lead < rest.Length && rest[lead] == ' ' && delimiter != ' ')
            lead++;
        if (lead < rest.Length && rest[lead] == '"')
            return ReadQuoted(rest, lead);
        int end = delimiter == ' ' ? rest.IndexOfAny(' ', '\t') : rest.IndexOf(delimiter);
        Take(rest, 0, end < 0 ? rest.Length : end, end);
        return true;
    }

    private bool ReadQuoted(ReadOnlySpan<char> rest, int open)
    {
        Quoted = true;
        int at = open + 1;
        while (true)
        {
            int close = rest[at..].IndexOf('"');
            if (close < 0)
            {
                Unclosed = true;
                Take(rest, open + 1, rest.Length, -1);
                return true;
            }

            at += close + 1;
            if (at >= rest.Length || rest[at] != '"')
                break;
            at++;
        }

        ReadOnlySpan<char> tail = rest[at..];
        int end = delimiter == ' ' ? tail.IndexOfAny(' ', '\t') : tail.IndexOf(delimiter);
        ReadOnlySpan<char> after = end < 0 ? tail : tail[..end];
        // Text after the closing mark belongs to the field, so that it is refused rather than lost.
        bool clean = after.IsWhiteSpace();
        Take(rest, clean ? open + 1 : open, clean ? at - 1 : at + after.Length, end < 0 ? -1 : at + end);
        return true;
    }

    private void Take(ReadOnlySpan<char> rest, int from, int to, int delimiterAt)
    {
        Current = rest[from..to].Trim();
        if (delimiterAt < 0)
        {
            done = true;
            return;
        }

        next += delimiterAt + 1;
        while (delimiter == ' ' && next < line.Length && line[next] is ' ' or '\t')
            next++;
    }

    /// <summary>Whether a line is a comment: it begins with #, !, %, * or //.</summary>
    public static bool IsComment(ReadOnlySpan<char> line)
    {
        ReadOnlySpan<char> text = line.TrimStart();
        return !text.IsEmpty && (text[0] is '#' or '!' or '%' or '*' || text.StartsWith("//"));
    }
}

using ResponseLedger.Formats.Text;

namespace ResponseLedger.Formats.Delimited;

/// <summary>How the fields of a line are parted and how a decimal fraction is written.</summary>
/// <param name="Delimiter">Comma, semicolon, tab, or blank for any run of blanks and tabs.</param>
/// <param name="DecimalComma">Whether the decimal mark is a comma.</param>
internal readonly record struct Dialect(char Delimiter, bool DecimalComma)
{
    // On a tie the earlier one stands: a stronger delimiter before a weaker one, the point before the comma.
    private static readonly Dialect[] Known =
    [
        new('\t', false), new('\t', true), new(';', false), new(';', true),
        new(',', false), new(',', true), new(' ', false), new(' ', true),
    ];

    // Enough rows to tell the dialect; a file that shows no decimal mark in them is looked at further.
    private const int EnoughRows = 64;
    private const int MostRows = 20_000;
    private const int LongestProbedLine = 65_536;

    public string DelimiterName => Delimiter switch
    {
        ',' => "comma",
        ';' => "semicolon",
        '\t' => "tab",
        _ => "blanks",
    };

    /// <summary>Finds the dialect in which most lines are rows of numbers.</summary>
    /// <returns>False when no line is a row of two numbers or more in any dialect.</returns>
    public static bool TryFind(ReadOnlySpan<char> text, CancellationToken ct, out Dialect dialect, out int firstRowLine, out int columnCount)
    {
        Span<int> score = stackalloc int[Known.Length];
        Span<int> first = stackalloc int[Known.Length];
        var counts = new Dictionary<int, int>[Known.Length];
        for (int k = 0; k < counts.Length; k++)
            counts[k] = [];
        bool markSeen = false;
        int best = 0;
        var lines = new LineWalk(text);
        while (lines.MoveNext() && score[best] < 2 * (markSeen ? EnoughRows : MostRows))
        {
            if ((lines.Number & 1023) == 0)
                ct.ThrowIfCancellationRequested();
            ReadOnlySpan<char> line = lines.Line;
            if (line.Length > LongestProbedLine || line.IsWhiteSpace() || Fields.IsComment(line))
                continue;
            for (int k = 0; k < Known.Length; k++)
            {
                int weight = Known[k].RowWeight(line, out int fields);
                if (weight == 0)
                    continue;
                score[k] += weight;
                counts[k][fields] = counts[k].GetValueOrDefault(fields) + 1;
                if (first[k] == 0)
                    first[k] = lines.Number;
                if (score[k] > score[best])
                    best = k;
                markSeen |= line.ContainsAny('.', ',');
            }
        }

        for (int k = Known.Length - 1; k >= 0; k--)
            best = score[k] >= score[best] ? k : best;
        dialect = Known[best];
        firstRowLine = first[best];
        columnCount = counts[best].Count == 0 ? 0 : counts[best].MaxBy(c => c.Value).Key;
        return score[best] > 0;
    }

    // 2 for a row of numbers, 1 where a number groups thousands (it will be refused by name), else 0.
    private int RowWeight(ReadOnlySpan<char> line, out int count)
    {
        int numbers = 0;
        int weight = 2;
        var fields = new Fields(line, Delimiter);
        while (fields.MoveNext())
        {
            switch (NumberText.KindOf(fields.Current, DecimalComma))
            {
                case NumberKind.Text:
                    count = 0;
                    return 0;
                case NumberKind.Thousands:
                    weight = 1;
                    numbers++;
                    break;
                case NumberKind.Empty:
                    break;
                default:
                    numbers++;
                    break;
            }
        }

        count = fields.CountWithoutTrailing;
        return numbers >= 2 && !fields.Unclosed ? weight : 0;
    }
}

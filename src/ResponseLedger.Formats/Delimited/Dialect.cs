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

    // What holds no row within these bounds is no table; without them a file of words costs minutes.
    private const int MostProbedLines = 25_000;
    private const int MostProbedCharacters = 4 << 20;

    public string DelimiterName => Delimiter switch
    {
        ',' => "comma",
        ';' => "semicolon",
        '\t' => "tab",
        _ => "blanks",
    };

    /// <summary>Finds the dialect in which most lines are rows of numbers; where no line is, one in which they hold words too.</summary>
    /// <returns>False when no line of those that are looked at holds two numbers or more in any dialect.</returns>
    public static bool TryFind(ReadOnlySpan<char> text, CancellationToken ct, out Dialect dialect, out int firstRowLine, out int columnCount)
        => TryFind(text, wordsToo: false, ct, out dialect, out firstRowLine, out columnCount)
            || TryFind(text, wordsToo: true, ct, out dialect, out firstRowLine, out columnCount);

    private static bool TryFind(ReadOnlySpan<char> text, bool wordsToo, CancellationToken ct, out Dialect dialect, out int firstRowLine, out int columnCount)
    {
        Span<int> score = stackalloc int[Known.Length];
        var rows = new Dictionary<int, (int Count, int FirstLine)>[Known.Length];
        for (int k = 0; k < rows.Length; k++)
            rows[k] = [];
        bool markSeen = false;
        int best = 0;
        int probedLines = 0;
        int probedCharacters = 0;
        var lines = new LineWalk(text);
        while (score[best] < 2 * (markSeen ? EnoughRows : MostRows) && probedLines < MostProbedLines && probedCharacters < MostProbedCharacters && lines.MoveNext())
        {
            if ((lines.Number & 1023) == 0)
                ct.ThrowIfCancellationRequested();
            ReadOnlySpan<char> line = lines.Line;
            if (line.Length > LongestProbedLine || line.IsWhiteSpace() || Fields.IsComment(line))
                continue;
            probedLines++;
            probedCharacters += line.Length;
            for (int k = 0; k < Known.Length; k++)
            {
                int weight = Known[k].RowWeight(line, wordsToo, out int fields);
                if (weight == 0)
                    continue;
                score[k] += weight;
                (int count, int firstLine) = rows[k].GetValueOrDefault(fields, (0, lines.Number));
                rows[k][fields] = (count + 1, firstLine);
                if (score[k] > score[best])
                    best = k;
                markSeen |= line.ContainsAny('.', ',');
            }
        }

        for (int k = Known.Length - 1; k >= 0; k--)
            best = score[k] >= score[best] ? k : best;
        dialect = Known[best];
        (columnCount, (_, firstRowLine)) = rows[best].Count == 0 ? new(0, (0, 0)) : rows[best].MaxBy(r => r.Value.Count);
        return score[best] > 0;
    }

    // 2 for a row of numbers, 1 where a number groups thousands (it will be refused by name), else 0.
    private int RowWeight(ReadOnlySpan<char> line, bool wordsToo, out int count)
    {
        count = 0;
        // A row has two numbers, so that a line without the delimiter is none: most dialects of a line end here.
        if (!line.Contains(Delimiter) && (Delimiter != ' ' || !line.Contains('\t')))
            return 0;
        int numbers = 0;
        int words = 0;
        int weight = 2;
        var fields = new Fields(line, Delimiter);
        while (fields.MoveNext())
        {
            switch (NumberText.KindOf(fields.Current, DecimalComma))
            {
                case NumberKind.Text when wordsToo:
                    words++;
                    break;
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
        return numbers >= 2 && words <= numbers && !fields.Unclosed ? weight : 0;
    }
}

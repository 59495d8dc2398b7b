using System.Security.Cryptography;
using System.Text;
using ResponseLedger.Formats.Text;

namespace ResponseLedger.Formats.Delimited;

/// <summary>Where heads, units and rows stand in a delimited file.</summary>
internal sealed class Layout
{
    // Title blocks are short; only this many lines before the first row are looked at for heads.
    private const int MostTitleLines = 200;

    private const int LongestHeads = 65_536;
    private const int MostHeadsRead = 10_000;

    private int headsRead;

    private Layout(Dialect dialect, int columnCount)
    {
        Dialect = dialect;
        ColumnCount = columnCount;
        Heads = [];
        Units = [];
        Meanings = [.. Enumerable.Repeat(ColumnMeaning.Unknown, columnCount)];
    }

    public Dialect Dialect { get; }

    public int ColumnCount { get; }

    /// <summary>One head a column, or none.</summary>
    public string[] Heads { get; private set; }

    public string[] Units { get; private set; }

    public int? HeadsLine { get; private set; }

    public ColumnMeaning[] Meanings { get; private set; }

    /// <summary>How many heads were named in a row of heads that does not fit the rows of numbers; null when it fits.</summary>
    public int? MismatchedHeadCount { get; private set; }

    /// <summary>The line of heads that stands after the first rows of numbers; null where heads stand before them or nowhere.</summary>
    public int? HeadsAfterNumbersLine { get; private set; }

    /// <summary>The line of the first row.</summary>
    public int DataLine { get; private set; }

    public int DataOffset { get; private set; }

    /// <summary>Title lines skipped before the heads or the first row, comments not counted.</summary>
    public int TitleLines { get; private set; }

    private readonly record struct Title(int Number, int Offset, string Text, bool Comment);

    public static Layout Of(ReadOnlySpan<char> text, Dialect dialect, int firstRowLine, int columnCount)
    {
        var layout = new Layout(dialect, columnCount);
        var titles = new List<Title>();
        var lines = new LineWalk(text);
        while (lines.MoveNext() && lines.Number < firstRowLine)
        {
            if (lines.Line.IsWhiteSpace() || lines.Line.Length > LongestHeads || lines.Number < firstRowLine - MostTitleLines)
                continue;
            bool comment = Fields.IsComment(lines.Line);
            ReadOnlySpan<char> plain = comment ? lines.Line.TrimStart().TrimStart("#!%*/").Trim() : lines.Line;
            titles.Add(new Title(lines.Number, lines.Offset, plain.ToString(), comment));
        }

        layout.DataLine = lines.Number;
        layout.DataOffset = lines.Offset;
        int heads = layout.FindHeads(titles);
        layout.FindData(titles, heads);
        if (heads < 0)
            layout.FindLateHeads(LineWalk.From(text, layout.DataOffset, layout.DataLine));
        return layout;
    }

    private void FindLateHeads(LineWalk lines)
    {
        for (int i = 0; i < MostTitleLines && lines.MoveNext(); i++)
        {
            if (lines.Line.Length > LongestHeads || lines.Line.IsWhiteSpace() || Fields.IsComment(lines.Line) || LooksLikeRow(lines.Line))
                continue;
            if (SplitHeads(lines.Line.ToString()) is { } cells && cells.Length == ColumnCount && !HasNumber(cells) && NamesSweep(cells))
            {
                HeadsAfterNumbersLine = lines.Number;
                return;
            }
        }
    }

    /// <summary>Finds plain heads in a file without one good row, so that the faults of its rows can still be named by line.</summary>
    public static bool TryFindHeads(ReadOnlySpan<char> text, out Dialect dialect, out int firstRowLine, out int columnCount)
    {
        dialect = default;
        firstRowLine = columnCount = 0;
        var lines = new LineWalk(text);
        while (lines.MoveNext() && lines.Number <= MostTitleLines)
        {
            if (lines.Line.IsWhiteSpace() || Fields.IsComment(lines.Line))
                continue;
            if (columnCount > 0)
            {
                firstRowLine = lines.Number;
                return true;
            }

            foreach (char delimiter in "\t;,")
            {
                var fields = new Fields(lines.Line, delimiter);
                int known = 0;
                bool frequency = false;
                while (fields.MoveNext() && fields.Count <= 64)
                {
                    ColumnMeaning meaning = HeadWords.Read(fields.Current.ToString(), "");
                    known += meaning.Alternatives.Count > 0 ? 1 : 0;
                    frequency |= meaning.Alternatives.Any(a => a.Quantity == ColumnQuantity.Frequency);
                }

                if (!frequency || known < 2 || columnCount > 0)
                    continue;
                dialect = new Dialect(delimiter, DecimalComma: false);
                columnCount = fields.CountWithoutTrailing;
            }
        }

        return false;
    }

    /// <summary>SHA-256 of the heads and units in lower case with single blanks; null without heads.</summary>
    public string? HeadsDigest()
    {
        if (Heads.Length == 0)
            return null;
        var text = new StringBuilder();
        foreach (string cell in Heads.Concat(Units))
            text.AppendJoin(' ', cell.ToLowerInvariant().Split((char[]?)null, StringSplitOptions.RemoveEmptyEntries)).Append('\u001F');
        return Convert.ToHexStringLower(SHA256.HashData(Encoding.UTF8.GetBytes(text.ToString())));
    }

    // A row of heads that names a frequency and one thing more, plain before commented; else the last fitting line of words.
    private int FindHeads(List<Title> titles)
    {
        int mismatch = -1;
        int mismatchedCount = 0;
        foreach (bool comment in (ReadOnlySpan<bool>)[false, true])
        {
            for (int i = 0; i < titles.Count; i++)
            {
                if (titles[i].Comment != comment || SplitHeads(titles[i].Text) is not { Length: >= 2 } cells || HasNumber(cells))
                    continue;
                if (!NamesSweep(cells))
                    continue;
                if (cells.Length != ColumnCount)
                {
                    mismatch = comment || mismatch >= 0 ? mismatch : i;
                    mismatchedCount = mismatch == i ? cells.Length : mismatchedCount;
                    continue;
                }

                Take(cells, titles[i].Number);
                return i;
            }
        }

        if (mismatch >= 0)
        {
            MismatchedHeadCount = mismatchedCount;
            HeadsLine = titles[mismatch].Number;
            return mismatch;
        }

        int last = titles.FindLastIndex(t => !t.Comment);
        if (last < 0 || SplitHeads(titles[last].Text) is not { } words || words.Length != ColumnCount || HasNumber(words))
            return -1;
        int above = last - 1;
        if (IsUnits(words) && above >= 0 && !titles[above].Comment && SplitHeads(titles[above].Text) is { } upper
            && upper.Length == ColumnCount && !HasNumber(upper))
        {
            Take(upper, titles[above].Number);
            return above;
        }

        Take(words, titles[last].Number);
        return last;
    }

    // A frequency and one thing more. What is read is bounded: a title block of thousands of words costs seconds.
    private bool NamesSweep(string[] cells)
    {
        bool frequency = false;
        int known = 0;
        foreach (string cell in cells)
        {
            if (headsRead++ >= MostHeadsRead)
                return false;
            ColumnMeaning meaning = HeadWords.Read(cell, "");
            known += meaning.Alternatives.Count > 0 ? 1 : 0;
            frequency |= meaning.Alternatives.Any(a => a.Quantity == ColumnQuantity.Frequency);
        }

        return frequency && known >= 2;
    }

    // After the heads only a row of units is skipped; whatever else stands there is a row, and is judged as one.
    private void FindData(List<Title> titles, int heads)
    {
        int next = heads + 1;
        if (heads >= 0)
        {
            while (next < titles.Count && titles[next].Comment)
                next++;
            if (next < titles.Count && SplitHeads(titles[next].Text) is { } cells && cells.Length == ColumnCount && (IsUnits(cells) || HoldsUnit(cells)))
            {
                Units = cells;
                next++;
            }

            TitleLines = titles.Take(heads).Count(t => !t.Comment);
        }
        else
        {
            next = titles.FindLastIndex(t => !t.Comment && !LooksLikeRow(t.Text)) + 1;
            TitleLines = titles.Take(next).Count(t => !t.Comment);
        }

        if (next < titles.Count)
        {
            DataLine = titles[next].Number;
            DataOffset = titles[next].Offset;
        }

        if (Heads.Length > 0)
            Meanings = [.. Heads.Select((h, i) => HeadWords.Read(h, i < Units.Length ? Units[i] : ""))];
    }

    private void Take(string[] heads, int line)
    {
        Heads = heads;
        HeadsLine = line;
    }

    private static bool LooksLikeRow(ReadOnlySpan<char> text)
    {
        ReadOnlySpan<char> start = text.TrimStart(" \t\"+-.\u2212");
        return start.Length > 0 && char.IsAsciiDigit(start[0]);
    }

    private bool HasNumber(string[] cells)
        => cells.Any(c => NumberText.KindOf(c, Dialect.DecimalComma) is not (NumberKind.Text or NumberKind.Empty) || NumberText.KindOf(c, !Dialect.DecimalComma) == NumberKind.Number);

    private static bool IsUnits(string[] cells)
        => cells.Any(c => c.Length > 0) && cells.All(c => c.Length == 0 || UnitText.Parse(c.Trim('[', ']', '(', ')').Trim()) is not null);

    // One unit that is known among words makes a row of units; those that are not known are asked, not judged as numbers.
    private bool HoldsUnit(string[] cells) => !HasNumber(cells) && cells.Any(c => UnitText.Parse(c.Trim('[', ']', '(', ')').Trim()) is not null);

    private string[]? SplitHeads(string line)
    {
        if (Dialect.Delimiter == ' ')
            return SplitBlankHeads(line);
        var cells = new List<string>();
        var fields = new Fields(line, Dialect.Delimiter);
        while (fields.MoveNext() && cells.Count < 4096)
            cells.Add(fields.Current.ToString());
        if (cells.Count > fields.CountWithoutTrailing && cells.Count != ColumnCount)
            cells.RemoveAt(cells.Count - 1);
        return [.. cells];
    }

    // Heads may hold blanks themselves: two blanks or a tab part them, else single blanks, with units in brackets kept on their word.
    private string[] SplitBlankHeads(string line)
    {
        string[] wide = [.. line.Replace("\t", "  ", StringComparison.Ordinal).Split("  ", StringSplitOptions.RemoveEmptyEntries | StringSplitOptions.TrimEntries)];
        if (wide.Length == ColumnCount)
            return wide;
        var cells = new List<string>();
        var fields = new Fields(line, ' ');
        int depth = 0;
        bool join = false;
        while (fields.MoveNext() && cells.Count < 4096)
        {
            string word = fields.Current.ToString();
            if (cells.Count > 0 && (depth > 0 || join || word[0] is '(' or '[' or '/' || word.Equals("in", StringComparison.OrdinalIgnoreCase)))
                cells[^1] += " " + word;
            else
                cells.Add(word);
            join = word is "/" || word.Equals("in", StringComparison.OrdinalIgnoreCase);
            depth = Math.Max(0, depth + word.Count(c => c is '(' or '[') - word.Count(c => c is ')' or ']'));
        }

        return [.. cells];
    }
}

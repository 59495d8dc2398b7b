using ResponseLedger.Formats.Text;

namespace ResponseLedger.Formats.Delimited;

/// <summary>The numbers of the used columns, row by row, as they stand in the file; faults go to the list of issues.</summary>
internal sealed class RowTable
{
    private const int MostFields = 4096;
    private const double RippleDb = 0.5;

    private readonly Layout layout;
    private readonly IssueList issues;
    private readonly ColumnQuantity[] quantities;
    private readonly bool[] isLevel;
    private readonly int[] slotOfColumn;
    private readonly double[] row;
    private double[][] planes;
    private int[] lines;
    private bool commaSeen;
    private bool commaIsDecimal;
    private int firstCommaLine;
    private double leastAttenuationDb;
    private double mostAttenuationDb;

    public RowTable(IReadOnlyList<ColumnChoice> plan, Layout layout, IssueList issues)
    {
        this.layout = layout;
        this.issues = issues;
        quantities = [.. plan.Select(c => c.Quantity)];
        isLevel = [.. plan.Select(c => AmplitudeUnit.TryParse(c.Unit, out AmplitudeUnit? unit) && unit!.IsLevel)];
        slotOfColumn = new int[layout.ColumnCount];
        Array.Fill(slotOfColumn, -1);
        for (int i = 0; i < plan.Count; i++)
            slotOfColumn[plan[i].Column - 1] = i;
        row = new double[plan.Count];
        planes = [.. plan.Select(_ => new double[1024])];
        lines = new int[1024];
    }

    /// <summary>Rows without a fault.</summary>
    public int Count { get; private set; }

    /// <summary>All rows, faulty ones included.</summary>
    public int RowCount { get; private set; }

    /// <summary>
    /// Whether the signs of a column of attenuation leave open what it holds: a passive device shows no more than a little ripple
    /// under zero, so negative values that go further, or that outweigh the positive ones, may as well be a gain.
    /// </summary>
    public bool AttenuationIsOpen => leastAttenuationDb < -RippleDb || -leastAttenuationDb > mostAttenuationDb;

    /// <summary>Whether an open column of attenuation has values of both signs.</summary>
    public bool AttenuationIsMixed => leastAttenuationDb < 0 && mostAttenuationDb > 0;

    public Span<double> Plane(int slot) => planes[slot].AsSpan(0, Count);

    public ReadOnlySpan<int> Lines => lines.AsSpan(0, Count);

    public void Read(ReadOnlySpan<char> text, CancellationToken ct)
    {
        LineWalk walk = LineWalk.From(text, layout.DataOffset, layout.DataLine);
        while (walk.MoveNext())
        {
            if ((walk.Number & 4095) == 0)
                ct.ThrowIfCancellationRequested();
            ReadOnlySpan<char> line = walk.Line;
            if (line.IsEmpty || line.IsWhiteSpace() || Fields.IsComment(line))
                continue;
            if (++RowCount > SweepFileReader.MostPoints)
            {
                issues.Add(walk.Number, null, ReadCodes.TooManyPoints,
                    $"The file has more than {SweepFileReader.MostPoints} rows; export fewer points.");
                break;
            }

            if (ReadRow(line, walk.Number))
                Keep(walk.Number);
        }

        if (commaSeen && !commaIsDecimal)
        {
            issues.Add(firstCommaLine, null, ReadCodes.DecimalOpen,
                "Every comma stands before exactly three digits, so it may be a decimal mark or group thousands; export with a decimal point and without grouping, or with another count of decimals.");
        }
    }

    private bool ReadRow(ReadOnlySpan<char> line, int number)
    {
        bool good = true;
        var fields = new Fields(line, layout.Dialect.Delimiter);
        while (fields.MoveNext())
        {
            if (fields.Count > MostFields)
            {
                issues.Add(number, MostFields, ReadCodes.TooManyColumns, $"The line has more than {MostFields} fields; the file is no table of a sweep.");
                return false;
            }

            int slot = fields.Count <= slotOfColumn.Length ? slotOfColumn[fields.Count - 1] : -1;
            if (slot < 0)
                continue;
            NumberKind kind = NumberText.Read(fields.Current, layout.Dialect.DecimalComma, out double value);
            if (layout.Dialect.DecimalComma && !commaIsDecimal)
                WatchComma(fields.Current, number);
            // An empty field at the end is a delimiter too many or a row cut short; the count below tells which.
            if (kind == NumberKind.Empty && fields.IsLast && !fields.Quoted)
                continue;
            good &= Judge(kind, slot, value, fields.Current, number, fields.Count);
            row[slot] = value;
        }

        if (fields.Unclosed)
        {
            issues.Add(number, fields.Count, ReadCodes.UnclosedQuote, "A quotation mark does not close on this line; close it or take it out.");
            return false;
        }

        int count = fields.CountWithoutTrailing;
        if (count < layout.ColumnCount)
        {
            issues.Add(number, count + 1, ReadCodes.ShortRow, $"The row is cut short: {count} of {layout.ColumnCount} fields; add the missing ones or take the row out.");
            return false;
        }

        if (count > layout.ColumnCount)
        {
            issues.Add(number, layout.ColumnCount + 1, ReadCodes.ExtraFields, $"The row has {count} fields where {layout.ColumnCount} are due; take the extra ones out.");
            return false;
        }

        return good;
    }

    private bool Judge(NumberKind kind, int slot, double value, ReadOnlySpan<char> field, int line, int column)
    {
        (string code, string sentence) = kind switch
        {
            NumberKind.Number => Domain(slot, value),
            NumberKind.Empty => (ReadCodes.EmptyField, "The field is empty; fill it or take the row out."),
            NumberKind.NotANumber => (ReadCodes.NotANumber, "is not a number; measure the point again or take the row out."),
            NumberKind.Infinite => (ReadCodes.Infinite, "is infinite or beyond the range of numbers; take the row out, or give an exact zero gain as a magnitude of 0."),
            NumberKind.Overload => (ReadCodes.Overload, "is an instrument's sign for overload or no reading; measure the point again or take the row out."),
            NumberKind.Thousands => (ReadCodes.ThousandsSeparator, "groups thousands; export without grouping marks."),
            _ => (ReadCodes.BadNumber, layout.Dialect.DecimalComma
                ? "is not a number (decimal comma); correct it, and keep units and words to the heads."
                : "is not a number (decimal point); correct it, and keep units and words to the heads."),
        };
        if (code.Length == 0)
            return true;
        if (!issues.HasRoom)
            issues.CountUnlisted();
        else
            issues.Add(line, column, code, kind == NumberKind.Empty ? sentence : $"\"{Shown(field)}\" {sentence}");
        return false;
    }

    private (string, string) Domain(int slot, double value)
    {
        switch (quantities[slot])
        {
            case ColumnQuantity.Frequency when value == 0:
                return (ReadCodes.ZeroFrequency, "is a frequency of zero, which has no place on a logarithmic axis; take the row out.");
            case ColumnQuantity.Frequency when value < 0:
                return (ReadCodes.NegativeFrequency, "is a negative frequency; take the row out.");
            case ColumnQuantity.InverseMagnitude when value == 0:
                return (ReadCodes.ZeroInput, "is an input over an output of zero, by which nothing can be divided; take the row out.");
            case ColumnQuantity.Magnitude or ColumnQuantity.InverseMagnitude when value < 0:
                return (ReadCodes.NegativeMagnitude, "is a negative magnitude; if the column is in dB, say so in its head or choose gain in dB.");
            case ColumnQuantity.InputAmplitude when !isLevel[slot] && value == 0:
                return (ReadCodes.ZeroInput, "is an input amplitude of zero, by which nothing can be divided; take the row out.");
            case ColumnQuantity.InputAmplitude or ColumnQuantity.OutputAmplitude when !isLevel[slot] && value < 0:
                return (ReadCodes.NegativeMagnitude, "is a negative amplitude; if the column is in dBV, say so in its head or choose that unit.");
            case ColumnQuantity.AttenuationDb:
                leastAttenuationDb = Math.Min(leastAttenuationDb, value);
                mostAttenuationDb = Math.Max(mostAttenuationDb, value);
                break;
        }

        return ("", "");
    }

    // A comma is surely decimal where its digits could not be a group of three.
    private void WatchComma(ReadOnlySpan<char> field, int line)
    {
        int comma = field.IndexOf(',');
        if (comma < 0)
            return;
        if (!commaSeen)
        {
            commaSeen = true;
            firstCommaLine = line;
        }

        ReadOnlySpan<char> whole = field[..comma].TrimStart("+-\u2212");
        ReadOnlySpan<char> fraction = field[(comma + 1)..];
        commaIsDecimal = fraction.Length != 3 || fraction.ContainsAnyExceptInRange('0', '9') || whole.Length is 0 or > 3 || whole[0] == '0';
    }

    private void Keep(int line)
    {
        if (Count == lines.Length)
        {
            int larger = 2 * Count;
            Array.Resize(ref lines, larger);
            for (int i = 0; i < planes.Length; i++)
                Array.Resize(ref planes[i], larger);
        }

        for (int i = 0; i < row.Length; i++)
            planes[i][Count] = row[i];
        lines[Count++] = line;
    }

    /// <summary>A field as a sentence may show it: short, without control characters.</summary>
    public static string Shown(ReadOnlySpan<char> field)
    {
        ReadOnlySpan<char> head = field.Length <= 40 ? field : field[..40];
        Span<char> clean = stackalloc char[head.Length];
        for (int i = 0; i < head.Length; i++)
            clean[i] = char.IsControl(head[i]) || char.IsSurrogate(head[i]) ? '?' : head[i];
        return clean.ToString() + (field.Length > 40 ? "..." : "");
    }
}

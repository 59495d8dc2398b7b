using ResponseLedger.Engine.Sweeps;
using ResponseLedger.Formats.Delimited;
using ResponseLedger.Formats.Text;

namespace ResponseLedger.Formats.Touchstone;

/// <summary>
/// Gathers records of frequency and pairs. One and two ports stand on one line; with three and more a record may wrap, and a
/// line with an odd count of numbers begins one (pairs are even, the frequency makes it odd).
/// </summary>
internal sealed class NetworkRecords
{
    private const int NoiseNumbers = 5;

    private readonly NetworkShape shape;
    private readonly OptionLine option;
    private readonly int firstAt;
    private readonly bool mayHoldNoise;
    private readonly IssueList issues;
    private readonly List<ReadNote> notes;
    private readonly List<double> frequencyHz = [];
    private readonly List<double> first = [];
    private readonly List<double> second = [];
    private readonly List<double> numbers = [];
    private readonly List<int> columns = [];
    private int taken;
    private double recordHz;
    private double recordFirst;
    private double recordSecond;
    private int recordLine;
    private int lastLine;
    private bool recordBad;
    private bool skipping;
    private bool noise;
    private bool overlong;
    private double lastHz = double.NegativeInfinity;

    public NetworkRecords(NetworkShape shape, OptionLine option, string parameter, int pair, bool mayHoldNoise, IssueList issues, List<ReadNote> notes)
    {
        this.shape = shape;
        this.option = option;
        this.mayHoldNoise = mayHoldNoise && shape.Ports == 2;
        this.issues = issues;
        this.notes = notes;
        Parameter = parameter;
        firstAt = 1 + 2 * pair;
    }

    public string Parameter { get; }

    public int Count => frequencyHz.Count;

    /// <summary>All records, faulty ones included.</summary>
    public int RecordCount { get; private set; }

    public bool Overfull { get; private set; }

    public double[] FrequencyHz => [.. frequencyHz];

    public double[] First => [.. first];

    public double[] Second => [.. second];

    public void ReadLine(ReadOnlySpan<char> line, int number)
    {
        bool good = Numbers(line, number);
        int count = numbers.Count;
        if (overlong)
        {
            RefuseLine(number);
            return;
        }

        if (noise || IsNoise(count))
        {
            ReadNoise(count, number);
            return;
        }

        bool oneLine = shape.Ports <= 2;
        if (oneLine || count % 2 == 1)
            BeginRecord(number);
        else if (taken == 0 && !skipping)
        {
            issues.Add(number, null, ReadCodes.ShortRow, $"The line holds {count} numbers and begins no record: a frequency or one half of a pair is missing. Complete it.");
            skipping = true;
        }

        if (skipping)
            return;
        lastLine = number;
        recordBad |= !good;
        for (int i = 0; i < count; i++)
            Put(taken + i, numbers[i], number, columns[i]);
        taken += count;
        if (taken < shape.NumberCount && !oneLine)
            return;
        if (taken != shape.NumberCount)
        {
            bool few = taken < shape.NumberCount;
            issues.Add(number, null, few ? ReadCodes.ShortRow : ReadCodes.ExtraFields,
                $"The record has {taken} numbers where {shape.NumberCount} are due (a frequency and {shape.PairCount} pairs); {(few ? "add the missing ones" : "take the extra ones out")}.");
            recordBad = true;
            skipping = !oneLine;
        }

        EndRecord();
    }

    public void Finish()
    {
        if (taken > 0)
            CutShort();
    }

    // Such a line belongs to no record; the next line with a frequency begins one again.
    private void RefuseLine(int number)
    {
        issues.Add(number, null, ReadCodes.ExtraFields, $"The line holds more than {MostNumbers} numbers, but a record has {shape.NumberCount}; begin every record on a line of its own.");
        taken = 0;
        skipping = true;
        RecordCount++;
    }

    private void BeginRecord(int number)
    {
        if (taken > 0)
            CutShort();
        taken = 0;
        recordBad = false;
        skipping = false;
        recordLine = number;
    }

    private void CutShort()
    {
        issues.Add(lastLine, null, ReadCodes.ShortRow, $"The record ends after {taken} of {shape.NumberCount} numbers; add the missing ones.");
        taken = 0;
        RecordCount++;
    }

    private void EndRecord()
    {
        taken = 0;
        if (++RecordCount > SweepFileReader.MostPoints)
        {
            issues.Add(recordLine, null, ReadCodes.TooManyPoints, $"The file has more than {SweepFileReader.MostPoints} points; export fewer.");
            Overfull = true;
            return;
        }

        if (double.IsNaN(recordHz))
            return;
        if (recordHz < lastHz)
            issues.Add(recordLine, null, ReadCodes.FrequencyFalls, "The frequency falls; in a Touchstone file it must rise from record to record. Sort the records.");
        else if (recordHz == lastHz)
            issues.Add(recordLine, null, ReadCodes.DuplicateFrequency, "The frequency is that of the record before; keep one of the two.");
        else
            lastHz = recordHz;
        if (recordBad)
            return;
        frequencyHz.Add(recordHz);
        first.Add(recordFirst);
        second.Add(recordSecond);
    }

    private void Put(int at, double value, int line, int column)
    {
        if (at == 0)
        {
            recordHz = value * option.HzPerUnit;
            // NaN marks a token that has its own issue already; the comparisons below are false for it.
            if (value == 0)
                issues.Add(line, column, ReadCodes.ZeroFrequency, "The frequency is zero, which has no place on a logarithmic axis; take the record out.");
            else if (value < 0)
                issues.Add(line, column, ReadCodes.NegativeFrequency, "The frequency is negative; take the record out.");
            else if (double.IsInfinity(recordHz))
                issues.Add(line, column, ReadCodes.Infinite, "In Hz the frequency leaves the range of numbers; check the unit of the option line.");
        }
        else if (at == firstAt)
        {
            recordFirst = value;
            if (option.Form == SweepForm.RatioPhase && value < 0)
                issues.Add(line, column, ReadCodes.NegativeMagnitude, "The magnitude is negative; if the pairs are in dB, say DB on the option line.");
        }
        else if (at == firstAt + 1)
        {
            recordSecond = value;
        }
    }

    // Version 1 has no keyword for noise: the block of two ports begins where the frequency falls back (Touchstone 1.1, noise parameters).
    private bool IsNoise(int count)
        => mayHoldNoise && count == NoiseNumbers && numbers[0] * option.HzPerUnit <= lastHz;

    private void ReadNoise(int count, int number)
    {
        if (!noise)
            notes.Add(new ReadNote("noise", $"The noise block from line {number} on was left aside."));
        noise = true;
        if (count != NoiseNumbers)
            issues.Add(number, null, count < NoiseNumbers ? ReadCodes.ShortRow : ReadCodes.ExtraFields, $"A line of the noise block has {count} numbers where {NoiseNumbers} are due; correct it.");
    }

    // A few more than are due, so that a stray number is still told with its count; never as many as a hostile line holds.
    private int MostNumbers => shape.NumberCount + 16;

    private bool Numbers(ReadOnlySpan<char> line, int number)
    {
        numbers.Clear();
        columns.Clear();
        overlong = false;
        bool good = true;
        int at = 0;
        while (true)
        {
            int start = line[at..].IndexOfAnyExcept(" \t\f\v");
            if (start < 0)
                return good;
            if (numbers.Count == MostNumbers)
            {
                overlong = true;
                return false;
            }

            at += start;
            int length = line[at..].IndexOfAny(" \t\f\v");
            ReadOnlySpan<char> token = length < 0 ? line[at..] : line.Slice(at, length);
            NumberKind kind = NumberText.Read(token, decimalComma: false, out double value);
            if (kind != NumberKind.Number)
            {
                good = false;
                Complain(kind, token, number, at + 1);
                value = double.NaN;
            }

            numbers.Add(value);
            columns.Add(at + 1);
            at += token.Length;
        }
    }

    private void Complain(NumberKind kind, ReadOnlySpan<char> token, int line, int column)
    {
        if (!issues.HasRoom)
        {
            issues.CountUnlisted();
            return;
        }

        (string code, string sentence) = kind switch
        {
            NumberKind.NotANumber => (ReadCodes.NotANumber, "is not a number; measure the point again or take the record out."),
            NumberKind.Infinite => (ReadCodes.Infinite, "is infinite or beyond the range of numbers; take the record out."),
            NumberKind.Overload => (ReadCodes.Overload, "is an instrument's sign for overload or no reading; measure the point again or take the record out."),
            NumberKind.Thousands => (ReadCodes.ThousandsSeparator, "groups thousands; export without grouping marks."),
            _ => (ReadCodes.BadNumber, "is not a number (decimal point); correct it, and put words after a !."),
        };
        issues.Add(line, column, code, $"\"{RowTable.Shown(token)}\" {sentence}");
    }
}

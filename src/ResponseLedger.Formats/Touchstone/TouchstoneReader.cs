using ResponseLedger.Engine.Sweeps;
using ResponseLedger.Formats.Text;

namespace ResponseLedger.Formats.Touchstone;

/// <summary>
/// Reads Touchstone 1.1 and 2.0 (IBIS Open Forum): one S-parameter of N ports in the file's own pair. Y, Z, H and G
/// parameters and mixed-mode files are refused by name: their entries are no gains between two ports.
/// </summary>
internal sealed class TouchstoneReader
{
    public const string Name = "touchstone";

    private readonly List<ReadNote> notes = [];
    private readonly IssueList issues = new();
    private readonly TouchstoneKeywords keywords;
    private OptionLine? option;
    private int? ports;
    private NetworkRecords? records;
    private bool stopped;

    private TouchstoneReader(int? ports)
    {
        this.ports = ports;
        keywords = new TouchstoneKeywords(issues);
    }

    public static FileReading Read(DecodedText text, int? ports, string? parameter, CancellationToken ct)
        => new TouchstoneReader(ports).Run(text, parameter, ct);

    private FileReading Run(DecodedText decoded, string? parameter, CancellationToken ct)
    {
        if (decoded.Note is { } encoding)
            notes.Add(encoding);
        ReadOnlySpan<char> text = decoded.Characters;
        var lines = new LineWalk(text);
        while (!stopped && lines.MoveNext())
        {
            if ((lines.Number & 4095) == 0)
                ct.ThrowIfCancellationRequested();
            int comment = lines.Line.IndexOf('!');
            ReadOnlySpan<char> line = comment < 0 ? lines.Line : lines.Line[..comment];
            if (!line.IsWhiteSpace())
                ReadLine(text, line, lines.Number, parameter);
        }

        if (issues.IsEmpty && records is null)
        {
            issues.Add(null, null, option is null ? ReadCodes.BadOptionLine : ReadCodes.NoData,
                option is null ? "The file has no option line; begin it with one such as # Hz S RI R 50." : "The file has an option line but no data; export the sweep again.");
        }

        records?.Finish();
        if (records is not null && keywords.FrequencyCount is { } stated && stated != records.RecordCount && issues.IsEmpty)
        {
            issues.Add(keywords.FrequencyCountLine, null, ReadCodes.BadKeyword,
                $"[Number of Frequencies] says {stated}, but the file holds {records.RecordCount}; correct the number or add what is missing.");
        }

        if (issues.IsEmpty && records!.Count < 2)
            issues.Add(null, null, ReadCodes.TooFewPoints, $"The file has {records.Count} point; a sweep needs two or more.");
        Sweep? sweep = issues.IsEmpty ? Make(records!) : null;
        if (sweep is null)
            return new FileReading(null, Name, SweepFileReader.Version, [], null, null, [], notes, issues.Listed(), issues.Count);
        return new FileReading(sweep, Name, SweepFileReader.Version, [], null, new ColumnChoices([], records!.Parameter), [], notes, [], 0);
    }

    private void ReadLine(ReadOnlySpan<char> text, ReadOnlySpan<char> line, int number, string? parameter)
    {
        ReadOnlySpan<char> trimmed = line.Trim();
        if (keywords.InInformation && trimmed[0] != '[')
            return;
        if (trimmed[0] == '[')
        {
            if (option is null && keywords.IsVersion2 && TouchstoneKeywords.NeedsOption(trimmed))
                Stop(number, ReadCodes.BadOptionLine, "Data begin before an option line; put one such as # Hz S RI R 50 after [Version].");
            else
                keywords.Read(trimmed, number);
            stopped |= keywords.Ended || keywords.Refused;
        }
        else if (trimmed[0] == '#')
        {
            // Only the first option line counts (Touchstone 1.1 and 2.0, rules for option lines).
            if (option is null)
                ReadOption(trimmed, number);
        }
        else if (option is null)
        {
            Stop(number, ReadCodes.BadOptionLine, "Data begin before the option line; begin the file with one such as # Hz S RI R 50.");
        }
        else if (keywords.TakesReference)
        {
            keywords.ReadReference(trimmed, number);
        }
        else if (!keywords.IsVersion2 || keywords.InNetworkData)
        {
            if (records is null)
                Begin(text, number, parameter);
            records?.ReadLine(line, number);
            stopped |= records?.Overfull ?? false;
        }
        else if (!keywords.InNoiseData)
        {
            Stop(number, ReadCodes.BadKeyword, "Numbers stand before [Network Data]; put that keyword before the data.");
        }
    }

    private void ReadOption(ReadOnlySpan<char> line, int number)
    {
        option = OptionLine.Parse(line[1..], out string? problem);
        if (option is null)
        {
            Stop(number, ReadCodes.BadOptionLine, problem!);
        }
        else if (option.Parameter != 'S')
        {
            Stop(number, ReadCodes.NotScattering, $"The file holds {option.Parameter}-parameters; export S-parameters, of which one is the gain between two ports.");
        }
        else
        {
            string form = option.Form switch { SweepForm.RealImaginary => "real and imaginary part", SweepForm.LevelPhase => "level in dB and angle in degrees", _ => "magnitude and angle in degrees" };
            notes.Add(new ReadNote("options", FormattableString.Invariant($"Frequency in {option.Unit}, S-parameters as {form}, reference {option.ReferenceOhm} ohm.")));
        }
    }

    private void Begin(ReadOnlySpan<char> text, int line, string? parameter)
    {
        int? count = keywords.Ports ?? ports ?? InferPorts(text, line);
        if (keywords.Ports is { } stated && ports is { } named && stated != named)
            notes.Add(new ReadNote("ports", $"The name says {named} ports, the file {stated}; the file was believed."));
        if (count is null or < 1 or > NetworkShape.MostPorts)
        {
            Stop(line, ReadCodes.PortsUnknown, $"The number of ports cannot be told or is not 1 to {NetworkShape.MostPorts}; name the file .s1p, .s2p and so on.");
            return;
        }

        ports = count;
        if (keywords.IsVersion2 && count == 2 && keywords.ColumnsFirst is null)
        {
            Stop(line, ReadCodes.BadKeyword, "[Two-Port Data Order] is missing; state 12_21 or 21_12.");
            return;
        }

        var shape = new NetworkShape(count.Value, keywords.Format, keywords.IsVersion2 ? keywords.ColumnsFirst == true && count == 2 : count == 2);
        string wanted = parameter ?? (count == 1 ? "S11" : "S21");
        if (!shape.TryParameter(wanted, out int row, out int column))
        {
            Stop(null, ReadCodes.BadChoice, $"\"{(wanted.Length <= 16 ? wanted : wanted[..16])}\" is no parameter of {count} port{(count == 1 ? "" : "s")}; choose for example {(count == 1 ? "S11" : "S21")}{(count > 9 ? " or S10,1" : "")}.");
            return;
        }

        string name = NetworkShape.NameOf(row, column);
        notes.Add(new ReadNote("parameter", $"{count} port{(count == 1 ? "" : "s")}; {name} is the run{(parameter is null && count > 1 ? " (choose another where it is meant)" : "")}."));
        records = new NetworkRecords(shape, option!, name, shape.PairOf(row, column), mayHoldNoise: !keywords.IsVersion2, issues, notes);
    }

    // Without an extension the first record tells: a line with an odd count of numbers begins one.
    private static int? InferPorts(ReadOnlySpan<char> text, int fromLine)
    {
        int total = 0;
        var lines = new LineWalk(text);
        while (lines.MoveNext())
        {
            int comment = lines.Line.IndexOf('!');
            ReadOnlySpan<char> line = comment < 0 ? lines.Line : lines.Line[..comment];
            if (lines.Number < fromLine || line.IsWhiteSpace())
                continue;
            int words = 0;
            foreach (Range part in line.SplitAny(' ', '\t'))
                words += line[part].IsWhiteSpace() ? 0 : 1;
            if (total > 0 && words % 2 == 1)
                break;
            total += words;
        }

        int count = (int)Math.Round(Math.Sqrt(Math.Max(0, (total - 1) / 2)));
        return 1 + 2L * count * count == total ? count : null;
    }

    private Sweep? Make(NetworkRecords read)
    {
        try
        {
            return Sweep.Create(option!.Form, read.FrequencyHz, read.First, read.Second);
        }
        catch (ArgumentException refusal)
        {
            issues.Add(null, null, ReadCodes.RefusedSweep, $"The data make no sweep: {refusal.Message}");
            return null;
        }
    }

    private void Stop(int? line, string code, string message)
    {
        issues.Add(line, null, code, message);
        stopped = true;
    }
}

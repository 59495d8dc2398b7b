using ResponseLedger.Formats.Text;

namespace ResponseLedger.Formats.Delimited;

/// <summary>Reads delimited text: finds the dialect and the heads, settles the columns, reads the rows, makes the sweep.</summary>
internal sealed class DelimitedReader
{
    public const string Name = "delimited";

    private const int MostHeadsShown = 20;

    private readonly List<ReadNote> notes = [];
    private readonly IssueList issues = new();
    private readonly List<FoundColumn> columns = [];
    private string? headsDigest;

    public static FileReading Read(DecodedText text, ColumnChoices? chosen, CancellationToken ct)
        => new DelimitedReader().Run(text, chosen, ct);

    private FileReading Run(DecodedText decoded, ColumnChoices? chosen, CancellationToken ct)
    {
        if (decoded.Note is { } encoding)
            notes.Add(encoding);
        ReadOnlySpan<char> text = decoded.Characters;
        if (!Dialect.TryFind(text, ct, out Dialect dialect, out int firstRowLine, out int columnCount)
            && !Layout.TryFindHeads(text, out dialect, out firstRowLine, out columnCount))
        {
            issues.Add(null, null, ReadCodes.NoData,
                "No line holds two numbers or more; export the sweep as text with one row a frequency.");
            return Refused([]);
        }

        Layout layout = Layout.Of(text, dialect, firstRowLine, columnCount);
        NoteLayout(layout);
        headsDigest = layout.HeadsDigest();
        if (layout.MismatchedHeadCount is { } headCount)
        {
            string hint = dialect.Delimiter == ',' && columnCount > headCount
                ? "; if the comma is the decimal mark too, export with semicolons or with decimal points"
                : "; give every column one head";
            issues.Add(layout.HeadsLine, null, columnCount > headCount ? ReadCodes.ExtraFields : ReadCodes.ShortRow,
                $"There are {headCount} heads, but the rows have {columnCount} fields{hint}.");
            return Refused([]);
        }

        if (layout.HeadsAfterNumbersLine is { } late)
        {
            issues.Add(late, null, ReadCodes.NumbersBeforeHeads,
                $"Line {layout.DataLine} holds numbers and stands before the heads in line {late}; take such lines out or begin them with #, so that the heads come first.");
            return Refused([]);
        }

        IReadOnlyList<ColumnChoice>? plan = Plan(text, layout, chosen, out IReadOnlyList<ColumnChoices> candidates);
        FindColumns(layout, plan);
        if (plan is null)
            return Refused(candidates);

        var table = new RowTable(plan, layout, issues);
        table.Read(text, ct);
        bool signIsChecked = plan.Any(c => c.Quantity == ColumnQuantity.AttenuationDb && layout.Meanings[c.Column - 1].SignIsChecked && !IsChosen(chosen, c.Column));
        if (signIsChecked && table.AttenuationIsOpen)
        {
            AskAttenuation(layout, plan, table.AttenuationIsMixed, out candidates);
            return Refused(candidates);
        }

        var assembly = new SweepAssembly(plan, table, notes, issues);
        return assembly.Make(ct) is { } sweep
            ? new FileReading(sweep, Name, SweepFileReader.Version, columns, headsDigest, new ColumnChoices(plan, null), [], notes, [], 0)
            : Refused([]);
    }

    private FileReading Refused(IReadOnlyList<ColumnChoices> candidates)
        => new(null, Name, SweepFileReader.Version, columns, headsDigest, null, candidates, notes, issues.Listed(), issues.Count);

    private void NoteLayout(Layout layout)
    {
        notes.Add(new ReadNote("delimiter", $"Fields are parted by {layout.Dialect.DelimiterName}."));
        notes.Add(new ReadNote("decimal", layout.Dialect.DecimalComma ? "The decimal mark is a comma." : "The decimal mark is a point."));
        if (layout.TitleLines > 0)
            notes.Add(new ReadNote("titleLines", $"{layout.TitleLines} title line{(layout.TitleLines == 1 ? " was" : "s were")} skipped."));
        if (layout.Heads.Length > 0)
            notes.Add(new ReadNote("heads", $"Line {layout.HeadsLine} holds the heads{(layout.Units.Length > 0 ? ", the line after it the units" : "")}."));
    }

    private IReadOnlyList<ColumnChoice>? Plan(ReadOnlySpan<char> text, Layout layout, ColumnChoices? chosen, out IReadOnlyList<ColumnChoices> candidates)
    {
        candidates = [];
        if (chosen is { Columns.Count: > 0 })
            return Chosen(layout, chosen);
        (IReadOnlyList<ColumnChoice>? settled, candidates) = ColumnPlan.Make(layout.Meanings);
        if (settled is not null)
            return settled;
        if (candidates.Count == 0)
            candidates = ColumnTraits.Candidates(ColumnTraits.Of(text, layout), layout.Meanings);
        candidates = ColumnPlan.Offered(candidates, layout.Meanings);
        string what = layout.Heads.Length == 0
            ? "The file has no heads, so nothing says what its columns hold"
            : $"The heads do not settle what the columns hold ({string.Join(", ", layout.Heads.Take(MostHeadsShown).Select(Shortened))}{(layout.Heads.Length > MostHeadsShown ? ", ..." : "")}){Doubts(layout)}";
        issues.Add(layout.HeadsLine, null, ReadCodes.ColumnsOpen,
            $"{what}. Choose quantity and unit of the columns{(candidates.Count > 0 ? ", for example one of the candidates" : "")}, or name them in a row of heads such as Frequency (Hz), Gain (dB), Phase (deg).");
        return null;
    }

    private static string Doubts(Layout layout)
    {
        string[] doubts = [.. layout.Meanings.Select((m, i) => m.Doubt is null ? null : $". Column {i + 1}: {m.Doubt}").OfType<string>().Take(MostHeadsShown)];
        return string.Concat(doubts);
    }

    // What is chosen rules; heads only fill in where the choice alone makes no sweep.
    private IReadOnlyList<ColumnChoice>? Chosen(Layout layout, ColumnChoices chosen)
    {
        foreach (ColumnChoice choice in chosen.Columns)
        {
            if (choice.Column < 1 || choice.Column > layout.ColumnCount)
            {
                issues.Add(null, null, ReadCodes.BadChoice, $"Column {choice.Column} is chosen, but the rows have {layout.ColumnCount} columns; choose among these.");
                return null;
            }
        }

        if (chosen.Columns.GroupBy(c => c.Column).FirstOrDefault(g => g.Count() > 1) is { } twice)
        {
            issues.Add(null, null, ReadCodes.BadChoice, $"Column {twice.Key} is chosen twice; name it once.");
            return null;
        }

        List<ColumnChoice> used = [.. chosen.Columns.Where(c => c.Quantity != ColumnQuantity.Ignore)];
        string? problem = ColumnPlan.Problem(used);
        if (problem is null)
            return [.. used.Select(c => ColumnPlan.Normalise(c)!)];
        ColumnMeaning[] meanings = [.. layout.Meanings];
        foreach (ColumnChoice choice in chosen.Columns)
        {
            meanings[choice.Column - 1] = choice.Quantity == ColumnQuantity.Ignore ? ColumnMeaning.Unknown
                : ColumnPlan.Normalise(choice) is { } fitting ? ColumnMeaning.Settled(fitting.Quantity, fitting.Unit)
                : ColumnMeaning.Unknown;
        }

        (IReadOnlyList<ColumnChoice>? filled, _) = ColumnPlan.Make(meanings);
        if (filled is not null && used.TrueForAll(u => filled.Any(f => f.Column == u.Column)))
            return filled;
        issues.Add(null, null, ReadCodes.BadChoice, problem);
        return null;
    }

    private void FindColumns(Layout layout, IReadOnlyList<ColumnChoice>? plan)
    {
        for (int i = 0; i < layout.ColumnCount; i++)
        {
            string head = i < layout.Heads.Length ? layout.Heads[i] : "";
            ColumnChoice? use = plan?.FirstOrDefault(c => c.Column == i + 1);
            if (use is null && plan is null && layout.Meanings[i].IsSettled)
                use = new ColumnChoice(i + 1, layout.Meanings[i].Alternatives[0].Quantity, layout.Meanings[i].Alternatives[0].Unit);
            columns.Add(new FoundColumn(i + 1, head, use?.Quantity ?? ColumnQuantity.Ignore, use?.Unit ?? ""));
        }

        if (plan is null)
            return;
        notes.Add(new ReadNote("columns", "Read: " + string.Join("; ", plan.Select(c => $"column {c.Column} as {UnitsTaken.Words(c.Quantity)} in {c.Unit}")) + "."));
        foreach (ColumnChoice use in plan)
            NoteBareUnit(layout, use);
        int[] aside = [.. columns.Where(c => c.Quantity == ColumnQuantity.Ignore).Select(c => c.Column)];
        if (aside.Length > 0)
            notes.Add(new ReadNote("columnsLeftAside", $"Left aside: column{(aside.Length == 1 ? "" : "s")} {string.Join(", ", aside.Take(20))}{(aside.Length > 20 ? ", ..." : "")}."));
    }

    // What the house settles for heads that name no unit is said, so that nobody has to know the rule.
    private void NoteBareUnit(Layout layout, ColumnChoice use)
    {
        int i = use.Column - 1;
        if (layout.Meanings[i] is { IsBare: true, IsSettled: true } && layout.Meanings[i].Alternatives[0] == (use.Quantity, use.Unit))
            notes.Add(new ReadNote("unitSettled", $"The head of column {use.Column} names no unit; it was taken in {use.Unit}."));
    }

    private static bool IsChosen(ColumnChoices? chosen, int column) => chosen is not null && chosen.Columns.Any(c => c.Column == column);

    private void AskAttenuation(Layout layout, IReadOnlyList<ColumnChoice> plan, bool mixed, out IReadOnlyList<ColumnChoices> candidates)
    {
        IReadOnlyList<ColumnChoice> asGain = [.. plan.Select(c => c.Quantity == ColumnQuantity.AttenuationDb ? c with { Quantity = ColumnQuantity.GainDb } : c)];
        candidates = [new ColumnChoices(asGain, null), new ColumnChoices(plan, null)];
        issues.Add(layout.HeadsLine, null, ReadCodes.ColumnsOpen,
            $"The head says attenuation, but its values are {(mixed ? "of both signs" : "negative")}: say whether they are the gain in dB (a loss is negative) or an attenuation (a loss is positive).");
    }

    private static string Shortened(string head) => head.Length <= 40 ? head : head[..40] + "...";
}

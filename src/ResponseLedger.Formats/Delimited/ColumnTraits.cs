using ResponseLedger.Formats.Text;

namespace ResponseLedger.Formats.Delimited;

/// <summary>What the numbers of a column rule out, where its head does not say what it is.</summary>
internal sealed class ColumnTraits
{
    // Choosing candidates needs a fair look, not the whole of a long file.
    private const int MostRows = 10_000;

    private double last = double.NaN;
    private bool rises = true;
    private bool falls = true;

    public int Numbers { get; private set; }

    public bool HasNegative { get; private set; }

    public bool HasZero { get; private set; }

    public bool MayBeFrequency => Numbers >= 2 && !HasNegative && !HasZero && (rises || falls);

    public bool MayBeMagnitude => Numbers > 0 && !HasNegative;

    private void Add(double value)
    {
        Numbers++;
        HasNegative |= value < 0;
        HasZero |= value == 0;
        rises &= !(value <= last);
        falls &= !(value >= last);
        last = value;
    }

    public static ColumnTraits[] Of(ReadOnlySpan<char> text, Layout layout)
    {
        var traits = new ColumnTraits[layout.ColumnCount];
        for (int i = 0; i < traits.Length; i++)
            traits[i] = new ColumnTraits();
        LineWalk lines = LineWalk.From(text, layout.DataOffset, layout.DataLine);
        int rows = 0;
        while (rows < MostRows && lines.MoveNext())
        {
            if (lines.Line.IsWhiteSpace() || Fields.IsComment(lines.Line))
                continue;
            rows++;
            var fields = new Fields(lines.Line, layout.Dialect.Delimiter);
            while (fields.MoveNext() && fields.Count <= traits.Length)
            {
                if (NumberText.Read(fields.Current, layout.Dialect.DecimalComma, out double value) == NumberKind.Number)
                    traits[fields.Count - 1].Add(value);
            }
        }

        return traits;
    }

    /// <summary>What the columns may be when their heads do not tell: common orders that the numbers do not rule out.</summary>
    public static IReadOnlyList<ColumnChoices> Candidates(ColumnTraits[] traits, IReadOnlyList<ColumnMeaning> meanings)
    {
        int known = meanings.ToList().FindIndex(m => m.Alternatives.Any(a => a.Quantity == ColumnQuantity.Frequency));
        int frequency = known >= 0 ? known : Array.FindIndex(traits, t => t.MayBeFrequency);
        if (frequency < 0)
            return [];
        string hertz = known >= 0 ? meanings[known].Alternatives[0].Unit : "Hz";
        int[] rest = [.. Enumerable.Range(0, traits.Length).Where(i => i != frequency && traits[i].Numbers > 0 && !IsElsewhere(meanings[i]))];
        (ColumnQuantity, string)[][] orders = rest.Length switch
        {
            1 => [[(ColumnQuantity.GainDb, "dB")], [(ColumnQuantity.Magnitude, "ratio")], [(ColumnQuantity.AttenuationDb, "dB")]],
            2 =>
            [
                [(ColumnQuantity.GainDb, "dB"), (ColumnQuantity.Phase, "deg")],
                [(ColumnQuantity.Real, "ratio"), (ColumnQuantity.Imaginary, "ratio")],
                [(ColumnQuantity.Magnitude, "ratio"), (ColumnQuantity.Phase, "deg")],
                [(ColumnQuantity.InputAmplitude, "V"), (ColumnQuantity.OutputAmplitude, "V")],
                [(ColumnQuantity.GainDb, "dB"), (ColumnQuantity.Phase, "rad")],
                [(ColumnQuantity.Magnitude, "ratio"), (ColumnQuantity.Phase, "rad")],
            ],
            3 =>
            [
                [(ColumnQuantity.InputAmplitude, "V"), (ColumnQuantity.OutputAmplitude, "V"), (ColumnQuantity.Phase, "deg")],
                [(ColumnQuantity.InputAmplitude, "V"), (ColumnQuantity.OutputAmplitude, "V"), (ColumnQuantity.Phase, "rad")],
                [(ColumnQuantity.GainDb, "dB"), (ColumnQuantity.Phase, "deg"), (ColumnQuantity.Ignore, "")],
            ],
            4 =>
            [
                [(ColumnQuantity.InputAmplitude, "V"), (ColumnQuantity.OutputAmplitude, "V"), (ColumnQuantity.InputPhase, "deg"), (ColumnQuantity.OutputPhase, "deg")],
                [(ColumnQuantity.InputAmplitude, "V"), (ColumnQuantity.InputPhase, "deg"), (ColumnQuantity.OutputAmplitude, "V"), (ColumnQuantity.OutputPhase, "deg")],
            ],
            _ => [],
        };
        var found = new List<ColumnChoices>();
        foreach ((ColumnQuantity Quantity, string Unit)[] order in orders)
        {
            bool possible = true;
            var columns = new List<ColumnChoice> { new(frequency + 1, ColumnQuantity.Frequency, hertz) };
            for (int i = 0; i < order.Length; i++)
            {
                ColumnTraits column = traits[rest[i]];
                possible &= order[i].Quantity switch
                {
                    ColumnQuantity.Magnitude or ColumnQuantity.OutputAmplitude => column.MayBeMagnitude,
                    ColumnQuantity.InputAmplitude => column.MayBeMagnitude && !column.HasZero,
                    _ => true,
                };
                if (order[i].Quantity != ColumnQuantity.Ignore)
                    columns.Add(new ColumnChoice(rest[i] + 1, order[i].Quantity, order[i].Unit));
            }

            if (possible)
                found.Add(new ColumnChoices(columns, null));
        }

        return found;
    }

    private static bool IsElsewhere(ColumnMeaning meaning) => meaning.Alternatives.Any(a => a.Quantity == ColumnQuantity.Frequency);
}

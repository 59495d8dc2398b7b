using System.Numerics.Tensors;
using ResponseLedger.Engine.Sweeps;
using ResponseLedger.Formats.Text;

namespace ResponseLedger.Formats.Delimited;

/// <summary>Makes the sweep of the rows: units to Hz, dB, ratio and degrees; rows sorted; the file's own pair kept.</summary>
internal sealed class SweepAssembly(IReadOnlyList<ColumnChoice> plan, RowTable table, List<ReadNote> notes, IssueList issues)
{
    public Sweep? Make(CancellationToken ct)
    {
        int count = table.Count;
        if (table.RowCount < 2)
        {
            issues.Add(null, null, ReadCodes.TooFewPoints, $"The file has {table.RowCount} row{(table.RowCount == 1 ? "" : "s")}; a sweep needs two points or more.");
            return null;
        }

        double[] frequencyHz = Column(ColumnQuantity.Frequency) ?? [];
        (SweepForm form, double[] first, double[]? second) = Pair();
        ct.ThrowIfCancellationRequested();
        int[] lines = table.Lines.ToArray();
        Sort(frequencyHz, first, second, lines);
        FindTwice(frequencyHz, lines);
        for (int i = 0; i < count; i++)
        {
            if (!double.IsFinite(frequencyHz[i]) || frequencyHz[i] <= 0 || !double.IsFinite(first[i]) || (second is not null && !double.IsFinite(second[i])))
                issues.Add(lines[i], null, ReadCodes.Infinite, "In its base unit a value of this row leaves the range of numbers; check the row and the units.");
        }

        if (!issues.IsEmpty)
            return null;
        try
        {
            return Sweep.Create(form, frequencyHz, first, second);
        }
        catch (ArgumentException refusal)
        {
            issues.Add(null, null, ReadCodes.RefusedSweep, $"The rows make no sweep: {refusal.Message}");
            return null;
        }
    }

    private (SweepForm Form, double[] First, double[]? Second) Pair()
    {
        if (Column(ColumnQuantity.Real) is { } real)
            return (SweepForm.RealImaginary, real, Column(ColumnQuantity.Imaginary));
        double[]? phaseDeg = PhaseDeg();
        if (Column(ColumnQuantity.GainDb) is { } gainDb)
            return (phaseDeg is null ? SweepForm.Level : SweepForm.LevelPhase, gainDb, phaseDeg);
        if (Column(ColumnQuantity.AttenuationDb) is { } attenuationDb)
        {
            TensorPrimitives.Negate(attenuationDb, attenuationDb);
            notes.Add(new ReadNote("attenuation", $"The attenuation in column {ColumnOf(ColumnQuantity.AttenuationDb)} (input over output) was taken with the opposite sign as the gain in dB."));
            return (phaseDeg is null ? SweepForm.Level : SweepForm.LevelPhase, attenuationDb, phaseDeg);
        }

        if (Column(ColumnQuantity.Magnitude) is { } ratio)
            return (phaseDeg is null ? SweepForm.Ratio : SweepForm.RatioPhase, ratio, phaseDeg);
        if (Column(ColumnQuantity.InverseMagnitude) is { } inverse)
        {
            for (int i = 0; i < inverse.Length; i++)
                inverse[i] = 1 / inverse[i];
            notes.Add(new ReadNote("inverse", $"Column {ColumnOf(ColumnQuantity.InverseMagnitude)} is the input over the output; one over it was taken as the gain."));
            return (phaseDeg is null ? SweepForm.Ratio : SweepForm.RatioPhase, inverse, phaseDeg);
        }

        double[] amplitude = Quotient(out bool level);
        return level
            ? (phaseDeg is null ? SweepForm.Level : SweepForm.LevelPhase, amplitude, phaseDeg)
            : (phaseDeg is null ? SweepForm.Ratio : SweepForm.RatioPhase, amplitude, phaseDeg);
    }

    private double[]? PhaseDeg()
    {
        if (Column(ColumnQuantity.Phase) is { } phaseDeg)
            return phaseDeg;
        if (Column(ColumnQuantity.PhaseLag) is { } lagDeg)
        {
            TensorPrimitives.Negate(lagDeg, lagDeg);
            notes.Add(new ReadNote("phaseLag", $"The phase in column {ColumnOf(ColumnQuantity.PhaseLag)} (input minus output) was taken with the opposite sign."));
            return lagDeg;
        }

        if (Column(ColumnQuantity.OutputPhase) is not { } outputDeg)
            return null;
        TensorPrimitives.Subtract(outputDeg, Column(ColumnQuantity.InputPhase), outputDeg);
        notes.Add(new ReadNote("phase", "The phase is the output's minus the input's."));
        return outputDeg;
    }

    private double[] Quotient(out bool level)
    {
        (AmplitudeUnit input, AmplitudeUnit output) = ColumnPlan.Amplitudes(plan)!.Value;
        double[] over = Raw(ColumnQuantity.OutputAmplitude);
        double[] under = Raw(ColumnQuantity.InputAmplitude);
        level = input.IsLevel && output.IsLevel;
        if (level)
        {
            TensorPrimitives.Subtract(over, under, over);
            if (input.Name != output.Name)
                TensorPrimitives.Add(over, output.ReferenceDbv!.Value - input.ReferenceDbv!.Value, over);
            notes.Add(new ReadNote("gain", $"The gain is the output's level minus the input's ({output.Name}, {input.Name})."));
            return over;
        }

        ToVolts(over, output, other: input);
        ToVolts(under, input, other: output);
        TensorPrimitives.Divide(over, under, over);
        notes.Add(new ReadNote("gain", $"The gain is the output's amplitude over the input's ({output.Name}, {input.Name})."));
        return over;
    }

    // Equal units cancel and are left as they are, so that a plain quotient is rounded once.
    private static void ToVolts(double[] values, AmplitudeUnit unit, AmplitudeUnit other)
    {
        if (unit.IsLevel)
        {
            for (int i = 0; i < values.Length; i++)
                values[i] = Math.Pow(10, (values[i] + unit.ReferenceDbv!.Value) / 20);
        }
        else if (unit.Name != other.Name)
        {
            double scale = unit.Convention == other.Convention ? unit.Volts : unit.RmsVolts;
            TensorPrimitives.Multiply(values, scale, values);
        }
    }

    /// <summary>A column in its base unit, null when the plan has none.</summary>
    private double[]? Column(ColumnQuantity quantity)
    {
        if (plan.FirstOrDefault(c => c.Quantity == quantity) is not { } choice)
            return null;
        double[] values = Raw(quantity);
        UnitText unit = UnitText.Parse(choice.Unit)!;
        if (unit.Family is UnitFamily.Ratio or UnitFamily.Voltage && unit.Name != "ratio")
            notes.Add(new ReadNote("gainUnit", $"Column {choice.Column} is a gain in {unit.Name}{(unit.Family == UnitFamily.Voltage ? " for a drive of 1 V" : "")}."));
        if (unit.Multiply != 1)
            TensorPrimitives.Multiply(values, unit.Multiply, values);
        if (unit.Divide != 1)
            TensorPrimitives.Divide(values, unit.Divide, values);
        if (unit.Family == UnitFamily.PowerRatio)
        {
            TensorPrimitives.Sqrt(values, values);
            notes.Add(new ReadNote("powerRatio", $"Column {choice.Column} is a ratio of powers ({unit.Name}), whose level is 10 log10 of it; its square root was taken as the gain."));
        }

        return values;
    }

    private double[] Raw(ColumnQuantity quantity)
    {
        for (int i = 0; i < plan.Count; i++)
        {
            if (plan[i].Quantity == quantity)
                return table.Plane(i).ToArray();
        }

        return [];
    }

    private void Sort(double[] frequencyHz, double[] first, double[]? second, int[] lines)
    {
        bool ascending = true;
        for (int i = 1; i < frequencyHz.Length && ascending; i++)
            ascending = frequencyHz[i] >= frequencyHz[i - 1];
        if (ascending)
            return;
        int[] order = [.. Enumerable.Range(0, frequencyHz.Length)];
        // Equal frequencies stay in the order of lines, so that the later one is the one complained about.
        Array.Sort(order, (a, b) => frequencyHz[a].CompareTo(frequencyHz[b]) is var c && c != 0 ? c : a.CompareTo(b));
        Reorder(frequencyHz, order);
        Reorder(first, order);
        if (second is not null)
            Reorder(second, order);
        Reorder(lines, order);
        notes.Add(new ReadNote("rowsSorted", "The rows did not ascend in frequency and were sorted."));
    }

    private static void Reorder<T>(T[] values, int[] order)
    {
        var old = (T[])values.Clone();
        for (int i = 0; i < order.Length; i++)
            values[i] = old[order[i]];
    }

    private void FindTwice(double[] frequencyHz, int[] lines)
    {
        var twice = new List<(int Line, int First)>();
        int firstOfKind = 0;
        for (int i = 1; i < frequencyHz.Length; i++)
        {
            if (frequencyHz[i] == frequencyHz[firstOfKind])
                twice.Add((lines[i], lines[firstOfKind]));
            else
                firstOfKind = i;
        }

        twice.Sort();
        for (int i = 0; i < twice.Count; i++)
        {
            if (i >= SweepFileReader.MostIssuesListed)
                issues.CountUnlisted();
            else
            {
                issues.Insert(twice[i].Line, ColumnOf(ColumnQuantity.Frequency), ReadCodes.DuplicateFrequency,
                    $"The frequency stands in line {twice[i].First} already; keep one of the two rows.");
            }
        }
    }

    private int ColumnOf(ColumnQuantity quantity) => plan.First(c => c.Quantity == quantity).Column;
}

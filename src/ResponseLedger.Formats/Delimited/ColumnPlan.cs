namespace ResponseLedger.Formats.Delimited;

/// <summary>Makes one set of columns out of what each column may be, or the sets to choose from.</summary>
internal static class ColumnPlan
{
    private const int MostCandidates = 16;

    /// <summary>The roles of a set of columns; the first set that is settled wins.</summary>
    private enum Role
    {
        Frequency,
        Real,
        Imaginary,
        Gain,
        Phase,
        InputAmplitude,
        OutputAmplitude,
        InputPhase,
        OutputPhase,
    }

    private static readonly string[] Conventions = [" rms", " peak", " pp"];

    private static readonly Role[][] Sets =
    [
        [Role.Frequency, Role.Real, Role.Imaginary],
        [Role.Frequency, Role.Gain, Role.InputPhase, Role.OutputPhase],
        [Role.Frequency, Role.Gain, Role.Phase],
        [Role.Frequency, Role.Gain],
        [Role.Frequency, Role.InputAmplitude, Role.OutputAmplitude, Role.InputPhase, Role.OutputPhase],
        [Role.Frequency, Role.InputAmplitude, Role.OutputAmplitude, Role.Phase],
        [Role.Frequency, Role.InputAmplitude, Role.OutputAmplitude],
    ];

    /// <summary>One set when it is settled, several or an asked one when it is open, none when columns are missing.</summary>
    public static (IReadOnlyList<ColumnChoice>? Settled, IReadOnlyList<ColumnChoices> Candidates) Make(IReadOnlyList<ColumnMeaning> meanings)
    {
        meanings = LonePhaseAsked(meanings);
        List<List<ColumnChoice>>? open = null;
        foreach (Role[] set in Sets)
        {
            if (Candidates(set, meanings, out bool asked) is not { Count: > 0 } found)
                continue;
            bool settled = found.Count == 1 && !asked && !LeavesPhaseBehind(set, meanings);
            if (settled)
                return (found[0], []);
            open ??= found;
        }

        return (null, open is null ? [] : [.. open.Select(c => new ColumnChoices(c, null))]);
    }

    /// <summary>Leaves out the candidates that would take a text that is not understood for a plain unit: "rpm" for Hz, "mA" for V.</summary>
    public static IReadOnlyList<ColumnChoices> Offered(IReadOnlyList<ColumnChoices> candidates, IReadOnlyList<ColumnMeaning> meanings)
        => [.. candidates.Where(c => c.Columns.All(column => !meanings[column.Column - 1].MustNotBeOffered))];

    /// <summary>Why a chosen set makes no sweep; null when it does.</summary>
    public static string? Problem(IReadOnlyList<ColumnChoice> columns)
    {
        foreach (ColumnChoice column in columns)
        {
            if (Normalise(column) is null)
                {
                string quantity = UnitsTaken.Words(column.Quantity);
                string units = UnitsTaken.Of(column.Quantity);
                return column.Unit.Trim().Length == 0
                    ? $"Column {column.Column} is chosen as {quantity} without a unit; state one of {units}."
                    : $"Column {column.Column}: \"{RowTable.Shown(column.Unit)}\" is no unit of the {quantity}; taken are {units}.";
            }
        }

        if (columns.GroupBy(c => RoleOf(c.Quantity)).FirstOrDefault(g => g.Key is not null && g.Count() > 1) is { } twice)
            return $"Columns {string.Join(" and ", twice.Select(c => c.Column))} are both chosen as {twice.Key}; choose one.";
        var roles = columns.Select(c => RoleOf(c.Quantity)).OfType<Role>().ToHashSet();
        if (!Sets.Any(roles.SetEquals))
            return "The chosen columns make no sweep; choose frequency with gain, magnitude or attenuation (and phase), with real and imaginary, or with both amplitudes (and their phases or the difference).";
        return Amplitudes(columns) is var (input, output) && !AmplitudeUnit.AreComparable(input, output)
            ? $"{input.Name} and {output.Name} cannot be compared; say for both whether they are rms or peak, or give both in one unit."
            : null;
    }

    /// <summary>The choice with the canonical unit, the default one where none is given; null when the unit does not fit.</summary>
    public static ColumnChoice? Normalise(ColumnChoice choice)
    {
        if (choice.Quantity == ColumnQuantity.Ignore)
            return choice with { Unit = "" };
        if (choice.Quantity is ColumnQuantity.InputAmplitude or ColumnQuantity.OutputAmplitude)
            return AmplitudeUnit.TryParse(choice.Unit, out AmplitudeUnit? amplitude) ? choice with { Unit = amplitude!.Name } : null;
        string stated = choice.Unit.Trim();
        if (stated.Length == 0)
        {
            stated = choice.Quantity switch
            {
                ColumnQuantity.Frequency => "Hz",
                ColumnQuantity.GainDb or ColumnQuantity.AttenuationDb => "dB",
                ColumnQuantity.Magnitude or ColumnQuantity.InverseMagnitude or ColumnQuantity.Real or ColumnQuantity.Imaginary => "ratio",
                _ => "",
            };
        }

        UnitText? unit = UnitText.Parse(stated);
        bool fits = (choice.Quantity, unit?.Family) switch
        {
            (ColumnQuantity.Frequency, UnitFamily.Frequency) => true,
            (ColumnQuantity.GainDb or ColumnQuantity.AttenuationDb, UnitFamily.Decibel) => true,
            (ColumnQuantity.Magnitude or ColumnQuantity.InverseMagnitude, UnitFamily.PowerRatio) => true,
            (ColumnQuantity.Magnitude or ColumnQuantity.InverseMagnitude or ColumnQuantity.Real or ColumnQuantity.Imaginary, UnitFamily.Ratio or UnitFamily.Voltage) => true,
            (ColumnQuantity.Phase or ColumnQuantity.PhaseLag or ColumnQuantity.InputPhase or ColumnQuantity.OutputPhase, UnitFamily.Angle) => true,
            _ => false,
        };
        return fits ? choice with { Unit = unit!.Name } : null;
    }

    /// <summary>The units of the pair of amplitudes, where the columns hold one.</summary>
    public static (AmplitudeUnit Input, AmplitudeUnit Output)? Amplitudes(IReadOnlyList<ColumnChoice> columns)
    {
        AmplitudeUnit? input = null;
        AmplitudeUnit? output = null;
        foreach (ColumnChoice column in columns)
        {
            if (column.Quantity is not (ColumnQuantity.InputAmplitude or ColumnQuantity.OutputAmplitude)
                || !AmplitudeUnit.TryParse(column.Unit, out AmplitudeUnit? unit))
            {
                continue;
            }

            if (column.Quantity == ColumnQuantity.InputAmplitude)
                input = unit;
            else
                output = unit;
        }

        return input is null || output is null ? null : (input, output);
    }

    // The phase of one channel alone may be meant as the difference; only a person knows.
    private static IReadOnlyList<ColumnMeaning> LonePhaseAsked(IReadOnlyList<ColumnMeaning> meanings)
    {
        bool Has(Role role) => meanings.Any(m => m.Alternatives.Any(a => RoleOf(a.Quantity) == role));
        if (Has(Role.Phase) || Has(Role.InputPhase) == Has(Role.OutputPhase))
            return meanings;
        return [.. meanings.Select(m => m.Alternatives.Any(a => RoleOf(a.Quantity) is Role.InputPhase or Role.OutputPhase)
            ? m with { Alternatives = [.. m.Alternatives.Select(a => (ColumnQuantity.Phase, a.Unit))], Ask = true }
            : m)];
    }

    // A lone phase of one channel, or a phase or imaginary part whose unit is open, must not vanish into a run without phase.
    private static bool LeavesPhaseBehind(Role[] set, IReadOnlyList<ColumnMeaning> meanings)
        => !set.Contains(Role.Real) && !set.Contains(Role.Phase) && !set.Contains(Role.OutputPhase)
            && meanings.Any(m => m.Alternatives.Any(a => RoleOf(a.Quantity) is Role.Phase or Role.InputPhase or Role.OutputPhase || (a.Quantity == ColumnQuantity.Imaginary && !m.IsSettled)));

    private static List<List<ColumnChoice>>? Candidates(Role[] set, IReadOnlyList<ColumnMeaning> meanings, out bool asked)
    {
        asked = false;
        var found = new List<List<ColumnChoice>> { new() };
        foreach (Role role in set)
        {
            List<ColumnChoice> pool = Pool(role, meanings, out bool ask);
            if (pool.Count == 0)
                return null;
            asked |= ask;
            found = [.. found.SelectMany(head => pool.Where(c => !head.Exists(h => h.Column == c.Column)).Select(c => new List<ColumnChoice>(head) { c })).Take(MostCandidates)];
        }

        return [.. found.SelectMany(Comparable).Take(MostCandidates)];
    }

    // Amplitudes of which only one says rms or peak: each way to complete the other is a candidate.
    private static IEnumerable<List<ColumnChoice>> Comparable(List<ColumnChoice> columns)
    {
        if (Amplitudes(columns) is not var (input, output) || AmplitudeUnit.AreComparable(input, output))
            return [columns];
        AmplitudeUnit vague = !input.IsLevel && input.Convention == Convention.Unstated ? input : output;
        ColumnQuantity quantity = ReferenceEquals(vague, input) ? ColumnQuantity.InputAmplitude : ColumnQuantity.OutputAmplitude;
        if (vague.IsLevel || vague.Convention != Convention.Unstated)
            return [];
        return Conventions
            .Select(c => columns.ConvertAll(column => column.Quantity == quantity ? column with { Unit = vague.Name + c } : column))
            .Where(c => Problem(c) is null);
    }

    // Settled columns before open ones; of several settled ones that say the same, the plainest unit.
    private static List<ColumnChoice> Pool(Role role, IReadOnlyList<ColumnMeaning> meanings, out bool asked)
    {
        var settled = new List<ColumnChoice>();
        var open = new List<ColumnChoice>();
        for (int i = 0; i < meanings.Count; i++)
        {
            foreach ((ColumnQuantity quantity, string unit) in meanings[i].Alternatives)
            {
                if (RoleOf(quantity) == role)
                    (meanings[i].IsSettled ? settled : open).Add(new ColumnChoice(i + 1, quantity, unit));
            }
        }

        asked = settled.Count == 0;
        if (settled.Count == 0)
            return open;
        int plainest = settled.Min(Rank);
        settled.RemoveAll(c => Rank(c) > plainest);
        return settled;
    }

    private static int Rank(ColumnChoice choice) => choice switch
    {
        { Quantity: ColumnQuantity.Magnitude } => 1,
        { Quantity: ColumnQuantity.AttenuationDb or ColumnQuantity.InverseMagnitude } => 2,
        { Quantity: ColumnQuantity.PhaseLag } => 4,
        { Unit: "Hz" or "dB" or "deg" or "ratio" } => 0,
        { Quantity: ColumnQuantity.InputAmplitude or ColumnQuantity.OutputAmplitude } => choice.Unit.StartsWith("dB", StringComparison.Ordinal) ? 4 : 0,
        _ => 3,
    };

    private static Role? RoleOf(ColumnQuantity quantity) => quantity switch
    {
        ColumnQuantity.Frequency => Role.Frequency,
        ColumnQuantity.GainDb or ColumnQuantity.AttenuationDb or ColumnQuantity.Magnitude or ColumnQuantity.InverseMagnitude => Role.Gain,
        ColumnQuantity.Real => Role.Real,
        ColumnQuantity.Imaginary => Role.Imaginary,
        ColumnQuantity.Phase or ColumnQuantity.PhaseLag => Role.Phase,
        ColumnQuantity.InputAmplitude => Role.InputAmplitude,
        ColumnQuantity.OutputAmplitude => Role.OutputAmplitude,
        ColumnQuantity.InputPhase => Role.InputPhase,
        ColumnQuantity.OutputPhase => Role.OutputPhase,
        _ => null,
    };
}

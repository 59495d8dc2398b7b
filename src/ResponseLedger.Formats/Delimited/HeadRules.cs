namespace ResponseLedger.Formats.Delimited;

/// <summary>What words, unit and direction of a head settle together.</summary>
internal readonly record struct HeadRules(Said Said, UnitText? Unit, Turn Turn, bool Difference)
{
    private UnitFamily Family => Unit?.Family ?? UnitFamily.None;

    private Said Channels => Said & (Said.Input | Said.Output);

    private bool IsFrequency => (Said & ~(Said.Input | Said.Output)) is Said.Frequency or Said.Omega;

    private bool IsPhase => Said.HasFlag(Said.Phase) || (Family == UnitFamily.Angle && (Said & (Said.Real | Said.Imaginary | Said.Magnitude)) == 0);

    private bool IsPart => (Said & (Said.Real | Said.Imaginary)) is Said.Real or Said.Imaginary;

    private bool IsAmplitude => Channels is Said.Input or Said.Output && !Said.HasFlag(Said.Gain);

    /// <summary>A unit or a turn that does not go with the words, as text of the head; null where all goes together.</summary>
    public string? Unexpected(string head)
    {
        if (Said.HasFlag(Said.Other))
            return null;
        bool turned = Turn != Turn.None && (IsFrequency || IsPart || IsAmplitude);
        bool strange = IsFrequency ? Unit is not null && Family != UnitFamily.Frequency
            : Family == UnitFamily.Frequency ? (Said & ~(Said.Frequency | Said.Omega | Said.Input | Said.Output)) != 0 && !Said.HasFlag(Said.Frequency)
            : IsPhase ? Unit is not null && Family != UnitFamily.Angle
            : IsPart ? Unit is not null && Family is not (UnitFamily.Ratio or UnitFamily.Voltage)
            : Said.HasFlag(Said.Attenuation) ? Unit is not null && Family is not (UnitFamily.Decibel or UnitFamily.Ratio or UnitFamily.PowerRatio)
            : IsAmplitude && Unit is not null && (Family is not (UnitFamily.Voltage or UnitFamily.VoltageLevel or UnitFamily.Decibel) || Unit.Name == "Np");
        return turned ? head.Trim() : strange ? Unit!.Name : null;
    }

    public ColumnMeaning Decide()
    {
        if (Said.HasFlag(Said.Other))
            return ColumnMeaning.Unknown;
        if (IsFrequency || (Family == UnitFamily.Frequency && !IsPhase && !IsPart && Said is Said.None or Said.Input or Said.Output || Said.HasFlag(Said.Frequency) && Family == UnitFamily.Frequency))
            return ColumnMeaning.Settled(ColumnQuantity.Frequency, Family == UnitFamily.Frequency ? Unit!.Name : Said.HasFlag(Said.Omega) ? "rad/s" : "Hz");
        if (IsPhase)
            return Angle();
        if (IsPart)
            return Linear(Said.HasFlag(Said.Real) ? ColumnQuantity.Real : ColumnQuantity.Imaginary);
        if (Said.HasFlag(Said.Attenuation))
            return Attenuation();
        if (IsAmplitude)
            return Amplitude(Channels == Said.Input ? ColumnQuantity.InputAmplitude : ColumnQuantity.OutputAmplitude);
        if (Said == Said.None && Family is UnitFamily.None or UnitFamily.Voltage or UnitFamily.VoltageLevel)
            return ColumnMeaning.Unknown;
        return Gain();
    }

    private ColumnMeaning Angle()
    {
        ColumnQuantity[] quantities = Channels switch
        {
            Said.Input => [ColumnQuantity.InputPhase],
            Said.Output => [ColumnQuantity.OutputPhase],
            _ => Turned(ColumnQuantity.Phase, ColumnQuantity.PhaseLag, Turn),
        };
        string[] units = Family == UnitFamily.Angle ? [Unit!.Name] : ["deg", "rad"];
        return Among(quantities, units);
    }

    private ColumnMeaning Linear(ColumnQuantity quantity) => Family switch
    {
        UnitFamily.Ratio => ColumnMeaning.Settled(quantity, Unit!.Name),
        UnitFamily.Voltage => ColumnMeaning.Open((quantity, Unit!.Name)),
        _ => ColumnMeaning.Settled(quantity, "ratio"),
    };

    // An attenuation is the input over the output: the head may say so too. With a minus before it, it may be either.
    private ColumnMeaning Attenuation() => Family switch
    {
        UnitFamily.Decibel when Turn == Turn.None || Channels == (Said.Input | Said.Output) => ColumnMeaning.Settled(ColumnQuantity.AttenuationDb, Unit!.Name) with { SignIsChecked = true },
        UnitFamily.Ratio or UnitFamily.PowerRatio => ColumnMeaning.Open((ColumnQuantity.InverseMagnitude, Unit!.Name), (ColumnQuantity.Magnitude, Unit.Name)),
        UnitFamily.Decibel => ColumnMeaning.Open((ColumnQuantity.AttenuationDb, Unit!.Name), (ColumnQuantity.GainDb, Unit.Name)),
        _ => ColumnMeaning.Open((ColumnQuantity.AttenuationDb, "dB"), (ColumnQuantity.GainDb, "dB")),
    };

    private ColumnMeaning Amplitude(ColumnQuantity quantity) => Family switch
    {
        UnitFamily.Voltage or UnitFamily.VoltageLevel or UnitFamily.Decibel when Unit!.Name != "Np" => ColumnMeaning.Settled(quantity, Unit.Name),
        _ when Said.HasFlag(Said.Power) => ColumnMeaning.Open((quantity, "dBm")),
        _ => ColumnMeaning.Settled(quantity, "V"),
    };

    private ColumnMeaning Gain()
    {
        // "Gain Vin/Vout": a gain is output over input, so that one of the two words is wrong.
        Turn turn = Turn == Turn.Opposite && Channels == (Said.Input | Said.Output) && (Said & (Said.Gain | Said.Level)) != 0 ? Turn.Uncertain : Turn;
        ColumnQuantity[] levels = Turned(ColumnQuantity.GainDb, ColumnQuantity.AttenuationDb, turn);
        ColumnQuantity[] ratios = Turned(ColumnQuantity.Magnitude, ColumnQuantity.InverseMagnitude, turn);
        bool power = Said.HasFlag(Said.Power);
        bool quotient = Channels == (Said.Input | Said.Output);
        switch (Family)
        {
            case UnitFamily.Decibel:
                return Among(levels, [Unit!.Name]);
            case UnitFamily.PowerRatio:
                return Among(ratios, [Unit!.Name]);
            case UnitFamily.Ratio when power:
                return Among(ratios, ["W/W", Unit!.Name]);
            case UnitFamily.Ratio:
                return Difference ? Asked(Among(ratios, [Unit!.Name])) : Among(ratios, [Unit!.Name]);
            case UnitFamily.Voltage:
                return ColumnMeaning.Open((ColumnQuantity.Magnitude, Unit!.Name), (ColumnQuantity.OutputAmplitude, Unit.Name));
            case UnitFamily.VoltageLevel:
                return ColumnMeaning.Open((ColumnQuantity.GainDb, "dB"), (ColumnQuantity.OutputAmplitude, Unit!.Name));
            case UnitFamily.None when power && (Said & (Said.Magnitude | Said.Gain | Said.Level)) == 0:
                return ColumnMeaning.Unknown;
            case UnitFamily.None when power && Said.HasFlag(Said.Magnitude):
                return Among(ratios, ["W/W"]);
            case UnitFamily.None when Difference:
                return Both(levels, ratios, "ratio");
            case UnitFamily.None when Said.HasFlag(Said.Magnitude) || (quotient && !Said.HasFlag(Said.Gain)):
                return Among(ratios, ["ratio"]);
            case UnitFamily.None when (Said & (Said.Gain | Said.Level)) != 0:
                return Both(levels, ratios, power ? "W/W" : "ratio");
            default:
                return ColumnMeaning.Unknown;
        }
    }

    private static ColumnQuantity[] Turned(ColumnQuantity plain, ColumnQuantity opposite, Turn turn)
        => turn switch { Turn.None => [plain], Turn.Opposite => [opposite], _ => [plain, opposite] };

    private static ColumnMeaning Among(ColumnQuantity[] quantities, string[] units)
        => new([.. units.SelectMany(u => quantities.Select(q => (q, u)))], quantities.Length * units.Length > 1);

    private static ColumnMeaning Both(ColumnQuantity[] levels, ColumnQuantity[] ratios, string unit)
        => ColumnMeaning.Open([.. levels.Select(q => (q, "dB")), .. ratios.Select(q => (q, unit))]);

    private static ColumnMeaning Asked(ColumnMeaning meaning) => meaning with { Ask = true };
}

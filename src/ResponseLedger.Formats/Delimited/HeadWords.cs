namespace ResponseLedger.Formats.Delimited;

/// <summary>What a column may be: one alternative and not <paramref name="Ask"/> is settled, anything else is asked.</summary>
internal sealed record ColumnMeaning(IReadOnlyList<(ColumnQuantity Quantity, string Unit)> Alternatives, bool Ask)
{
    public static readonly ColumnMeaning Unknown = new([], false);

    public bool IsSettled => Alternatives.Count == 1 && !Ask;

    public static ColumnMeaning Settled(ColumnQuantity quantity, string unit) => new([(quantity, unit)], false);

    public static ColumnMeaning Open(params (ColumnQuantity, string)[] alternatives) => new(alternatives, true);
}

/// <summary>Knows the English and German words of heads, and what they settle.</summary>
internal static class HeadWords
{
    [Flags]
    private enum Said
    {
        None = 0,
        Frequency = 1,
        Omega = 2,
        Gain = 4,
        Level = 8,
        Magnitude = 16,
        Attenuation = 32,
        Real = 64,
        Imaginary = 128,
        Phase = 256,
        Input = 512,
        Output = 1024,
        Other = 2048,
    }

    /// <summary>The words of a head in lower case: runs of letters and digits.</summary>
    public static List<string> Split(string head)
    {
        var words = new List<string>();
        int start = -1;
        for (int i = 0; i <= head.Length; i++)
        {
            bool inside = i < head.Length && (char.IsLetterOrDigit(head[i]) || head[i] is '\u00B0' or '\u2220');
            if (inside && start < 0)
                start = i;
            if (inside || start < 0)
                continue;
            words.Add(head[start..i].ToLowerInvariant());
            start = -1;
        }

        return words;
    }

    /// <summary>Reads a head, with the unit of the row of units where there is one.</summary>
    public static ColumnMeaning Read(string head, string unitBelow)
    {
        if (head.Length > 256)
            return ColumnMeaning.Unknown;
        (string words, UnitText? unit) = HeadUnit.Part(head);
        if (UnitText.Parse(unitBelow.Trim().Trim('[', ']', '(', ')')) is { } below)
            unit = below;
        return Decide(Listen(words), unit);
    }

    private static Said Listen(string text)
    {
        List<string> words = Split(BreakCapitals(text));
        Said said = text.Count(c => c == '|') >= 2 ? Said.Magnitude : Said.None;
        for (int i = 0; i < words.Count; i++)
        {
            string next = i + 1 < words.Count ? words[i + 1] : "";
            said |= words[i] switch
            {
                "ch" or "channel" or "chan" or "kanal" or "k" or "trace" when next is "1" or "a" => Said.Input,
                "ch" or "channel" or "chan" or "kanal" or "k" or "trace" when next is "2" or "b" => Said.Output,
                "f" or "w" when words.Count > 1 => Said.None,
                _ => Word(words[i]),
            };
        }

        return said;
    }

    // "GainPhase" and "CH1Amplitude" hold two words.
    private static string BreakCapitals(string text)
    {
        for (int i = text.Length - 1; i > 0; i--)
        {
            if (char.IsUpper(text[i]) && (char.IsLower(text[i - 1]) || char.IsDigit(text[i - 1])))
                text = text.Insert(i, " ");
        }

        return text;
    }

    private static Said Word(string word) => word switch
    {
        "frequency" or "frequencies" or "freq" or "frequenz" or "frq" or "f" => Said.Frequency,
        "omega" or "\u03C9" or "w" or "kreisfrequenz" or "winkelfrequenz" => Said.Omega,
        "gain" or "verst\u00E4rkung" or "verstaerkung" or "transfer" or "response" or "frequenzgang" or "\u00FCbertragung" or "h" or "s21" or "transmission" => Said.Gain,
        "level" or "pegel" => Said.Level,
        "magnitude" or "mag" or "betrag" or "abs" or "amplitude" or "amp" or "ampl" or "modulus" or "amplitudengang" or "amplitudenverh\u00E4ltnis" => Said.Magnitude,
        "attenuation" or "att" or "atten" or "loss" => Said.Attenuation,
        "real" or "re" or "realteil" => Said.Real,
        "imaginary" or "imag" or "im" or "imagin\u00E4r" or "imaginaerteil" or "imagin\u00E4rteil" => Said.Imaginary,
        "phase" or "ph" or "phasenwinkel" or "phasenverschiebung" or "phasengang" or "angle" or "winkel" or "arg" or "phi" or "\u03C6" or "\u03D5" or "\u2220" or "phs" => Said.Phase,
        "input" or "in" or "vin" or "uin" or "ein" or "eingang" or "ue" or "ch1" or "channel1" or "chan1" or "kanal1" or "k1" or "v1" or "u1" or "cha" or "eingangsspannung" or "eingangsamplitude" => Said.Input,
        "output" or "out" or "vout" or "uout" or "aus" or "ausgang" or "ua" or "ch2" or "channel2" or "chan2" or "kanal2" or "k2" or "v2" or "u2" or "chb" or "ausgangsspannung" or "ausgangsamplitude" => Said.Output,
        "eingangsphase" => Said.Input | Said.Phase,
        "ausgangsphase" => Said.Output | Said.Phase,
        "delay" or "laufzeit" or "gruppenlaufzeit" or "coherence" or "koh\u00E4renz" or "index" or "point" or "punkt" or "points" or "nr" or "no" or "limit" or "grenze"
            or "tolerance" or "toleranz" or "uncertainty" or "unsicherheit" or "sigma" or "std" or "time" or "zeit" or "temperature" or "temperatur" or "noise" or "rauschen"
            or "s11" or "s12" or "s22" or "status" or "thd" => Said.Other,
        _ when word.EndsWith("d\u00E4mpfung", StringComparison.Ordinal) || word.EndsWith("daempfung", StringComparison.Ordinal) => Said.Attenuation,
        _ => Said.None,
    };

    private static ColumnMeaning Decide(Said said, UnitText? unit)
    {
        if (said.HasFlag(Said.Other))
            return ColumnMeaning.Unknown;
        UnitFamily family = unit?.Family ?? UnitFamily.None;
        if (family == UnitFamily.Frequency)
        {
            return unit!.MayBeMega
                ? ColumnMeaning.Open((ColumnQuantity.Frequency, "mHz"), (ColumnQuantity.Frequency, "MHz"))
                : ColumnMeaning.Settled(ColumnQuantity.Frequency, unit.Name);
        }

        if (unit is null && said == Said.Omega)
            return ColumnMeaning.Settled(ColumnQuantity.Frequency, "rad/s");
        if (unit is null && said == Said.Frequency)
            return ColumnMeaning.Settled(ColumnQuantity.Frequency, "Hz");
        if (said.HasFlag(Said.Phase) || (family == UnitFamily.Angle && (said & (Said.Real | Said.Imaginary | Said.Magnitude)) == 0))
            return Angle(said, unit);
        if ((said & (Said.Real | Said.Imaginary)) is var part && part is Said.Real or Said.Imaginary)
            return Linear(part == Said.Real ? ColumnQuantity.Real : ColumnQuantity.Imaginary, unit);
        if (said.HasFlag(Said.Attenuation))
        {
            return family switch
            {
                UnitFamily.Decibel => ColumnMeaning.Settled(ColumnQuantity.AttenuationDb, "dB"),
                UnitFamily.None => ColumnMeaning.Open((ColumnQuantity.AttenuationDb, "dB"), (ColumnQuantity.GainDb, "dB")),
                _ => ColumnMeaning.Unknown,
            };
        }

        bool input = said.HasFlag(Said.Input);
        bool output = said.HasFlag(Said.Output);
        if (input != output && !said.HasFlag(Said.Gain))
            return Amplitude(input ? ColumnQuantity.InputAmplitude : ColumnQuantity.OutputAmplitude, unit);
        if (said == Said.None && family is UnitFamily.None or UnitFamily.Voltage or UnitFamily.VoltageLevel)
            return ColumnMeaning.Unknown;
        return Gain(said, unit, quotient: input && output);
    }

    private static ColumnMeaning Angle(Said said, UnitText? unit)
    {
        if (unit is not null && unit.Family != UnitFamily.Angle)
            return ColumnMeaning.Unknown;
        ColumnQuantity quantity = (said & (Said.Input | Said.Output)) switch
        {
            Said.Input => ColumnQuantity.InputPhase,
            Said.Output => ColumnQuantity.OutputPhase,
            _ => ColumnQuantity.Phase,
        };
        return unit is null
            ? ColumnMeaning.Open((quantity, "deg"), (quantity, "rad"))
            : ColumnMeaning.Settled(quantity, unit.Name);
    }

    private static ColumnMeaning Linear(ColumnQuantity quantity, UnitText? unit) => (unit?.Family ?? UnitFamily.None) switch
    {
        UnitFamily.None => ColumnMeaning.Settled(quantity, "ratio"),
        UnitFamily.Ratio => ColumnMeaning.Settled(quantity, unit!.Name),
        UnitFamily.Voltage => ColumnMeaning.Open((quantity, unit!.Name)),
        _ => ColumnMeaning.Unknown,
    };

    private static ColumnMeaning Amplitude(ColumnQuantity quantity, UnitText? unit) => (unit?.Family ?? UnitFamily.None) switch
    {
        UnitFamily.None => ColumnMeaning.Settled(quantity, "V"),
        UnitFamily.Voltage or UnitFamily.VoltageLevel or UnitFamily.Decibel => ColumnMeaning.Settled(quantity, unit!.Name),
        _ => ColumnMeaning.Unknown,
    };

    private static ColumnMeaning Gain(Said said, UnitText? unit, bool quotient)
    {
        switch (unit?.Family ?? UnitFamily.None)
        {
            case UnitFamily.Decibel:
                return ColumnMeaning.Settled(ColumnQuantity.GainDb, "dB");
            case UnitFamily.Ratio:
                return ColumnMeaning.Settled(ColumnQuantity.Magnitude, unit!.Name);
            case UnitFamily.Voltage:
                return ColumnMeaning.Open((ColumnQuantity.Magnitude, unit!.Name), (ColumnQuantity.OutputAmplitude, unit.Name));
            case UnitFamily.VoltageLevel:
                return ColumnMeaning.Open((ColumnQuantity.GainDb, "dB"), (ColumnQuantity.OutputAmplitude, unit!.Name));
            case UnitFamily.None when said.HasFlag(Said.Magnitude) || (quotient && !said.HasFlag(Said.Gain)):
                return ColumnMeaning.Settled(ColumnQuantity.Magnitude, "ratio");
            case UnitFamily.None when (said & (Said.Gain | Said.Level)) != 0:
                return ColumnMeaning.Open((ColumnQuantity.GainDb, "dB"), (ColumnQuantity.Magnitude, "ratio"));
            default:
                return ColumnMeaning.Unknown;
        }
    }
}

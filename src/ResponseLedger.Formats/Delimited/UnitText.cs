using System.Text;

namespace ResponseLedger.Formats.Delimited;

/// <summary>What a unit measures, as far as a column is concerned.</summary>
internal enum UnitFamily
{
    None,
    Frequency,
    Decibel,
    Ratio,
    PowerRatio,
    Voltage,
    VoltageLevel,
    Angle,
}

/// <summary>A unit as it stands in a head, in a row of units, or in choices.</summary>
/// <param name="Name">Its canonical name.</param>
/// <param name="Family">What it measures.</param>
/// <param name="Multiply">Factor to the base unit (Hz, dB, ratio, degree).</param>
/// <param name="Divide">Divisor to the base unit: kept apart so that 1 mHz is 1/1000 Hz, correctly rounded.</param>
internal sealed record UnitText(string Name, UnitFamily Family, double Multiply = 1, double Divide = 1)
{
    private const double DecibelsPerNeper = 8.685889638065037;

    /// <summary>In a head: the units that this text may stand for; empty where it stands for itself.</summary>
    public IReadOnlyList<string> Asked { get; init; } = [];

    /// <summary>The text as it was written, where it is asked.</summary>
    public string Stated { get; init; } = "";

    /// <summary>Lower case without blanks and underscores, micro signs as u, ohm signs as ohm.</summary>
    public static string Squeeze(string unit)
    {
        var text = new StringBuilder(unit.Length);
        foreach (char c in unit)
        {
            switch (c)
            {
                case '\u00B5' or '\u03BC':
                    text.Append('u');
                    break;
                case '\u03A9' or '\u2126':
                    text.Append("ohm");
                    break;
                case '_' or ' ' or '\t' or '\u00A0':
                    break;
                default:
                    text.Append(char.ToLowerInvariant(c));
                    break;
            }
        }

        return text.ToString();
    }

    public static UnitText? Parse(string unit)
    {
        if (unit.Length is 0 or > 32)
            return null;
        string text = Squeeze(unit);
        return Frequency(unit.Trim(), text) ?? Plain(unit.Trim(), text) ?? Voltage(unit) ?? TransferUnit.Parse(unit);
    }

    private static UnitText? Frequency(string unit, string text) => text switch
    {
        "hz" or "hertz" or "cps" => new("Hz", UnitFamily.Frequency),
        "uhz" or "microhertz" => new("uHz", UnitFamily.Frequency, Divide: 1e6),
        // Some write megahertz so.
        "mhz" when unit == "mHz" => new("mHz", UnitFamily.Frequency, Divide: 1e3) { Asked = ["mHz", "MHz"], Stated = unit },
        "millihz" or "millihertz" => new("mHz", UnitFamily.Frequency, Divide: 1e3),
        "khz" or "kilohertz" => new("kHz", UnitFamily.Frequency, 1e3),
        "mhz" or "megahertz" => new("MHz", UnitFamily.Frequency, 1e6),
        "ghz" or "gigahertz" => new("GHz", UnitFamily.Frequency, 1e9),
        "thz" or "terahertz" => new("THz", UnitFamily.Frequency, 1e12),
        "rad/s" or "rad/sec" or "rads" or "rad/sekunde" or "radpersec" or "radians/s" or "radpers" => new("rad/s", UnitFamily.Frequency, Divide: 2 * Math.PI),
        "krad/s" or "krad/sec" or "krads" => new("krad/s", UnitFamily.Frequency, 1e3, 2 * Math.PI),
        "mrad/s" or "mrad/sec" => unit.StartsWith('M')
            ? new("Mrad/s", UnitFamily.Frequency, 1e6, 2 * Math.PI)
            : new("mrad/s", UnitFamily.Frequency, Divide: 2e3 * Math.PI),
        _ => null,
    };

    private static UnitText? Plain(string unit, string text) => text switch
    {
        "db" or "decibel" or "dezibel" or "db20" => new("dB", UnitFamily.Decibel),
        "np" or "neper" => new("Np", UnitFamily.Decibel, DecibelsPerNeper),
        "dbr" or "dbc" or "dbrel" => new("dB", UnitFamily.Decibel) { Asked = ["dB"], Stated = unit },
        "deg" or "degree" or "degrees" or "grad" or "\u00B0" or "altgrad" or "deg." => new("deg", UnitFamily.Angle),
        "rad" or "radian" or "radians" or "radiant" or "bogenma\u00DF" => new("rad", UnitFamily.Angle, 180, Math.PI),
        "mrad" when unit[0] == 'm' => new("mrad", UnitFamily.Angle, 180, 1e3 * Math.PI),
        "ratio" or "1" or "lin" or "linear" or "abs" or "v/v" or "a/a" or "verh\u00E4ltnis" or "u/u" or "-" => new("ratio", UnitFamily.Ratio),
        "%" or "percent" or "prozent" => new("%", UnitFamily.Ratio, Divide: 100),
        "ppm" => new("ppm", UnitFamily.Ratio, Divide: 1e6) { Asked = ["ppm"], Stated = unit },
        _ => null,
    };

    private static UnitText? Voltage(string unit)
    {
        if (!AmplitudeUnit.TryParse(unit, out AmplitudeUnit? amplitude))
            return null;
        if (amplitude!.IsLevel)
            return new(amplitude.Name, UnitFamily.VoltageLevel);
        bool large = amplitude.Volts >= 1;
        var found = new UnitText(amplitude.Name, UnitFamily.Voltage, large ? amplitude.Volts : 1, large ? 1 : Math.Round(1 / amplitude.Volts));
        // Displays without small letters write millivolts so.
        return amplitude.Name[0] == 'M' ? found with { Asked = ["m" + amplitude.Name[1..], amplitude.Name], Stated = unit.Trim() } : found;
    }
}

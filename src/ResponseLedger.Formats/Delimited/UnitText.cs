using System.Globalization;
using System.Text;

namespace ResponseLedger.Formats.Delimited;

/// <summary>What a unit measures, as far as a column is concerned.</summary>
internal enum UnitFamily
{
    None,
    Frequency,
    Decibel,
    Ratio,
    Voltage,
    VoltageLevel,
    Angle,
}

/// <summary>A unit as it stands in a head, in a row of units, or in choices.</summary>
/// <param name="Name">Its canonical name.</param>
/// <param name="Family">What it measures.</param>
/// <param name="Multiply">Factor to the base unit (Hz, ratio, degree).</param>
/// <param name="Divide">Divisor to the base unit: kept apart so that 1 mHz is 1/1000 Hz, correctly rounded.</param>
/// <param name="MayBeMega">Whether it is written as mHz, which some write for megahertz.</param>
internal sealed record UnitText(string Name, UnitFamily Family, double Multiply = 1, double Divide = 1, bool MayBeMega = false)
{
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
        UnitText? plain = text switch
        {
            "hz" or "hertz" or "cps" => new("Hz", UnitFamily.Frequency),
            "mhz" => unit.Trim() == "mHz"
                ? new("mHz", UnitFamily.Frequency, Divide: 1e3, MayBeMega: true)
                : new("MHz", UnitFamily.Frequency, 1e6),
            "millihz" or "millihertz" => new("mHz", UnitFamily.Frequency, Divide: 1e3),
            "khz" or "kilohertz" => new("kHz", UnitFamily.Frequency, 1e3),
            "megahertz" => new("MHz", UnitFamily.Frequency, 1e6),
            "ghz" or "gigahertz" => new("GHz", UnitFamily.Frequency, 1e9),
            "rad/s" or "rad/sec" or "rads" or "rad/sekunde" or "radpersec" or "radians/s" or "radpers" => new("rad/s", UnitFamily.Frequency, Divide: 2 * Math.PI),
            "db" or "decibel" or "dezibel" => new("dB", UnitFamily.Decibel),
            "deg" or "degree" or "degrees" or "grad" or "\u00B0" or "altgrad" or "deg." => new("deg", UnitFamily.Angle),
            "rad" or "radian" or "radians" or "radiant" or "bogenma\u00DF" => new("rad", UnitFamily.Angle, 180, Math.PI),
            "ratio" or "1" or "lin" or "linear" or "abs" or "v/v" or "a/a" or "verh\u00E4ltnis" or "u/u" or "-" => new("ratio", UnitFamily.Ratio),
            "%" or "percent" or "prozent" => new("%", UnitFamily.Ratio, Divide: 100),
            _ => null,
        };
        if (plain is not null)
            return plain;
        if (AmplitudeUnit.TryParse(unit, out AmplitudeUnit? amplitude))
        {
            return amplitude!.IsLevel
                ? new(amplitude.Name, UnitFamily.VoltageLevel)
                : new(amplitude.Name, UnitFamily.Voltage, amplitude.Volts >= 1 ? amplitude.Volts : 1, amplitude.Volts >= 1 ? 1 : Math.Round(1 / amplitude.Volts));
        }

        // In lower case mega and milli are one; a capital M is therefore not taken for either.
        return unit.Contains('M', StringComparison.Ordinal) ? null : Transfer(text);
    }

    // Gains with a unit: ohm, S, and quotients such as mV/Pa; the prefixes are taken out, the base units stay.
    private static UnitText? Transfer(string text)
    {
        int slash = text.IndexOf('/', StringComparison.Ordinal);
        if (slash < 0)
        {
            return Prefixed(text) is ("ohm" or "siemens", var scale) single
                ? new(text, UnitFamily.Ratio, Up(scale), Down(scale))
                : null;
        }

        if (Prefixed(text[..slash]) is not (string over, var overPower) || Prefixed(text[(slash + 1)..]) is not (string under, var underPower))
            return null;
        int power = overPower - underPower;
        return new(over + "/" + under is var name && power == 0 ? name : text, UnitFamily.Ratio, Up(power), Down(power));
    }

    private static double Up(int power) => power > 0 ? double.Parse("1e" + power.ToString(CultureInfo.InvariantCulture), CultureInfo.InvariantCulture) : 1;

    private static double Down(int power) => power < 0 ? double.Parse("1e" + (-power).ToString(CultureInfo.InvariantCulture), CultureInfo.InvariantCulture) : 1;

    private static (string Base, int Power)? Prefixed(string text)
    {
        foreach (string known in (ReadOnlySpan<string>)["v", "pa", "a", "ohm", "siemens", "n", "m/s", "m", "g", "w", "c", "t"])
        {
            if (!text.EndsWith(known, StringComparison.Ordinal))
                continue;
            int? power = text[..^known.Length] switch { "" => 0, "m" => -3, "u" => -6, "n" => -9, "p" => -12, "k" => 3, _ => null };
            if (power is not null)
                return (known, power.Value);
        }

        return null;
    }
}

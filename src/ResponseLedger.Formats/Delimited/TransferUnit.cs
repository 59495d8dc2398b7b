using System.Globalization;

namespace ResponseLedger.Formats.Delimited;

/// <summary>Units of a gain that is no plain ratio: ohm, S, and quotients such as mV/Pa; a quotient of powers is W/W.</summary>
internal static class TransferUnit
{
    // How a base is written in heads, in small letters, and its canonical name; the longer one first where one ends in the other.
    private static readonly (string Written, string Name)[] Bases =
    [
        ("v", "V"), ("pa", "Pa"), ("a", "A"), ("ohms", "ohm"), ("ohm", "ohm"), ("siemens", "S"), ("n", "N"), ("m/s", "m/s"), ("m", "m"), ("g", "g"), ("w", "W"), ("c", "C"), ("t", "T"), ("s", "S"),
    ];

    /// <summary>A base unit with its power of ten.</summary>
    /// <param name="Prefix">The prefix as it is written.</param>
    /// <param name="Base">The base.</param>
    /// <param name="Power">The power of ten.</param>
    /// <param name="IsDoubtful">Whether a capital M may as well be meant as milli.</param>
    private readonly record struct Part(string Prefix, string Base, int Power, bool IsDoubtful);

    public static UnitText? Parse(string unit)
    {
        string text = Plain(unit);
        int slash = text.IndexOf('/', StringComparison.Ordinal);
        return slash < 0 ? Single(text, unit) : Quotient(text[..slash], text[(slash + 1)..], unit);
    }

    private static UnitText? Single(string text, string unit)
    {
        if (Read(text) is not { Base: "ohm" or "S" } part)
            return null;
        UnitText found = Scaled(part.Prefix + part.Base, UnitFamily.Ratio, part.Power);
        return part.IsDoubtful ? found with { Asked = ["m" + part.Base, "M" + part.Base], Stated = unit.Trim() } : found;
    }

    private static UnitText? Quotient(string over, string under, string unit)
    {
        if (Rms(over, under) is { } volts)
            return volts;
        if (Read(over) is not { } top || Read(under) is not { } bottom)
            return null;
        int power = top.Power - bottom.Power;
        bool same = top.Base == bottom.Base;
        UnitFamily family = same && top.Base == "W" ? UnitFamily.PowerRatio : UnitFamily.Ratio;
        bool bare = power == 0 && !top.IsDoubtful && !bottom.IsDoubtful;
        string name = bare ? Name(top.Base, bottom.Base) : Name(top.Prefix + top.Base, bottom.Prefix + bottom.Base);
        UnitText found = Scaled(name, family, power);
        if (!top.IsDoubtful && !bottom.IsDoubtful)
            return found;
        // Both doubtful, as in MV/MV, are the same prefix twice.
        string[] asked = top.IsDoubtful && bottom.IsDoubtful ? [Name(top.Base, bottom.Base)]
            : top.IsDoubtful ? [Name("m" + top.Base, bottom.Prefix + bottom.Base), name]
            : [Name(top.Prefix + top.Base, "m" + bottom.Base), name];
        return found with { Asked = asked, Stated = unit.Trim() };
    }

    private static string Name(string over, string under) => over == under && over is "V" or "A" ? "ratio" : over + "/" + under;

    // "Vrms/Vrms": one convention on both sides cancels.
    private static UnitText? Rms(string over, string under)
    {
        if (!AmplitudeUnit.TryParse(over, out AmplitudeUnit? top) || !AmplitudeUnit.TryParse(under, out AmplitudeUnit? bottom)
            || top!.IsLevel || bottom!.IsLevel || top.Convention == Convention.Unstated || top.Convention != bottom.Convention)
        {
            return null;
        }

        return top.Volts == bottom.Volts ? new UnitText("ratio", UnitFamily.Ratio) : null;
    }

    private static UnitText Scaled(string name, UnitFamily family, int power) => new(name, family, PowerOfTen(power), PowerOfTen(-power));

    private static double PowerOfTen(int power)
        => power > 0 ? double.Parse("1e" + power.ToString(CultureInfo.InvariantCulture), CultureInfo.InvariantCulture) : 1;

    private static Part? Read(string text)
    {
        foreach ((string written, string name) in Bases)
        {
            if (!text.EndsWith(written, StringComparison.OrdinalIgnoreCase) || (written == "s" && text[^1] != 'S'))
                continue;
            string prefix = text[..^written.Length];
            // "Ohm" and "Pa" have small letters, so that the capital before them is meant; a V or A has none to tell.
            bool capitals = !text.AsSpan(prefix.Length).ContainsAnyInRange('a', 'z');
            (string Prefix, int Power)? known = prefix switch
            {
                "" => ("", 0),
                "m" => ("m", -3),
                "M" => ("M", 6),
                "u" or "U" => ("u", -6),
                "n" or "N" => ("n", -9),
                "p" or "P" => ("p", -12),
                "k" or "K" => ("k", 3),
                "G" => ("G", 9),
                _ => null,
            };
            if (known is { } found)
                return new Part(found.Prefix, name, found.Power, found.Power == 6 && capitals);
        }

        return null;
    }

    // Blanks and underscores go, micro and ohm signs are written out; capitals stay, because they tell mega from milli.
    private static string Plain(string unit)
        => string.Concat(unit.Where(c => c is not ('_' or ' ' or '\t' or '\u00A0')))
            .Replace('\u00B5', 'u').Replace('\u03BC', 'u')
            .Replace("\u03A9", "ohm", StringComparison.Ordinal).Replace("\u2126", "ohm", StringComparison.Ordinal);
}

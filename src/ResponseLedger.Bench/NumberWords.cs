using System.Globalization;

namespace ResponseLedger.Bench;

/// <summary>Numbers as people read them.</summary>
internal static class NumberWords
{
    /// <summary>A frequency with a unit that keeps it short, such as "1.25 kHz".</summary>
    public static string Frequency(double frequencyHz)
    {
        var (divisor, unit) = frequencyHz switch
        {
            >= 1e9 => (1e9, "GHz"),
            >= 1e6 => (1e6, "MHz"),
            >= 1e3 => (1e3, "kHz"),
            _ => (1.0, "Hz"),
        };
        return $"{Short(frequencyHz / divisor)} {unit}";
    }

    /// <summary>Four significant digits, which is more than a bench measures.</summary>
    public static string Short(double value) => value.ToString("G4", CultureInfo.InvariantCulture);
}

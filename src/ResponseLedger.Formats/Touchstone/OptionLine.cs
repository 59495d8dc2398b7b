using System.Globalization;
using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Formats.Touchstone;

/// <summary>The option line: frequency unit, parameter, format and reference resistance, in any order; GHz, S, MA, 50 ohm where left out.</summary>
/// <param name="HzPerUnit">Hertz a frequency unit.</param>
/// <param name="Unit">The frequency unit's name.</param>
/// <param name="Parameter">S, Y, Z, H or G.</param>
/// <param name="Form">The pair that the format names.</param>
/// <param name="ReferenceOhm">Reference resistance in ohm.</param>
/// <param name="NamesNetwork">Whether it says more than units: a parameter, a resistance, RI or MA.</param>
internal sealed record OptionLine(double HzPerUnit, string Unit, char Parameter, SweepForm Form, double ReferenceOhm, bool NamesNetwork)
{
    private const int LongestLine = 1024;

    /// <summary>Reads what stands after the #.</summary>
    /// <param name="text">The line after its #, without its comment.</param>
    /// <param name="problem">What is wrong with it; null when it was read.</param>
    public static OptionLine? Parse(ReadOnlySpan<char> text, out string? problem)
    {
        var option = new OptionLine(1e9, "GHz", 'S', SweepForm.RatioPhase, 50, false);
        problem = null;
        if (text.Length > LongestLine)
        {
            problem = $"The option line has more than {LongestLine} characters; write for example # Hz S RI R 50.";
            return null;
        }

        string[] words = text.ToString().Split((char[]?)null, StringSplitOptions.RemoveEmptyEntries);
        for (int i = 0; i < words.Length; i++)
        {
            string word = words[i].ToUpperInvariant();
            switch (word)
            {
                case "HZ":
                    option = option with { HzPerUnit = 1, Unit = "Hz" };
                    break;
                case "KHZ":
                    option = option with { HzPerUnit = 1e3, Unit = "kHz" };
                    break;
                case "MHZ":
                    option = option with { HzPerUnit = 1e6, Unit = "MHz" };
                    break;
                case "GHZ":
                    option = option with { HzPerUnit = 1e9, Unit = "GHz" };
                    break;
                case "S" or "Y" or "Z" or "H" or "G":
                    option = option with { Parameter = word[0], NamesNetwork = true };
                    break;
                case "RI":
                    option = option with { Form = SweepForm.RealImaginary, NamesNetwork = true };
                    break;
                case "MA":
                    option = option with { Form = SweepForm.RatioPhase, NamesNetwork = true };
                    break;
                case "DB":
                    option = option with { Form = SweepForm.LevelPhase };
                    break;
                case "R" when i + 1 < words.Length && double.TryParse(words[i + 1], NumberStyles.Float, CultureInfo.InvariantCulture, out double ohm) && double.IsFinite(ohm) && ohm > 0:
                    option = option with { ReferenceOhm = ohm, NamesNetwork = true };
                    i++;
                    break;
                case "R":
                    problem = "The option line names R without a positive resistance; write for example R 50.";
                    return null;
                default:
                    string shown = words[i].Length <= 20 ? words[i] : words[i][..20] + "...";
                    problem = $"\"{shown}\" on the option line is unknown; known are Hz, kHz, MHz, GHz, S, Y, Z, H, G, RI, MA, DB and R with a resistance.";
                    return null;
            }
        }

        return option;
    }
}

namespace ResponseLedger.Formats.Delimited;

/// <summary>How an alternating voltage is counted.</summary>
internal enum Convention
{
    Unstated,
    Rms,
    Peak,
    PeakToPeak,
}

/// <summary>The unit of an amplitude column: a voltage with its convention, or a level over a reference voltage.</summary>
/// <param name="Name">Its canonical name, such as <c>mV rms</c> or <c>dBV</c>.</param>
/// <param name="Volts">Linear units: volts a unit.</param>
/// <param name="Convention">Linear units: rms, peak or peak-to-peak, where stated.</param>
/// <param name="ReferenceDbv">Levels: the reference in dB re 1 V rms; NaN for dB and dBm, whose reference is not a known voltage. Null for linear units.</param>
internal sealed record AmplitudeUnit(string Name, double Volts, Convention Convention, double? ReferenceDbv)
{
    private static readonly (string Prefix, string Name, double Volts)[] Voltages =
        [("volts", "V", 1), ("volt", "V", 1), ("mv", "mV", 1e-3), ("uv", "uV", 1e-6), ("nv", "nV", 1e-9), ("pv", "pV", 1e-12), ("kv", "kV", 1e3), ("v", "V", 1)];

    public bool IsLevel => ReferenceDbv is not null;

    public static bool TryParse(string unit, out AmplitudeUnit? amplitude)
    {
        amplitude = null;
        string text = UnitText.Squeeze(unit);
        if (text.Length == 0)
            text = "v";
        double? reference = text switch
        {
            "dbv" or "dbvrms" => 0,
            // 0 dBu is the voltage that gives 1 mW in 600 ohm: sqrt(0.6) V.
            "dbu" => 10 * Math.Log10(0.6),
            "dbmv" => -60,
            "dbuv" => -120,
            "db" or "dbm" or "dbfs" => double.NaN,
            _ => null,
        };
        if (reference is not null)
        {
            string name = text switch { "dbv" or "dbvrms" => "dBV", "dbmv" => "dBmV", "dbuv" => "dBuV", "dbfs" => "dBFS", "db" => "dB", "dbm" => "dBm", _ => "dBu" };
            amplitude = new AmplitudeUnit(name, 1, Convention.Rms, reference);
            return true;
        }

        foreach ((string prefix, string name, double volts) in Voltages)
        {
            if (!text.StartsWith(prefix, StringComparison.Ordinal))
                continue;
            Convention? convention = ConventionOf(text[prefix.Length..]);
            if (convention is null)
                continue;
            bool mega = prefix == "mv" && unit.AsSpan().TrimStart().StartsWith("M", StringComparison.Ordinal);
            string suffix = convention switch { Convention.Rms => " rms", Convention.Peak => " peak", Convention.PeakToPeak => " pp", _ => "" };
            amplitude = new AmplitudeUnit((mega ? "MV" : name) + suffix, mega ? 1e6 : volts, convention.Value, null);
            return true;
        }

        return false;
    }

    private static Convention? ConventionOf(string suffix) => suffix switch
    {
        "" or "ac" => Convention.Unstated,
        "rms" or "eff" or "effektiv" => Convention.Rms,
        "p" or "pk" or "peak" or "s" or "spitze" or "scheitel" or "0p" or "amplitude" => Convention.Peak,
        "pp" or "p-p" or "pkpk" or "pk-pk" or "ptp" or "ss" => Convention.PeakToPeak,
        _ => null,
    };

    /// <summary>Whether a ratio of the two says something without guessing.</summary>
    public static bool AreComparable(AmplitudeUnit input, AmplitudeUnit output)
    {
        if (input.IsLevel && output.IsLevel)
            return input.Name == output.Name || (double.IsFinite(input.ReferenceDbv!.Value) && double.IsFinite(output.ReferenceDbv!.Value));
        if (input.IsLevel || output.IsLevel)
        {
            (AmplitudeUnit level, AmplitudeUnit linear) = input.IsLevel ? (input, output) : (output, input);
            return double.IsFinite(level.ReferenceDbv!.Value) && linear.Convention != Convention.Unstated;
        }

        return (input.Convention == Convention.Unstated) == (output.Convention == Convention.Unstated);
    }

    /// <summary>Volts rms a unit; an unstated convention counts as rms, which cancels in a comparable pair.</summary>
    public double RmsVolts => Convention switch
    {
        Convention.Peak => Volts / Math.Sqrt(2),
        Convention.PeakToPeak => Volts / (2 * Math.Sqrt(2)),
        _ => Volts,
    };
}

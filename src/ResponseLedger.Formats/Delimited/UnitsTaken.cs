namespace ResponseLedger.Formats.Delimited;

/// <summary>Quantities and their units in the words of sentences.</summary>
internal static class UnitsTaken
{
    public static string Words(ColumnQuantity quantity) => quantity switch
    {
        ColumnQuantity.Frequency => "frequency",
        ColumnQuantity.GainDb => "gain",
        ColumnQuantity.AttenuationDb => "attenuation",
        ColumnQuantity.Magnitude => "magnitude",
        ColumnQuantity.InverseMagnitude => "inverse of the magnitude (input over output)",
        ColumnQuantity.Real => "real part",
        ColumnQuantity.Imaginary => "imaginary part",
        ColumnQuantity.Phase => "phase of output minus input",
        ColumnQuantity.PhaseLag => "phase of input minus output",
        ColumnQuantity.InputAmplitude => "input amplitude",
        ColumnQuantity.OutputAmplitude => "output amplitude",
        ColumnQuantity.InputPhase => "input phase",
        ColumnQuantity.OutputPhase => "output phase",
        _ => "column left aside",
    };

    public static string Of(ColumnQuantity quantity) => quantity switch
    {
        ColumnQuantity.Frequency => "Hz, mHz, kHz, MHz, GHz, THz, rad/s and krad/s",
        ColumnQuantity.GainDb or ColumnQuantity.AttenuationDb => "dB and Np",
        ColumnQuantity.Magnitude or ColumnQuantity.InverseMagnitude => "ratio, %, ppm, ohm, S, quotients such as mV/Pa, W/W for powers, and V, mV, uV, nV for a drive of 1 V",
        ColumnQuantity.Real or ColumnQuantity.Imaginary => "ratio, %, ohm, S, quotients such as mV/Pa, and V, mV, uV, nV for a drive of 1 V",
        ColumnQuantity.InputAmplitude or ColumnQuantity.OutputAmplitude => "V, kV, mV, uV, nV, pV (each also rms, peak or pp), dBV, dBu, dBmV, dBuV, dBm and dB",
        ColumnQuantity.Ignore => "none",
        _ => "deg, rad and mrad",
    };
}

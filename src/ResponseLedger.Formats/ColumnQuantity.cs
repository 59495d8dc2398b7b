namespace ResponseLedger.Formats;

/// <summary>What a column of a delimited file holds.</summary>
public enum ColumnQuantity
{
    /// <summary>Nothing that the sweep needs.</summary>
    Ignore = 0,

    /// <summary>Frequency: Hz, mHz, kHz, MHz, GHz or rad/s.</summary>
    Frequency = 1,

    /// <summary>Level of the gain: dB.</summary>
    GainDb = 2,

    /// <summary>Level of the gain with the opposite sign: dB.</summary>
    AttenuationDb = 3,

    /// <summary>Magnitude of the gain, zero or more: ratio, %, or a unit such as V/V, mV/Pa, ohm; V, mV, uV are taken as gain for a drive of 1 V.</summary>
    Magnitude = 4,

    /// <summary>Real part of the gain: the units of a magnitude.</summary>
    Real = 5,

    /// <summary>Imaginary part of the gain: the units of a magnitude.</summary>
    Imaginary = 6,

    /// <summary>Phase of the output minus phase of the input: deg or rad.</summary>
    Phase = 7,

    /// <summary>Amplitude at the input (channel 1): V, mV, uV, each also with rms, peak or pp; dBV, dBu, dBmV, dBuV, dBm.</summary>
    InputAmplitude = 8,

    /// <summary>Amplitude at the output (channel 2), units as for the input.</summary>
    OutputAmplitude = 9,

    /// <summary>Phase of the input: deg or rad.</summary>
    InputPhase = 10,

    /// <summary>Phase of the output: deg or rad.</summary>
    OutputPhase = 11,
}

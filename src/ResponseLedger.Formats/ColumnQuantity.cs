namespace ResponseLedger.Formats;

/// <summary>What a column of a delimited file holds.</summary>
public enum ColumnQuantity
{
    /// <summary>Nothing that the sweep needs.</summary>
    Ignore = 0,

    /// <summary>Frequency: Hz, uHz, mHz, kHz, MHz, GHz, THz, rad/s, mrad/s, krad/s or Mrad/s.</summary>
    Frequency = 1,

    /// <summary>Level of the gain: dB or Np.</summary>
    GainDb = 2,

    /// <summary>Level of the gain with the opposite sign: dB or Np.</summary>
    AttenuationDb = 3,

    /// <summary>Magnitude of the gain, zero or more: ratio, %, ppm, or a unit such as V/V, mV/Pa, ohm, S; V, mV, uV are taken as gain for a drive of 1 V; of W/W the square root is the gain.</summary>
    Magnitude = 4,

    /// <summary>Real part of the gain: the units of a magnitude without W/W.</summary>
    Real = 5,

    /// <summary>Imaginary part of the gain: the units of a real part.</summary>
    Imaginary = 6,

    /// <summary>Phase of the output minus phase of the input: deg, mrad or rad.</summary>
    Phase = 7,

    /// <summary>Amplitude at the input (channel 1): V, kV, MV, mV, uV, nV, pV, each also with rms, peak or pp; dBV, dBu, dBmV, dBuV, dBm.</summary>
    InputAmplitude = 8,

    /// <summary>Amplitude at the output (channel 2), units as for the input.</summary>
    OutputAmplitude = 9,

    /// <summary>Phase of the input: deg, mrad or rad.</summary>
    InputPhase = 10,

    /// <summary>Phase of the output: deg, mrad or rad.</summary>
    OutputPhase = 11,

    /// <summary>Phase of the input minus phase of the output, a lag being positive: deg, mrad or rad.</summary>
    PhaseLag = 12,

    /// <summary>Input over output, greater than zero: the units of a magnitude, of the quotient as it stands.</summary>
    InverseMagnitude = 13,
}

namespace ResponseLedger.Formats.Delimited;

/// <summary>What the words of a head say together.</summary>
[Flags]
internal enum Said
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
    Power = 2048,
    Lag = 4096,

    /// <summary>Something that no sweep needs.</summary>
    Other = 8192,
}

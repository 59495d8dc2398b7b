namespace ResponseLedger.Engine.Sweeps;

/// <summary>The pair of quantities in which a sweep came, and in which it is kept, so that nothing is lost by conversion.</summary>
public enum SweepForm
{
    /// <summary>Real and imaginary part of the gain.</summary>
    RealImaginary = 1,

    /// <summary>Level in dB and phase in degrees.</summary>
    LevelPhase = 2,

    /// <summary>Magnitude as a ratio, zero or more, and phase in degrees.</summary>
    RatioPhase = 3,

    /// <summary>Level in dB alone; everything about phase is absent.</summary>
    Level = 4,

    /// <summary>Magnitude as a ratio alone; everything about phase is absent.</summary>
    Ratio = 5,
}

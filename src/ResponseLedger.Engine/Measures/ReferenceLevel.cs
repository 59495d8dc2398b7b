namespace ResponseLedger.Engine.Measures;

/// <summary>What a level is referred to: the peak of the run, its level at a frequency, or its mean over a band.</summary>
public abstract record ReferenceLevel
{
    private ReferenceLevel()
    {
    }

    /// <summary>The highest level of the run.</summary>
    public sealed record Peak : ReferenceLevel;

    /// <summary>The level at a stated frequency.</summary>
    /// <param name="FrequencyHz">In Hz, positive.</param>
    public sealed record AtFrequency(double FrequencyHz) : ReferenceLevel;

    /// <summary>The mean of the level over log f between two frequencies.</summary>
    /// <param name="FromHz">Lower edge in Hz, positive.</param>
    /// <param name="ToHz">Upper edge in Hz, above the lower.</param>
    public sealed record Band(double FromHz, double ToHz) : ReferenceLevel;
}

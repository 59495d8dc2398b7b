namespace ResponseLedger.Engine.Sweeps;

/// <summary>
/// One measured frequency response: at least two points, frequencies in Hz, positive and strictly ascending.
/// Immutable; level and unwrapped phase are computed once.
/// </summary>
public sealed class Sweep
{
    private Sweep(SweepForm form, double[] frequencyHz, double[] first, double[]? second)
    {
        Form = form;
        this.frequencyHz = frequencyHz;
        this.first = first;
        this.second = second;
    }

    private readonly double[] frequencyHz;
    private readonly double[] first;
    private readonly double[]? second;

    /// <summary>The pair of quantities that is kept.</summary>
    public SweepForm Form { get; }

    /// <summary>Number of points, 2 or more.</summary>
    public int Count => frequencyHz.Length;

    /// <summary>Frequencies in Hz, positive and strictly ascending.</summary>
    public ReadOnlySpan<double> FrequencyHz => frequencyHz;

    /// <summary>The first kept quantity as it came: real part, level in dB or ratio, by <see cref="Form"/>.</summary>
    public ReadOnlySpan<double> FirstPlane => first;

    /// <summary>The second kept quantity as it came: imaginary part or phase in degrees; empty for magnitude-only sweeps.</summary>
    public ReadOnlySpan<double> SecondPlane => second;

    /// <summary>Whether the sweep carries phase at all.</summary>
    public bool HasPhase => second is not null;

    /// <summary>Makes a sweep of planes in the stated form.</summary>
    /// <param name="form">What the planes hold.</param>
    /// <param name="frequencyHz">Frequencies in Hz: positive, finite, strictly ascending, 2 or more.</param>
    /// <param name="first">Real part, level in dB (finite or negative infinity), or ratio (zero or more).</param>
    /// <param name="second">Imaginary part or phase in degrees; empty for <see cref="SweepForm.Level"/> and <see cref="SweepForm.Ratio"/>.</param>
    /// <exception cref="ArgumentException">A plane has another length, or a value is out of its range.</exception>
    public static Sweep Create(SweepForm form, ReadOnlySpan<double> frequencyHz, ReadOnlySpan<double> first, ReadOnlySpan<double> second)
        => new(form, frequencyHz.ToArray(), first.ToArray(), second.IsEmpty ? null : second.ToArray());

    /// <summary>Level 20 log10 |H| in dB at each point; negative infinity where the gain is exactly zero.</summary>
    public ReadOnlySpan<double> GainDb => throw new NotImplementedException();

    /// <summary>Unwrapped phase in degrees at each point, the first in (-180, 180]; empty when phase is absent.</summary>
    public ReadOnlySpan<double> PhaseDeg => throw new NotImplementedException();
}

namespace ResponseLedger.Engine.Sweeps;

/// <summary>
/// One measured frequency response: at least two points, frequencies in Hz, positive and strictly ascending.
/// Immutable and safe to share between threads; level, unwrapped phase and delay are computed once, when first asked for.
/// </summary>
public sealed partial class Sweep
{
    private readonly Lock computing = new();
    private readonly double[] frequencyHz;
    private readonly double[] first;
    private readonly double[]? second;
    private double[]? gainDb;
    private PhasePlane? phase;
    private double[]? delaySeconds;

    private Sweep(SweepForm form, double[] frequencyHz, double[] first, double[]? second, double nominalDelaySeconds, double? phaseFloorDb)
    {
        Form = form;
        this.frequencyHz = frequencyHz;
        this.first = first;
        this.second = second;
        NominalDelaySeconds = nominalDelaySeconds;
        PhaseFloorDb = phaseFloorDb;
    }

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

    /// <summary>The delay in seconds that is taken out before turns are counted and put back after; 0 unless stated.</summary>
    public double NominalDelaySeconds { get; }

    /// <summary>The level in dB under which phase is absent (the bench's noise floor); null where none is stated.</summary>
    public double? PhaseFloorDb { get; }

    /// <summary>Makes a sweep of planes in the stated form; the planes are copied and kept verbatim.</summary>
    /// <param name="form">What the planes hold.</param>
    /// <param name="frequencyHz">Frequencies in Hz: positive, finite, strictly ascending, 2 or more.</param>
    /// <param name="first">Real part, level in dB (finite or negative infinity), or ratio (zero or more).</param>
    /// <param name="second">Imaginary part or phase in degrees, finite; empty for <see cref="SweepForm.Level"/> and <see cref="SweepForm.Ratio"/>.</param>
    /// <param name="nominalDelaySeconds">A known delay that unwrapping takes out and puts back; finite.</param>
    /// <param name="phaseFloorDb">A noise floor in dB under which phase is absent; null for none.</param>
    /// <exception cref="ArgumentException">A plane has another length, or a value is out of its range.</exception>
    public static Sweep Create(
        SweepForm form,
        ReadOnlySpan<double> frequencyHz,
        ReadOnlySpan<double> first,
        ReadOnlySpan<double> second,
        double nominalDelaySeconds = 0,
        double? phaseFloorDb = null)
    {
        Preconditions.Require(Enum.IsDefined(form), nameof(form), $"{(int)form} is not a form of a sweep.");
        Preconditions.RequireAscendingFrequencies(frequencyHz, nameof(frequencyHz));
        Preconditions.RequireSameCount(first.Length, frequencyHz.Length, nameof(first));
        bool hasPhase = form is SweepForm.RealImaginary or SweepForm.LevelPhase or SweepForm.RatioPhase;
        Preconditions.RequireSameCount(second.Length, hasPhase ? frequencyHz.Length : 0, nameof(second));
        switch (form)
        {
            case SweepForm.RealImaginary:
                Preconditions.RequireFinite(first, nameof(first));
                break;
            case SweepForm.LevelPhase or SweepForm.Level:
                Preconditions.RequireLevels(first, nameof(first));
                break;
            default:
                Preconditions.RequireRatios(first, nameof(first));
                break;
        }

        Preconditions.RequireFinite(second, nameof(second));
        Preconditions.Require(double.IsFinite(nominalDelaySeconds), nameof(nominalDelaySeconds), "The nominal delay must be finite.");
        Preconditions.Require(phaseFloorDb is null || double.IsFinite(phaseFloorDb.Value), nameof(phaseFloorDb), "The noise floor must be finite.");
        return new Sweep(form, frequencyHz.ToArray(), first.ToArray(), hasPhase ? second.ToArray() : null, nominalDelaySeconds, phaseFloorDb);
    }

    /// <summary>Level 20 log10 |H| in dB at each point; negative infinity where the gain is exactly zero.</summary>
    public ReadOnlySpan<double> GainDb => LevelPlane();

    /// <summary>
    /// Unwrapped phase in degrees at each point, the first that has one in (-180, 180]; empty when the sweep carries no phase.
    /// NaN at points without phase: where the gain is exactly zero, or under <see cref="PhaseFloorDb"/>.
    /// </summary>
    public ReadOnlySpan<double> PhaseDeg => HasPhase ? Phase().Deg : default;

    /// <summary>Steps of the unwrapped phase over 120 degrees, ascending; empty when there is none or no phase.</summary>
    public ReadOnlySpan<SuspectStep> SuspectSteps => HasPhase ? Phase().SuspectSteps : default;

    /// <summary>Group delay in seconds at each point by the three-point derivative; NaN where it is absent; empty when the sweep carries no phase.</summary>
    public ReadOnlySpan<double> DelaySeconds
    {
        get
        {
            if (!HasPhase)
                return default;
            if (Volatile.Read(ref delaySeconds) is { } known)
                return known;
            var phaseDeg = Phase().Deg;
            lock (computing)
            {
                delaySeconds ??= GroupDelay.AtPoints(frequencyHz, phaseDeg);
                return delaySeconds;
            }
        }
    }

    private double[] LevelPlane()
    {
        if (Form is SweepForm.Level or SweepForm.LevelPhase)
            return first;
        if (Volatile.Read(ref gainDb) is { } known)
            return known;
        lock (computing)
            return gainDb ??= ComputeGainDb();
    }

    private PhasePlane Phase()
    {
        if (Volatile.Read(ref phase) is { } known)
            return known;
        var level = LevelPlane();
        lock (computing)
            return phase ??= ComputePhase(level);
    }

    private double[] ComputeGainDb()
    {
        var level = new double[Count];
        for (int i = 0; i < level.Length; i++)
            level[i] = Form == SweepForm.RealImaginary ? Gain.LevelDb(first[i], second![i]) : Gain.LevelDb(first[i]);
        return level;
    }

    private PhasePlane ComputePhase(double[] level)
    {
        var deg = new double[Count];
        for (int i = 0; i < deg.Length; i++)
        {
            bool absent = double.IsNegativeInfinity(level[i]) || level[i] < PhaseFloorDb;
            deg[i] = absent ? double.NaN
                : Form == SweepForm.RealImaginary ? Gain.PhaseDeg(first[i], second![i])
                : second![i];
        }

        var suspects = Unwrapping.Unwrap(frequencyHz, deg, NominalDelaySeconds);
        return new PhasePlane(deg, suspects);
    }

    private sealed record PhasePlane(double[] Deg, SuspectStep[] SuspectSteps);
}

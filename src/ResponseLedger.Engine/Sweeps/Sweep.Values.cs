namespace ResponseLedger.Engine.Sweeps;

/// <summary>Values of the sweep between its points, in complex form, and sweeps derived from it.</summary>
public sealed partial class Sweep
{
    /// <summary>Share of a frequency by which a grid's ends may miss what was meant: files hold decimal roundings of computed grids.</summary>
    internal const double EndTolerance = 1e-9;

    /// <summary>A frequency that misses an end of the sweep by rounding alone is that end.</summary>
    internal double AtEnds(double frequencyHz)
        => frequencyHz < this.frequencyHz[0] && frequencyHz >= this.frequencyHz[0] * (1 - EndTolerance) ? this.frequencyHz[0]
            : frequencyHz > this.frequencyHz[^1] && frequencyHz <= this.frequencyHz[^1] * (1 + EndTolerance) ? this.frequencyHz[^1]
            : frequencyHz;

    internal Curve GainCurve => new(FrequencyHz, GainDb);

    internal Curve PhaseCurve => new(FrequencyHz, PhaseDeg);

    internal Curve DelayCurve => new(FrequencyHz, DelaySeconds);

    /// <summary>Level in dB at a frequency, straight against log f between the points; null outside the sweep and where a gain of exactly zero leaves none.</summary>
    /// <param name="frequencyHz">In Hz.</param>
    public double? GainDbAt(double frequencyHz) => Known(GainCurve.ValueAt(frequencyHz));

    /// <summary>Unwrapped phase in degrees at a frequency, straight against log f between the points; null where it is absent.</summary>
    /// <param name="frequencyHz">In Hz.</param>
    public double? PhaseDegAt(double frequencyHz) => HasPhase ? Known(PhaseCurve.ValueAt(frequencyHz)) : null;

    /// <summary>Group delay in seconds at a frequency, straight against log f between the points; null where it is absent.</summary>
    /// <param name="frequencyHz">In Hz.</param>
    public double? DelaySecondsAt(double frequencyHz) => HasPhase ? Known(DelayCurve.ValueAt(frequencyHz)) : null;

    /// <summary>The complex gain at each point, in the unit of the gain. Identical doubles for <see cref="SweepForm.RealImaginary"/>; an exact zero is (0, 0).</summary>
    /// <param name="re">Takes the real parts; <see cref="Count"/> values.</param>
    /// <param name="im">Takes the imaginary parts; <see cref="Count"/> values.</param>
    /// <exception cref="InvalidOperationException">The sweep carries no phase.</exception>
    /// <exception cref="ArgumentException">A span has another length.</exception>
    public void GetComplex(Span<double> re, Span<double> im)
    {
        if (second is null)
            throw new InvalidOperationException("A magnitude-only sweep has no real and imaginary parts.");
        Preconditions.RequireSameCount(re.Length, Count, nameof(re));
        Preconditions.RequireSameCount(im.Length, Count, nameof(im));
        if (Form == SweepForm.RealImaginary)
        {
            first.CopyTo(re);
            second.CopyTo(im);
            return;
        }

        for (int i = 0; i < Count; i++)
            (re[i], im[i]) = Gain.Complex(Form == SweepForm.LevelPhase ? Gain.Ratio(first[i]) : first[i], second[i]);
    }

    /// <summary>Whether a suspect phase step overlaps the span between two frequencies.</summary>
    internal bool HasSuspectStep(double fromHz, double toHz)
    {
        foreach (var step in SuspectSteps)
        {
            if (step.ToHz > fromHz && step.FromHz < toHz)
                return true;
        }

        return false;
    }

    /// <summary>The same planes over other frequencies.</summary>
    /// <param name="frequencyHz">One a point, in Hz, positive and strictly ascending.</param>
    /// <exception cref="ArgumentException">The frequencies do not fit.</exception>
    public Sweep OverFrequencies(ReadOnlySpan<double> frequencyHz)
        => Create(Form, frequencyHz, first, second, NominalDelaySeconds, PhaseFloorDb);

    /// <summary>The points between two frequencies, both included.</summary>
    /// <param name="fromHz">Lower edge in Hz.</param>
    /// <param name="toHz">Upper edge in Hz.</param>
    /// <exception cref="ArgumentException">Fewer than 2 points lie there.</exception>
    public Sweep Between(double fromHz, double toHz)
    {
        int start = 0;
        while (start < Count && frequencyHz[start] < fromHz)
            start++;
        int end = start;
        while (end < Count && frequencyHz[end] <= toHz)
            end++;
        return Create(Form, frequencyHz.AsSpan(start..end), first.AsSpan(start..end), HasPhase ? second.AsSpan(start..end) : default, NominalDelaySeconds, PhaseFloorDb);
    }

    private static double? Known(double value) => double.IsFinite(value) ? value : null;
}

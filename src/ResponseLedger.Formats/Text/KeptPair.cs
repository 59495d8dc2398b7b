using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Formats.Text;

/// <summary>The pair of planes as a file can hold it: the kept one, or magnitudes where a level is negative infinity.</summary>
internal readonly ref struct KeptPair
{
    private KeptPair(SweepForm form, ReadOnlySpan<double> first, ReadOnlySpan<double> second)
    {
        Form = form;
        First = first;
        Second = second;
    }

    public SweepForm Form { get; }

    public ReadOnlySpan<double> First { get; }

    public ReadOnlySpan<double> Second { get; }

    public static KeptPair Of(Sweep sweep)
    {
        bool level = sweep.Form is SweepForm.Level or SweepForm.LevelPhase;
        if (!level || !sweep.FirstPlane.Contains(double.NegativeInfinity))
            return new KeptPair(sweep.Form, sweep.FirstPlane, sweep.SecondPlane);
        var ratio = new double[sweep.Count];
        for (int i = 0; i < ratio.Length; i++)
            ratio[i] = Math.Pow(10, sweep.FirstPlane[i] / 20);
        return new KeptPair(sweep.HasPhase ? SweepForm.RatioPhase : SweepForm.Ratio, ratio, sweep.SecondPlane);
    }
}

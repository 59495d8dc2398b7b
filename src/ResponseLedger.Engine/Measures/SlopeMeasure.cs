using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Engine.Measures;

/// <summary>
/// The straight line that fits L against log10 f best between fromHz and toHz, by least squares uniform in log f, by integrals of the
/// straight pieces (not by sums over points, so the grid has no weight): slope in dB/decade, in dB/octave (times log10 2), the power p of the
/// power law |H| ~ f^p (slope / 20), and the rms residual in dB. With u = log10 f, m the band's middle and W its width,
/// slope = (12 / W^3) times the integral of (u - m) L du. Absent where the band leaves the sweep or holds a gain of exactly zero.
/// </summary>
internal sealed class SlopeMeasure : Measure
{
    internal override MeasureDefinition Definition { get; } = new(
        "slope",
        [new("fromHz", true), new("toHz", true)],
        false,
        [new("dbPerDecade", "dB/decade"), new("dbPerOctave", "dB/octave"), new("power", "1"), new("residualDb", "dB")]);

    internal override MeasureResult Evaluate(Sweep run, MeasureCall call, DeviceTraits device)
    {
        double fromHz = Parameter(call, "fromHz");
        double toHz = Parameter(call, "toHz");
        if (OutsideSweep(run, ref fromHz, ref toHz) is { } outside)
            return Absent(call, outside);
        var part = run.GainCurve.Part(fromHz, toHz);
        if (!part.IsFinite)
            return Absent(call, ZeroGain(fromHz, toHz));

        var u = Array.ConvertAll(part.FrequencyHz, f => LogAxis.Decades(fromHz, f));
        double width = u[^1];
        double middle = width / 2;
        double mean = ReferenceLevels.Mean(part);
        double moment = 0;
        for (int i = 0; i + 1 < u.Length; i++)
        {
            var (h, l1, l2) = (u[i + 1] - u[i], part.Values[i] - mean, part.Values[i + 1] - mean);
            moment += h * (((u[i] + u[i + 1]) / 2 - middle) * (l1 + l2) / 2 + h * (l2 - l1) / 12);
        }

        double slope = 12 * moment / (width * width * width);
        double squares = 0;
        for (int i = 0; i + 1 < u.Length; i++)
        {
            double r1 = part.Values[i] - mean - slope * (u[i] - middle);
            double r2 = part.Values[i + 1] - mean - slope * (u[i + 1] - middle);
            squares += (u[i + 1] - u[i]) * (r1 * r1 + r1 * r2 + r2 * r2) / 3;
        }

        return Found(call, [slope, slope * Math.Log10(2), slope / 20, Math.Sqrt(Math.Max(0, squares / width))]);
    }
}

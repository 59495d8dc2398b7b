using MathNet.Numerics.Integration;
using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Engine.Measures;

/// <summary>
/// Group delay -(1/360) d(phase in degrees)/df in seconds at a stated frequency. Without apertureRatio: the three-point derivative
/// at the points, straight against log f between. With apertureRatio r: the straight line in f that fits the phase curve best, by
/// least squares uniform in f, from f / sqrt r to f sqrt r. The aperture is noted. Absent without phase, outside the sweep, where the
/// aperture leaves the sweep, and beside points that have no phase.
/// </summary>
internal sealed class DelayMeasure : Measure
{
    // Ten Gauss nodes a stretch of at most half an e-fold leave a relative error far under 1e-15 of the exponentials that are integrated.
    private const int GaussNodes = 10;
    private const double StretchWidth = 0.5;

    internal override MeasureDefinition Definition { get; } = new(
        "delay",
        [new("frequencyHz", true), new("apertureRatio", false, ParameterRange.AboveOne)],
        false,
        [new("delaySeconds", "s")]);

    internal override MeasureResult Evaluate(Sweep run, MeasureCall call, DeviceTraits device)
    {
        double frequencyHz = Parameter(call, "frequencyHz");
        if (PhaseAbsent(run) is { } noPhase)
            return Absent(call, noPhase);
        if (OutsideSweep(run, ref frequencyHz) is { } outside)
            return Absent(call, outside);
        return Optional(call, "apertureRatio") is { } ratio
            ? OverAperture(run, call, frequencyHz, ratio)
            : AtPoints(run, call, frequencyHz);
    }

    private MeasureResult AtPoints(Sweep run, MeasureCall call, double frequencyHz)
    {
        var f = run.FrequencyHz;
        int piece = run.DelayCurve.PieceOf(frequencyHz);
        int from = Math.Max(0, piece - (f[piece + 1] == frequencyHz ? 0 : 1));
        int to = Math.Min(f.Length - 1, piece + (f[piece] == frequencyHz ? 1 : 2));
        if (run.DelaySecondsAt(frequencyHz) is not { } delay)
            return Absent(call, PhaseAbsentNear(frequencyHz));
        return Found(call, [delay], null, [
            new Absence(AbsenceCode.Aperture, $"Three-point derivative over points from {Wording.Hz(f[from])} to {Wording.Hz(f[to])}."),
            .. SuspectNotes(run, f[from], f[to])]);
    }

    private MeasureResult OverAperture(Sweep run, MeasureCall call, double frequencyHz, double ratio)
    {
        double root = Math.Sqrt(ratio);
        double lowHz = frequencyHz / root;
        double highHz = frequencyHz * root;
        if (OutsideSweep(run, ref lowHz, ref highHz) is { } outside)
            return Absent(call, outside with { Sentence = "The aperture leaves the sweep. " + outside.Sentence });
        var part = run.PhaseCurve.Part(lowHz, highHz);
        if (!part.IsFinite)
            return Absent(call, PhaseAbsentNear(frequencyHz));
        return Found(call, [FittedSlope(part) / -360], null, [
            new Absence(AbsenceCode.Aperture, $"Straight fit over {Wording.Hz(lowHz)} to {Wording.Hz(highHz)}, ratio {Wording.Number(ratio)}."),
            .. SuspectNotes(run, lowHz, highHz)]);
    }

    /// <summary>
    /// Least-squares slope in degrees per Hz. By parts, the integral of (f - m) phase df is minus that of G phase' df with
    /// G = (f - low)(f - high)/2, which vanishes at both ends; on a piece phase' df is the piece's slope times d(ln f).
    /// </summary>
    private static double FittedSlope(CurvePart part)
    {
        double lowHz = part.FrequencyHz[0];
        double highHz = part.FrequencyHz[^1];
        double width = highHz - lowHz;
        double sum = 0;
        for (int i = 0; i + 1 < part.Count; i++)
        {
            double startHz = part.FrequencyHz[i];
            double pieceWidth = LogAxis.Width(startHz, part.FrequencyHz[i + 1]);
            if (pieceWidth == 0)
                continue;
            double degPerEfold = (part.Values[i + 1] - part.Values[i]) / pieceWidth;
            int stretches = (int)Math.Ceiling(pieceWidth / StretchWidth);
            for (int s = 0; s < stretches; s++)
            {
                sum += degPerEfold * GaussLegendreRule.Integrate(
                    x => Weight(startHz * Math.Exp(x)), pieceWidth * s / stretches, pieceWidth * (s + 1) / stretches, GaussNodes);
            }
        }

        return 6 * sum / width;

        // G / width^2, kept near 1 in size so that no frequency overflows.
        double Weight(double f) => (f - lowHz) / width * ((highHz - f) / width);
    }
}

using ResponseLedger.Engine.Sweeps;
using ResponseLedger.Records.Masks;
using ResponseLedger.Store.Queries;

namespace ResponseLedger.Server.Lots;

/// <summary>A lot's counting runs in one condition, ready to be drawn: one frequency axis, one line a run.</summary>
internal sealed class Overlay
{
    private Overlay(OverlayQuestion question, LotCurves curves, OverlayAxis axis, IReadOnlyList<OverlayLine> runs, OverlayLine? golden)
    {
        Question = question;
        Curves = curves;
        Axis = axis;
        Runs = runs;
        Golden = golden;
    }

    public OverlayQuestion Question { get; }

    public LotCurves Curves { get; }

    public OverlayAxis Axis { get; }

    /// <summary>One line for each of the curves' runs, in their order.</summary>
    public IReadOnlyList<OverlayLine> Runs { get; }

    public OverlayLine? Golden { get; }

    public IReadOnlyList<OverlayLimit> Limits { get; private init; } = [];

    public IReadOnlyList<OverlayNote> Notes { get; private init; } = [];

    /// <summary>Lays the curves on one axis. Levels, phases and ratios of the runs are worked out on several cores.</summary>
    /// <param name="curves">The curves; with a golden run where the difference from it is asked for.</param>
    /// <param name="question">What is asked for.</param>
    public static Overlay Of(LotCurves curves, OverlayQuestion question)
    {
        var golden = curves.Golden?.Sweep;
        var anchor = golden is { HasPhase: true } ? golden : curves.Runs.Select(r => r.Sweep).FirstOrDefault(s => s.HasPhase);
        var runs = new OverlayLine[curves.Runs.Count];
        Parallel.For(0, runs.Length, i =>
        {
            runs[i] = LineOf(curves.Runs[i].Sweep);
            _ = runs[i].Values;
        });
        var goldenLine = golden is null ? null : LineOf(golden);
        var axis = OverlayAxis.Of(goldenLine is null ? runs : [goldenLine, .. runs], question.Points);
        var (limits, notes) = LimitsOf(curves, question, anchor, axis.FrequencyHz);
        return new Overlay(question, curves, axis, runs, goldenLine) { Limits = limits, Notes = notes };

        OverlayLine LineOf(Sweep sweep) => question.MinusGolden
            ? OverlayLine.MinusGolden(sweep, golden!, question.Quantity)
            : OverlayLine.AsMeasured(sweep, question.Quantity, anchor);
    }

    private static (IReadOnlyList<OverlayLimit> Limits, IReadOnlyList<OverlayNote> Notes) LimitsOf(
        LotCurves curves, OverlayQuestion question, Sweep? anchor, double[] axisHz)
    {
        if (curves.MaskDocument is not { } bytes)
            return ([], [new OverlayNote("noReleasedMask", "No mask is released for this condition, so there are no limits to draw.")]);
        return MaskRevisionDocument.TryParse(bytes, out var mask, out var problems)
            ? OverlayLimits.Of(mask.Mask.Mask, curves, question, anchor, axisHz)
            : throw new InvalidDataException($"The mask {curves.Condition.MaskId} cannot be read: {problems[0].Sentence}");
    }
}

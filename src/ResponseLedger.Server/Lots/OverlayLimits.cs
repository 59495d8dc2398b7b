using System.Globalization;
using ResponseLedger.Engine.Masks;
using ResponseLedger.Engine.Measures;
using ResponseLedger.Engine.Sweeps;
using ResponseLedger.Store.Queries;

namespace ResponseLedger.Server.Lots;

/// <summary>A limit as it is drawn; null where it has no value.</summary>
internal sealed record OverlayLimit(string Name, string Side, double[] FrequencyHz, double[] Values);

/// <summary>A remark on an overlay: a stable word and a sentence.</summary>
internal sealed record OverlayNote(string Code, string Message);

/// <summary>
/// Places the limits of a mask in an overlay. What a limit is relative to differs from run to run, so a limit relative to a
/// reference level is drawn by that of the golden run, or without one by the median of the runs' levels, and says so. Where one
/// run is drawn alone, its own level is the one that holds.
/// </summary>
internal sealed class OverlayLimits
{
    private readonly LotCurves curves;
    private readonly OverlayQuestion question;
    private readonly Sweep? anchor;
    private readonly double[] axisHz;

    private OverlayLimits(LotCurves curves, OverlayQuestion question, Sweep? anchor, double[] axisHz)
    {
        this.curves = curves;
        this.question = question;
        this.anchor = anchor;
        this.axisHz = axisHz;
    }

    /// <summary>The limits of the mask on the overlay's quantity, with remarks on those that could not stand for every run.</summary>
    /// <param name="mask">The mask revision's criteria.</param>
    /// <param name="curves">The curves of the overlay.</param>
    /// <param name="question">What is drawn.</param>
    /// <param name="anchor">The sweep that phases are brought near to.</param>
    /// <param name="axisHz">The overlay's frequencies.</param>
    public static (IReadOnlyList<OverlayLimit> Limits, IReadOnlyList<OverlayNote> Notes) Of(
        Mask mask, LotCurves curves, OverlayQuestion question, Sweep? anchor, double[] axisHz)
    {
        var placing = new OverlayLimits(curves, question, anchor, axisHz);
        var notes = new List<OverlayNote>();
        var limits = mask.Limits
            .Where(l => l.Quantity == question.Quantity)
            .Select(l => placing.Place(l, notes))
            .OfType<OverlayLimit>()
            .ToList();
        return (limits, notes);
    }

    private OverlayLimit? Place(CurveLimit limit, List<OverlayNote> notes)
    {
        var golden = curves.Golden?.Sweep;
        if (limit.Basis == LimitBasis.Golden)
        {
            if (question.MinusGolden)
                return AsItStands(limit, 0);
            if (golden is not null)
                return Along(limit, golden, sign: 1, level: 0);
            notes.Add(new OverlayNote("limitNeedsGolden", $"The limit \"{limit.Name}\" is relative to the golden run, and none is set."));
            return null;
        }

        if (limit.Basis == LimitBasis.Absolute)
            return question.MinusGolden ? Along(limit, golden!, sign: -1, level: 0) : AsItStands(limit, TurnsDeg(limit));

        if (ReferenceDb(limit) is not { } level)
        {
            notes.Add(new OverlayNote("limitNeedsReference", $"The limit \"{limit.Name}\" is relative to a reference level that no run here has."));
            return null;
        }

        if (!question.OneRun)
        {
            notes.Add(new OverlayNote(
                "limitDrawnByReference",
                string.Create(CultureInfo.InvariantCulture, $"The limit \"{limit.Name}\" is relative to each run's own reference level. It is drawn by {(golden is null ? "the median of the runs' levels" : "that of the golden run")}, {level:0.###} dB.")));
        }

        return question.MinusGolden ? Along(limit, golden!, sign: -1, level) : AsItStands(limit, level);
    }

    private static OverlayLimit AsItStands(CurveLimit limit, double offset) => new(
        limit.Name,
        WordOf(limit.Side),
        [.. limit.Corners.Select(c => c.FrequencyHz)],
        [.. limit.Corners.Select(c => c.Value + offset)]);

    // The limit with the golden run's curve added or taken away, at the overlay's frequencies and its own corners.
    private OverlayLimit Along(CurveLimit limit, Sweep golden, int sign, double level)
    {
        var (fromHz, toHz) = (limit.Corners[0].FrequencyHz, limit.Corners[^1].FrequencyHz);
        double[] atHz = [.. axisHz.Where(f => f >= fromHz && f <= toHz).Concat(limit.Corners.Select(c => c.FrequencyHz)).Distinct().Order()];
        var values = new double[atHz.Length];
        var turns = double.NaN;
        for (var i = 0; i < atHz.Length; i++)
        {
            values[i] = LimitCurve.ValueAt(limit, atHz[i]) + level + sign * (ValueOf(golden, atHz[i]) ?? double.NaN);
            if (double.IsNaN(turns) && double.IsFinite(values[i]))
                turns = limit.Quantity == CurveQuantity.PhaseDeg && sign < 0 ? -360 * Math.Round(values[i] / 360) : 0;
            values[i] += double.IsNaN(turns) ? 0 : turns;
        }

        return new OverlayLimit(limit.Name, WordOf(limit.Side), atHz, values);
    }

    // A phase limit is met by a run with the whole turns that bring it nearest, so the limit is drawn near the curves.
    private double TurnsDeg(CurveLimit limit)
    {
        if (limit.Quantity != CurveQuantity.PhaseDeg || anchor is null)
            return 0;
        var lowestHz = Math.Max(limit.Corners[0].FrequencyHz, anchor.FrequencyHz[0]);
        var apart = anchor.PhaseDegAt(lowestHz) - LimitCurve.ValueAt(limit, lowestHz);
        return apart is { } deg && double.IsFinite(deg) ? 360 * Math.Round(deg / 360) : 0;
    }

    private double? ReferenceDb(CurveLimit limit)
    {
        if (!question.OneRun && curves.Golden is { } golden)
            return ReferenceLevels.Resolve(golden.Sweep, limit.Reference!).GainDb;
        var levels = curves.Runs.Select(r => ReferenceLevels.Resolve(r.Sweep, limit.Reference!).GainDb).OfType<double>().Order().ToArray();
        return levels.Length == 0 ? null : (levels[(levels.Length - 1) / 2] + levels[levels.Length / 2]) / 2;
    }

    private static double? ValueOf(Sweep sweep, double frequencyHz, CurveQuantity quantity) => quantity switch
    {
        CurveQuantity.GainDb => sweep.GainDbAt(frequencyHz),
        CurveQuantity.PhaseDeg => sweep.PhaseDegAt(frequencyHz),
        _ => sweep.DelaySecondsAt(frequencyHz),
    };

    private double? ValueOf(Sweep sweep, double frequencyHz) => ValueOf(sweep, frequencyHz, question.Quantity);

    private static string WordOf(LimitSide side) => side == LimitSide.Upper ? "upper" : "lower";
}

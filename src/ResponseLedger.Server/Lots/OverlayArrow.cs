using ResponseLedger.Formats;
using ResponseLedger.Records.Verdicts;

namespace ResponseLedger.Server.Lots;

/// <summary>Writes an overlay as an Arrow stream: a column of frequencies and one a run.</summary>
internal static class OverlayArrow
{
    public const string MediaType = "application/vnd.apache.arrow.stream";

    public static void Write(Stream output, Overlay overlay)
    {
        var curves = new ArrowCurve[overlay.Runs.Count];
        Parallel.For(0, curves.Length, i =>
        {
            var run = overlay.Curves.Runs[i];
            var values = new double[overlay.Axis.FrequencyHz.Length];
            overlay.Axis.Fill(overlay.Runs[i], values);
            curves[i] = new ArrowCurve(
                run.RunId.ToString("D"),
                run.Serial,
                run.Outcome is { } outcome ? OutcomeWords.Format(outcome) : "",
                Array.ConvertAll(values, v => double.IsFinite(v) ? v : (double?)null));
        });
        ArrowCurves.Write(output, overlay.Question.QuantityWord, overlay.Question.UnitOf(overlay.Curves.GainUnit), overlay.Axis.FrequencyHz, curves);
    }
}

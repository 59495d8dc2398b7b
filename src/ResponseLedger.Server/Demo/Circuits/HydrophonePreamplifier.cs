using System.Numerics;

namespace ResponseLedger.Server.Demo.Circuits;

/// <summary>
/// A non-inverting preamplifier: the transducer's capacitance against the input resistance (high-pass), a gain of 1 + Rf / Rg
/// that rolls off with the amplifier's gain-bandwidth product, and an output low-pass.
/// </summary>
internal static class HydrophonePreamplifier
{
    private const double InputOhm = 10e6;
    private const double SourceFarad = 4.7e-9;
    private const double GroundOhm = 1_000;
    private const double GainBandwidthHz = 22e6;
    private const double OutputOhm = 470;
    private const double OutputFarad = 2.2e-9;
    private const double OpenSourceFarad = 3e-12;

    /// <summary>Draws one board and gives its circuit at both gain settings.</summary>
    public static IReadOnlyList<Circuit> Build(Parts parts, Fault fault)
    {
        var inputOhm = parts.Draw(InputOhm, 0.02);
        var sourceFarad = fault == Fault.OpenJoint ? OpenSourceFarad : parts.Draw(SourceFarad, 0.05);
        var groundOhm = parts.Draw(GroundOhm, 0.005);
        var gainBandwidthHz = parts.Draw(GainBandwidthHz, 0.2);
        var outputOhm = parts.Draw(OutputOhm, 0.01);
        var outputFarad = fault == Fault.WrongCapacitor ? parts.Draw(4.7e-9, 0.05) : parts.Draw(OutputFarad, 0.05);
        var sign = fault == Fault.InvertedLeads ? -1 : 1;
        double[] feedbackOhm = [parts.Draw(9_000, 0.005), parts.Draw(99_000, 0.005)];
        return [.. feedbackOhm.Select<double, Circuit>(feedback => frequencyHz =>
        {
            var s = new Complex(0, 2 * Math.PI * frequencyHz);
            var gain = 1 + (feedback / groundOhm);
            var input = s * inputOhm * sourceFarad / (1 + (s * inputOhm * sourceFarad));
            var amplifier = gain / (1 + (s * gain / (2 * Math.PI * gainBandwidthHz)));
            var output = 1 / (1 + (s * outputOhm * outputFarad));
            return sign * input * amplifier * output;
        })];
    }
}

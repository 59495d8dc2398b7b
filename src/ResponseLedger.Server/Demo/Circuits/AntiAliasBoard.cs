using System.Numerics;

namespace ResponseLedger.Server.Demo.Circuits;

/// <summary>
/// A fourth-order low-pass at 10 kHz out of two unity-gain stages with two resistors and two capacitors each
/// (R. P. Sallen and E. L. Key, 1955): H = 1 / (1 + s C2 (R1 + R2) + s^2 R1 R2 C1 C2), with Butterworth quality factors.
/// </summary>
internal static class AntiAliasBoard
{
    private const double ResistorOhm = 10_000;
    private const double CornerHz = 10_000;
    private const double OpenFarad = 4e-12;

    private static readonly double[] stageQ = [0.541196100146197, 1.306562964876377];

    public static Circuit Build(Parts parts, Fault fault)
    {
        var stages = new (double R1, double R2, double C1, double C2)[stageQ.Length];
        for (var i = 0; i < stages.Length; i++)
        {
            // With equal resistors Q = sqrt(C1 / C2) / 2 and the corner lies at 1 / (2 pi R sqrt(C1 C2)).
            var meanFarad = 1 / (2 * Math.PI * CornerHz * ResistorOhm);
            stages[i] = (
                parts.Draw(ResistorOhm, 0.01),
                parts.Draw(ResistorOhm, 0.01),
                parts.Draw(meanFarad * 2 * stageQ[i], 0.02),
                parts.Draw(meanFarad / (2 * stageQ[i]), 0.02));
        }

        if (fault == Fault.WrongCapacitor)
            stages[1].C2 = parts.Draw(820e-12, 0.02);
        if (fault == Fault.OpenJoint)
            stages[0].C1 = OpenFarad;
        var sign = fault == Fault.InvertedLeads ? -1 : 1;
        return frequencyHz =>
        {
            var s = new Complex(0, 2 * Math.PI * frequencyHz);
            Complex gain = sign;
            foreach (var (r1, r2, c1, c2) in stages)
                gain /= 1 + (s * c2 * (r1 + r2)) + (s * s * r1 * r2 * c1 * c2);
            return gain;
        };
    }
}

using System.Numerics;

namespace ResponseLedger.Server.Demo.Circuits;

/// <summary>
/// The open loop of a winch servo: an integrator, a lead network out of two resistors and a capacitor, the motor's
/// mechanical pole, and the sampling delay of its drive. L = K / s (1 + s Tz) / (1 + s Tp) / (1 + s Tm) e^(-s Td).
/// </summary>
internal static class ServoLoop
{
    private const double LeadOhm = 100_000;
    private const double LeadFarad = 265e-9;
    private const double ShuntOhm = 5_260;
    private const double IntegratorOhm = 100_000;
    private const double IntegratorFarad = 100e-9;
    private const double MotorSeconds = 0.053;
    private const double DelaySeconds = 0.8e-3;
    private const double LoopGain = 2.4;

    public static Circuit Build(Parts parts, Fault fault)
    {
        var leadOhm = parts.Draw(LeadOhm, 0.01);
        var leadFarad = fault switch
        {
            Fault.WrongCapacitor => parts.Draw(56e-9, 0.05),
            Fault.OpenJoint => 10e-12,
            _ => parts.Draw(LeadFarad, 0.05),
        };
        var shuntOhm = parts.Draw(ShuntOhm, 0.01);
        var integratorSeconds = parts.Draw(IntegratorOhm, 0.01) * parts.Draw(IntegratorFarad, 0.05);
        var motorSeconds = parts.Draw(MotorSeconds, 0.06);
        var zeroSeconds = leadOhm * leadFarad;
        var poleSeconds = leadFarad * leadOhm * shuntOhm / (leadOhm + shuntOhm);
        var sign = fault == Fault.InvertedLeads ? -1 : 1;
        return frequencyHz =>
        {
            var s = new Complex(0, 2 * Math.PI * frequencyHz);
            return sign * LoopGain / (s * integratorSeconds)
                * (1 + (s * zeroSeconds)) / (1 + (s * poleSeconds)) / (1 + (s * motorSeconds))
                * Complex.Exp(-s * DelaySeconds);
        };
    }
}

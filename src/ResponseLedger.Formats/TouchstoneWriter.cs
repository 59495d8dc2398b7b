using System.Buffers;
using ResponseLedger.Engine;
using ResponseLedger.Engine.Sweeps;
using ResponseLedger.Formats.Text;

namespace ResponseLedger.Formats;

/// <summary>
/// Writes a sweep as a Touchstone 1.1 file of one port (.s1p) that holds the one transfer, and says so in a comment. A file of
/// two ports would need S11, S12 and S22, which a sweep does not know; zeros there would claim a match and an isolation that
/// nobody measured. Frequencies are in Hz; the pair is the kept one (RI, MA or DB), in shortest round-trip digits; a level of
/// negative infinity turns the file into MA, in which zero is 0. A sweep without phase has no complex value and is refused.
/// </summary>
public static class TouchstoneWriter
{
    /// <summary>Writes the sweep to a buffer.</summary>
    /// <returns>Null when written; otherwise why it cannot be (<c>phaseAbsent</c>), and nothing was written.</returns>
    /// <exception cref="ArgumentNullException">The sweep or the buffer is missing.</exception>
    public static Absence? Write(Sweep sweep, IBufferWriter<byte> output)
    {
        ArgumentNullException.ThrowIfNull(sweep);
        ArgumentNullException.ThrowIfNull(output);
        if (!sweep.HasPhase)
            return new Absence("phaseAbsent", "The run has magnitude only; a Touchstone file needs the phase too. Export it as CSV.");
        KeptPair pair = KeptPair.Of(sweep);
        string format = pair.Form switch { SweepForm.RealImaginary => "RI", SweepForm.LevelPhase => "DB", _ => "MA" };
        var text = new NumberWriter(output);
        text.Put("! One transfer, output over input, written in the place of S11 of a one-port file.\n");
        text.Put("! It is no reflection; the reference resistance is nominal and was not applied to the values.\n");
        text.Put($"# HZ S {format} R 50\n");
        for (int i = 0; i < sweep.Count; i++)
        {
            text.Put(sweep.FrequencyHz[i]);
            text.Put((byte)' ');
            text.Put(pair.First[i]);
            text.Put((byte)' ');
            text.Put(pair.Second[i]);
            text.Put((byte)'\n');
        }

        text.Flush();
        return null;
    }

    /// <summary>Writes the sweep to a stream, which stays open.</summary>
    /// <returns>Null when written; otherwise why it cannot be (<c>phaseAbsent</c>), and nothing was written.</returns>
    /// <exception cref="ArgumentNullException">The sweep or the stream is missing.</exception>
    public static Absence? Write(Sweep sweep, Stream output)
    {
        ArgumentNullException.ThrowIfNull(output);
        var buffer = new ArrayBufferWriter<byte>();
        Absence? refusal = Write(sweep, buffer);
        output.Write(buffer.WrittenSpan);
        return refusal;
    }
}

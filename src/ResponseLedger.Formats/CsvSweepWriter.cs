using System.Buffers;
using ResponseLedger.Engine.Sweeps;
using ResponseLedger.Formats.Text;

namespace ResponseLedger.Formats;

/// <summary>
/// Writes a sweep as CSV: comma, decimal point, UTF-8 without a byte order mark, LF, one head row that <see cref="SweepFileReader"/>
/// settles by itself. The kept pair is written with the shortest digits that read back as the same double. A level of
/// negative infinity (an exact zero) has no number: such a sweep is written as magnitudes, in which zero is 0 and the other
/// levels come back to 1e-12 dB.
/// </summary>
public static class CsvSweepWriter
{
    /// <summary>Writes the sweep to a buffer.</summary>
    /// <exception cref="ArgumentNullException">The sweep or the buffer is missing.</exception>
    public static void Write(Sweep sweep, IBufferWriter<byte> output)
    {
        ArgumentNullException.ThrowIfNull(sweep);
        ArgumentNullException.ThrowIfNull(output);
        KeptPair pair = KeptPair.Of(sweep);
        string firstHead = pair.Form switch
        {
            SweepForm.RealImaginary => "real",
            SweepForm.LevelPhase or SweepForm.Level => "gain_db",
            _ => "magnitude",
        };
        string secondHead = pair.Second.IsEmpty ? "" : pair.Form == SweepForm.RealImaginary ? ",imag" : ",phase_deg";
        var text = new NumberWriter(output);
        text.Put($"frequency_hz,{firstHead}{secondHead}\n");
        for (int i = 0; i < sweep.Count; i++)
        {
            text.Put(sweep.FrequencyHz[i]);
            text.Put((byte)',');
            text.Put(pair.First[i]);
            if (!pair.Second.IsEmpty)
            {
                text.Put((byte)',');
                text.Put(pair.Second[i]);
            }

            text.Put((byte)'\n');
        }

        text.Flush();
    }

    /// <summary>Writes the sweep to a stream, which stays open.</summary>
    /// <exception cref="ArgumentNullException">The sweep or the stream is missing.</exception>
    public static void Write(Sweep sweep, Stream output)
    {
        ArgumentNullException.ThrowIfNull(output);
        var buffer = new ArrayBufferWriter<byte>();
        Write(sweep, buffer);
        output.Write(buffer.WrittenSpan);
    }
}

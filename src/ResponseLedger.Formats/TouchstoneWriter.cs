using System.Buffers;
using ResponseLedger.Engine;
using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Formats;

/// <summary>Writes a sweep as a Touchstone 1.1 file of one port (.s1p).</summary>
public static class TouchstoneWriter
{
    /// <summary>Writes the sweep to a buffer.</summary>
    /// <returns>Null when written; otherwise why it cannot be, and nothing was written.</returns>
    public static Absence? Write(Sweep sweep, IBufferWriter<byte> output) => throw new NotImplementedException();

    /// <summary>Writes the sweep to a stream, which stays open.</summary>
    /// <returns>Null when written; otherwise why it cannot be, and nothing was written.</returns>
    public static Absence? Write(Sweep sweep, Stream output) => throw new NotImplementedException();
}

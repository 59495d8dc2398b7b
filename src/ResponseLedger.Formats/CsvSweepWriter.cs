using System.Buffers;
using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Formats;

/// <summary>Writes a sweep as CSV: comma, decimal point, UTF-8, one head row, the pair of quantities that is kept.</summary>
public static class CsvSweepWriter
{
    /// <summary>Writes the sweep to a buffer.</summary>
    public static void Write(Sweep sweep, IBufferWriter<byte> output) => throw new NotImplementedException();

    /// <summary>Writes the sweep to a stream, which stays open.</summary>
    public static void Write(Sweep sweep, Stream output) => throw new NotImplementedException();
}

using System.Buffers;
using System.Globalization;
using System.Text;

namespace ResponseLedger.Formats.Text;

/// <summary>Puts words and shortest round-trip numbers into a buffer.</summary>
internal ref struct NumberWriter(IBufferWriter<byte> output)
{
    // A double needs at most 24 characters in its shortest round-trip form.
    private const int LongestNumber = 32;
    private const int Chunk = 16_384;

    private Span<byte> space;
    private int used;

    public void Put(double value)
    {
        Reserve(LongestNumber);
        value.TryFormat(space[used..], out int written, "R", CultureInfo.InvariantCulture);
        used += written;
    }

    public void Put(byte character)
    {
        Reserve(1);
        space[used++] = character;
    }

    public void Put(string words)
    {
        Reserve(words.Length);
        used += Encoding.ASCII.GetBytes(words, space[used..]);
    }

    public void Flush()
    {
        output.Advance(used);
        used = 0;
        space = default;
    }

    private void Reserve(int count)
    {
        if (space.Length - used >= count)
            return;
        Flush();
        space = output.GetSpan(Math.Max(count, Chunk));
    }
}

using System.Buffers.Binary;
using System.Text;
using System.Text.Unicode;

namespace ResponseLedger.Formats.Text;

/// <summary>The characters of a file, or the issue that says why it is not text.</summary>
internal sealed class DecodedText
{
    private const int ProbeBytes = 4096;

    private DecodedText(char[] buffer, int start, int length, ReadNote? note, ReadIssue? issue)
    {
        this.buffer = buffer;
        this.start = start;
        this.length = length;
        Note = note;
        Issue = issue;
    }

    private readonly char[] buffer;
    private readonly int start;
    private readonly int length;

    public ReadOnlySpan<char> Characters => buffer.AsSpan(start, length);

    public ReadNote? Note { get; }

    public ReadIssue? Issue { get; }

    public static DecodedText Of(ReadOnlySpan<byte> bytes)
    {
        if (bytes.IsEmpty)
            return Refused(new ReadIssue(null, null, ReadCodes.EmptyFile, "The file is empty; export the sweep again."));
        if (bytes.StartsWith("PK\u0003\u0004"u8))
        {
            return Refused(new ReadIssue(null, null, ReadCodes.BinaryFile,
                "The file is a workbook or an archive, not text; save the sheet as CSV and send that."));
        }

        DecodedText text = Decode(bytes);
        return text.Characters.IsWhiteSpace()
            ? Refused(new ReadIssue(null, null, ReadCodes.EmptyFile, "The file holds nothing but blanks; export the sweep again."))
            : text.FirstControl() ?? text;
    }

    private static DecodedText Decode(ReadOnlySpan<byte> bytes)
    {
        if (bytes.StartsWith((ReadOnlySpan<byte>)[0xEF, 0xBB, 0xBF]) && Utf8.IsValid(bytes[3..]))
            return With(Encoding.UTF8, bytes[3..], new ReadNote("encoding", "The text is UTF-8 with a byte order mark."));
        if (bytes.StartsWith((ReadOnlySpan<byte>)[0xFF, 0xFE]))
            return Wide(bytes[2..], bigEndian: false, "with a byte order mark");
        if (bytes.StartsWith((ReadOnlySpan<byte>)[0xFE, 0xFF]))
            return Wide(bytes[2..], bigEndian: true, "with a byte order mark");
        if (LooksWide(bytes, out bool bigEndian))
            return Wide(bytes, bigEndian, "without a byte order mark");
        if (Utf8.IsValid(bytes))
        {
            bool plain = Ascii.IsValid(bytes);
            return With(Encoding.UTF8, bytes, plain ? null : new ReadNote("encoding", "The text is UTF-8."));
        }

        return With(Encoding.Latin1, bytes, new ReadNote("encoding", "The text is not UTF-8; it was read as Latin-1."));
    }

    // Text of a western bench in UTF-16 has a zero in every other byte; anything else with zeros is not text.
    private static bool LooksWide(ReadOnlySpan<byte> bytes, out bool bigEndian)
    {
        ReadOnlySpan<byte> probe = bytes[..(Math.Min(bytes.Length, ProbeBytes) & ~1)];
        int evenZeros = 0, oddZeros = 0;
        for (int i = 0; i < probe.Length; i += 2)
        {
            if (probe[i] == 0)
                evenZeros++;
            if (probe[i + 1] == 0)
                oddZeros++;
        }

        int pairs = probe.Length / 2;
        bigEndian = evenZeros > oddZeros;
        return pairs >= 4 && Math.Max(evenZeros, oddZeros) > 0.7 * pairs && Math.Min(evenZeros, oddZeros) == 0;
    }

    private static DecodedText Wide(ReadOnlySpan<byte> bytes, bool bigEndian, string how)
    {
        var characters = new char[bytes.Length / 2];
        for (int i = 0; i < characters.Length; i++)
        {
            ReadOnlySpan<byte> pair = bytes.Slice(2 * i, 2);
            characters[i] = (char)(bigEndian ? BinaryPrimitives.ReadUInt16BigEndian(pair) : BinaryPrimitives.ReadUInt16LittleEndian(pair));
        }

        string order = bigEndian ? "big" : "little";
        return new DecodedText(characters, 0, characters.Length, new ReadNote("encoding", $"The text is UTF-16, {order}-endian, {how}."), null);
    }

    private static DecodedText With(Encoding encoding, ReadOnlySpan<byte> bytes, ReadNote? note)
    {
        var characters = new char[encoding.GetMaxCharCount(0) + bytes.Length];
        int count = encoding.GetChars(bytes, characters);
        return new DecodedText(characters, 0, count, note, null);
    }

    private static DecodedText Refused(ReadIssue issue) => new([], 0, 0, null, issue);

    // A control character other than line ends, tab, form feed and DOS's end mark says that this is no text.
    private DecodedText? FirstControl()
    {
        ReadOnlySpan<char> characters = Characters;
        int end = characters.Length;
        while (end > 0 && characters[end - 1] == '\u001A')
            end--;
        int line = 1;
        int at = 0;
        ReadOnlySpan<char> rest = characters[..end];
        while (true)
        {
            int next = rest.IndexOfAnyInRange('\0', '\u001F');
            if (next < 0)
                break;
            at += next;
            char found = rest[next];
            if (found is '\n' || (found is '\r' && !(next + 1 < rest.Length && rest[next + 1] == '\n')))
                line++;
            else if (found is not ('\t' or '\r' or '\f' or '\v'))
            {
                return Refused(new ReadIssue(line, null, ReadCodes.BinaryFile,
                    $"A control character (code {(int)found}) stands in line {line}; the file is not plain text. Export the sweep as CSV or Touchstone."));
            }

            rest = rest[(next + 1)..];
            at++;
        }

        return end == characters.Length ? null : new DecodedText(buffer, start, end, Note, null);
    }
}

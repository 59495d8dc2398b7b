using System.Globalization;
using ResponseLedger.Formats.Text;

namespace ResponseLedger.Formats.Touchstone;

/// <summary>Tells a Touchstone file by its extension (.sNp, .ts) or by its option line or version keyword.</summary>
internal static class TouchstoneName
{
    public static bool Recognises(string fileName, out int? ports)
    {
        ports = null;
        string extension = fileName[(fileName.LastIndexOf('.') + 1)..].Trim().ToLowerInvariant();
        if (extension == "ts" && fileName.Contains('.', StringComparison.Ordinal))
            return true;
        if (extension.Length is < 3 or > 6 || extension[0] != 's' || extension[^1] != 'p'
            || !int.TryParse(extension.AsSpan(1, extension.Length - 2), NumberStyles.None, CultureInfo.InvariantCulture, out int count))
        {
            return false;
        }

        ports = count;
        return true;
    }

    public static bool RecognisesContent(ReadOnlySpan<char> text)
    {
        var lines = new LineWalk(text);
        while (lines.MoveNext())
        {
            ReadOnlySpan<char> line = lines.Line.Trim();
            if (line.IsEmpty || line[0] == '!')
                continue;
            if (line.StartsWith("[version]", StringComparison.OrdinalIgnoreCase))
                return true;
            // A comment of a delimited file begins with # too, and may name units: only an option line that says more counts.
            return line[0] == '#' && line.Length < 200 && OptionLine.Parse(line[1..], out _) is { NamesNetwork: true } && NextIsBlankParted(lines);
        }

        return false;
    }

    private static bool NextIsBlankParted(LineWalk lines)
    {
        while (lines.MoveNext())
        {
            ReadOnlySpan<char> line = lines.Line.Trim();
            if (!line.IsEmpty && line[0] is not ('!' or '#'))
                return line[0] == '[' || !line.ContainsAny(',', ';');
        }

        return true;
    }
}

using System.Globalization;

namespace ResponseLedger.Formats.Text;

/// <summary>What a field is, seen as a number.</summary>
internal enum NumberKind
{
    Number,
    Empty,
    NotANumber,
    Infinite,
    Overload,
    Thousands,
    Text,
}

/// <summary>Reads one number, correctly rounded, with a decimal point or a decimal comma.</summary>
internal static class NumberText
{
    // Longer than any number that an instrument prints; bounds the cost of one field.
    private const int LongestNumber = 128;

    /// <summary>Sentinels of SCPI instruments: +-9.9E37 is overload (infinity), 9.91E37 is not a number.</summary>
    private static bool IsSentinel(double value) => Math.Abs(value) is 9.9e37 or 9.91e37;

    public static NumberKind Read(ReadOnlySpan<char> field, bool decimalComma, out double value)
    {
        value = 0;
        if (field.IsEmpty)
            return NumberKind.Empty;
        if (field.Length > LongestNumber)
            return NumberKind.Text;
        if (!HasShape(field, decimalComma ? ',' : '.'))
            return KindOfOther(field, decimalComma);

        bool parsed;
        if (decimalComma || field[0] == '\u2212')
        {
            Span<char> plain = stackalloc char[LongestNumber];
            field.CopyTo(plain);
            plain = plain[..field.Length];
            plain.Replace(',', '.');
            plain.Replace('\u2212', '-');
            parsed = double.TryParse(plain, NumberStyles.Float, CultureInfo.InvariantCulture, out value);
        }
        else
        {
            parsed = double.TryParse(field, NumberStyles.Float, CultureInfo.InvariantCulture, out value);
        }

        if (!parsed)
            return NumberKind.Text;
        if (!double.IsFinite(value))
            return NumberKind.Infinite;
        return IsSentinel(value) ? NumberKind.Overload : NumberKind.Number;
    }

    /// <summary>Whether the field is a number, or would be one but for a fault that has its own code.</summary>
    public static NumberKind KindOf(ReadOnlySpan<char> field, bool decimalComma)
    {
        if (field.IsEmpty)
            return NumberKind.Empty;
        if (field.Length > LongestNumber)
            return NumberKind.Text;
        return HasShape(field, decimalComma ? ',' : '.') ? NumberKind.Number : KindOfOther(field, decimalComma);
    }

    // [sign] digits [mark digits] [e [sign] digits], with a digit before or after the mark.
    private static bool HasShape(ReadOnlySpan<char> field, char mark)
    {
        int i = IsSign(field[0]) ? 1 : 0;
        int digits = 0;
        while (i < field.Length && char.IsAsciiDigit(field[i]))
        {
            i++;
            digits++;
        }

        if (i < field.Length && field[i] == mark)
        {
            i++;
            while (i < field.Length && char.IsAsciiDigit(field[i]))
            {
                i++;
                digits++;
            }
        }

        if (digits == 0)
            return false;
        if (i == field.Length)
            return true;
        if (field[i] is not ('e' or 'E') || ++i == field.Length)
            return false;
        if (field[i] is '+' or '-' && ++i == field.Length)
            return false;
        return field[i..].IndexOfAnyExceptInRange('0', '9') < 0;
    }

    private static NumberKind KindOfOther(ReadOnlySpan<char> field, bool decimalComma)
    {
        ReadOnlySpan<char> word = IsSign(field[0]) ? field[1..] : field;
        if (Is(word, "nan") || Is(word, "ind") || Is(word, "#n/a") || Is(word, "n/a") || Is(word, "1.#ind") || Is(word, "1.#qnan"))
            return NumberKind.NotANumber;
        if (Is(word, "inf") || Is(word, "infinity") || Is(word, "\u221E") || Is(word, "1.#inf") || Is(word, "unendlich"))
            return NumberKind.Infinite;
        return IsGrouped(word, decimalComma ? ',' : '.') ? NumberKind.Thousands : NumberKind.Text;
    }

    // 1-3 digits, then groups of a mark and three digits, then perhaps the decimal mark and digits.
    private static bool IsGrouped(ReadOnlySpan<char> word, char decimalMark)
    {
        int i = 0;
        while (i < word.Length && char.IsAsciiDigit(word[i]))
            i++;
        if (i is 0 or > 3 || i == word.Length)
            return false;
        char group = word[i];
        if (group is not (',' or '.' or '\'' or '\u2019' or ' ' or '\u00A0' or '\u202F'))
            return false;
        int groups = 0;
        while (i + 3 < word.Length && word[i] == group && word.Slice(i + 1, 3).IndexOfAnyExceptInRange('0', '9') < 0)
        {
            i += 4;
            groups++;
        }

        if (groups == 0 || (group == decimalMark && groups == 1))
            return false;
        char other = group == ',' ? '.' : group == '.' ? ',' : decimalMark;
        return i == word.Length || (word[i] == other && word[(i + 1)..].IndexOfAnyExceptInRange('0', '9') < 0);
    }

    private static bool IsSign(char c) => c is '-' or '+' or '\u2212';

    private static bool Is(ReadOnlySpan<char> word, string known) => word.Equals(known, StringComparison.OrdinalIgnoreCase);
}

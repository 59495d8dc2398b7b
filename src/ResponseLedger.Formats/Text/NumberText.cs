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

    // Instruments that reckon in single precision print 9.9E37 as 9.9000003E37.
    private const double SentinelTolerance = 1e-6;

    /// <summary>Sentinels of SCPI instruments: +-9.9E37 is overload (infinity), 9.91E37 is not a number.</summary>
    private static bool IsSentinel(double value)
    {
        double size = Math.Abs(value);
        return size > 9.8e37 && (Math.Abs(size / 9.9e37 - 1) <= SentinelTolerance || Math.Abs(size / 9.91e37 - 1) <= SentinelTolerance);
    }

    public static NumberKind Read(ReadOnlySpan<char> field, bool decimalComma, out double value)
    {
        value = 0;
        if (field.IsEmpty)
            return NumberKind.Empty;
        if (field.Length > LongestNumber)
            return NumberKind.Text;
        var scan = new Scan(field, decimalComma ? ',' : '.');
        if (!scan.IsNumber)
            return KindOfOther(field, decimalComma);
        if (!scan.TryExact(out value) && !TryParse(field, decimalComma, out value))
            return NumberKind.Text;
        if (!double.IsFinite(value))
            return NumberKind.Infinite;
        return IsSentinel(value) ? NumberKind.Overload : NumberKind.Number;
    }

    private static bool TryParse(ReadOnlySpan<char> field, bool decimalComma, out double value)
    {
        if (!decimalComma && field[0] != '\u2212')
            return double.TryParse(field, NumberStyles.Float, NumberFormatInfo.InvariantInfo, out value);
        Span<char> plain = stackalloc char[LongestNumber];
        field.CopyTo(plain);
        plain = plain[..field.Length];
        plain.Replace(',', '.');
        plain.Replace('\u2212', '-');
        return double.TryParse(plain, NumberStyles.Float, NumberFormatInfo.InvariantInfo, out value);
    }

    /// <summary>Whether the field is a number, or would be one but for a fault that has its own code.</summary>
    public static NumberKind KindOf(ReadOnlySpan<char> field, bool decimalComma)
    {
        if (field.IsEmpty)
            return NumberKind.Empty;
        if (field.Length > LongestNumber)
            return NumberKind.Text;
        return new Scan(field, decimalComma ? ',' : '.').IsNumber ? NumberKind.Number : KindOfOther(field, decimalComma);
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

    /// <summary>One pass over [sign] digits [mark digits] [e [sign] digits], with a digit before or after the mark.</summary>
    private readonly ref struct Scan
    {
        private readonly ulong mantissa;
        private readonly int power;
        private readonly bool exact;
        private readonly bool negative;

        public Scan(ReadOnlySpan<char> field, char mark)
        {
            negative = field[0] is '-' or '\u2212';
            int i = IsSign(field[0]) ? 1 : 0;
            int digits = 0;
            int fraction = 0;
            for (bool marked = false; i < field.Length; i++)
            {
                uint digit = (uint)(field[i] - '0');
                if (digit <= 9)
                {
                    // Nineteen digits cannot overflow; more are left to the general parser.
                    if (++digits <= 19)
                        mantissa = 10 * mantissa + digit;
                    fraction += marked ? 1 : 0;
                }
                else if (field[i] == mark && !marked)
                    marked = true;
                else
                    break;
            }

            if (digits == 0)
                return;
            int exponent = 0;
            if (i < field.Length)
            {
                if (field[i] is not ('e' or 'E') || ++i == field.Length)
                    return;
                bool down = field[i] == '-';
                if (field[i] is '+' or '-' && ++i == field.Length)
                    return;
                for (; i < field.Length; i++)
                {
                    uint digit = (uint)(field[i] - '0');
                    if (digit > 9)
                        return;
                    exponent = Math.Min(10 * exponent + (int)digit, 100_000);
                }

                exponent = down ? -exponent : exponent;
            }

            IsNumber = true;
            power = exponent - fraction;
            exact = digits <= 19 && mantissa <= 1UL << 53 && Math.Abs(power) < PowersOfTen.Length;
        }

        public bool IsNumber { get; }

        /// <summary>
        /// A mantissa and a power of ten that are both exact doubles make a correctly rounded number in one operation
        /// (W. D. Clinger, How to read floating point numbers accurately, 1990); all others need the general parser.
        /// </summary>
        public bool TryExact(out double value)
        {
            value = 0;
            if (!exact)
                return false;
            value = power < 0 ? mantissa / PowersOfTen[-power] : mantissa * PowersOfTen[power];
            if (negative)
                value = -value;
            return true;
        }

        private static ReadOnlySpan<double> PowersOfTen =>
            [1e0, 1e1, 1e2, 1e3, 1e4, 1e5, 1e6, 1e7, 1e8, 1e9, 1e10, 1e11, 1e12, 1e13, 1e14, 1e15, 1e16, 1e17, 1e18, 1e19, 1e20, 1e21, 1e22];
    }
}

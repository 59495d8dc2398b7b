using System.Globalization;
using System.Text;

namespace ResponseLedger.Ledger;

/// <summary>Number to text as ECMAScript's Number::toString does for radix 10, which RFC 8785 section 3.2.2.3 prescribes.</summary>
public static class EcmaScriptNumber
{
    /// <summary>The shortest decimal that reads back as the same double; negative zero is <c>0</c>.</summary>
    /// <exception cref="CanonicalJsonException">The number is not finite.</exception>
    public static string Format(double number)
    {
        if (!double.IsFinite(number))
            throw new CanonicalJsonException("A number that is not finite has no JSON form; write null and a reason.");
        if (number == 0)
            return "0";

        // The names k, n and s are those of the algorithm in ECMA-262: value = s * 10^(n-k), s of k digits.
        var (s, n) = DigitsAndPoint(Math.Abs(number));
        var k = s.Length;
        var text = new StringBuilder(32);
        if (number < 0)
            text.Append('-');
        if (k <= n && n <= 21)
            return text.Append(s).Append('0', n - k).ToString();
        if (n is > 0 and <= 21)
            return text.Append(s, 0, n).Append('.').Append(s, n, k - n).ToString();
        if (n is > -6 and <= 0)
            return text.Append("0.").Append('0', -n).Append(s).ToString();

        text.Append(s[0]);
        if (k > 1)
            text.Append('.').Append(s, 1, k - 1);
        return text.Append('e').Append(n > 0 ? '+' : '-').Append(Math.Abs(n - 1)).ToString();
    }

    private static (string Digits, int Point) DigitsAndPoint(double magnitude)
    {
        var shortest = magnitude.ToString("R", CultureInfo.InvariantCulture);
        var e = shortest.IndexOf('E', StringComparison.Ordinal);
        var mantissa = e < 0 ? shortest : shortest[..e];
        var exponent = e < 0 ? 0 : int.Parse(shortest.AsSpan(e + 1), NumberStyles.AllowLeadingSign, CultureInfo.InvariantCulture);
        var dot = mantissa.IndexOf('.', StringComparison.Ordinal);
        var whole = dot < 0 ? mantissa.Length : dot;
        var all = dot < 0 ? mantissa : mantissa.Remove(dot, 1);
        var digits = all.TrimStart('0');
        var point = whole - (all.Length - digits.Length) + exponent;
        return (digits.TrimEnd('0'), point);
    }
}

using System.Globalization;
using CsCheck;

namespace ResponseLedger.Ledger.Tests;

public sealed class EcmaScriptNumberTests
{
    /// <summary>RFC 8785 appendix B: IEEE 754 bits and their text; written down from memory, and equal to several public transcriptions.</summary>
    [Theory]
    [InlineData(0x0000000000000000, "0")]
    [InlineData(0x8000000000000000, "0")]
    [InlineData(0x0000000000000001, "5e-324")]
    [InlineData(0x8000000000000001, "-5e-324")]
    [InlineData(0x7fefffffffffffff, "1.7976931348623157e+308")]
    [InlineData(0xffefffffffffffff, "-1.7976931348623157e+308")]
    [InlineData(0x4340000000000000, "9007199254740992")]
    [InlineData(0xc340000000000000, "-9007199254740992")]
    [InlineData(0x4430000000000000, "295147905179352830000")]
    [InlineData(0x44b52d02c7e14af5, "9.999999999999997e+22")]
    [InlineData(0x44b52d02c7e14af6, "1e+23")]
    [InlineData(0x44b52d02c7e14af7, "1.0000000000000001e+23")]
    [InlineData(0x444b1ae4d6e2ef4e, "999999999999999700000")]
    [InlineData(0x444b1ae4d6e2ef4f, "999999999999999900000")]
    [InlineData(0x444b1ae4d6e2ef50, "1e+21")]
    [InlineData(0x3eb0c6f7a0b5ed8c, "9.999999999999997e-7")]
    [InlineData(0x3eb0c6f7a0b5ed8d, "0.000001")]
    [InlineData(0x41b3de4355555553, "333333333.3333332")]
    [InlineData(0x41b3de4355555554, "333333333.33333325")]
    [InlineData(0x41b3de4355555555, "333333333.3333333")]
    [InlineData(0x41b3de4355555556, "333333333.3333334")]
    [InlineData(0x41b3de4355555557, "333333333.33333343")]
    [InlineData(0xbecbf647612f3696, "-0.0000033333333333333333")]
    [InlineData(0x43143ff3c1cb0959, "1424953923781206.2")]
    public void The_samples_of_appendix_b_come_out_as_published(ulong bits, string text)
        => Assert.Equal(text, EcmaScriptNumber.Format(BitConverter.UInt64BitsToDouble(bits)));

    [Theory]
    [InlineData(0x7fffffffffffffff)]
    [InlineData(0x7ff0000000000000)]
    [InlineData(0xfff0000000000000)]
    public void What_is_not_finite_has_no_text(ulong bits)
        => Assert.Throws<CanonicalJsonException>(() => EcmaScriptNumber.Format(BitConverter.UInt64BitsToDouble(bits)));

    [Theory]
    [InlineData(1, "1")]
    [InlineData(-1.5, "-1.5")]
    [InlineData(100, "100")]
    [InlineData(123456.789, "123456.789")]
    [InlineData(1e20, "100000000000000000000")]
    [InlineData(1.5e21, "1.5e+21")]
    [InlineData(1e-6, "0.000001")]
    [InlineData(1.25e-7, "1.25e-7")]
    [InlineData(1e100, "1e+100")]
    public void The_notation_changes_where_ecma_262_says_so(double number, string text)
        => Assert.Equal(text, EcmaScriptNumber.Format(number));

    [Fact]
    public void Every_finite_double_reads_back_as_itself()
        => Gen.ULong.Select(BitConverter.UInt64BitsToDouble).Where(double.IsFinite).Sample(
            number => double.Parse(EcmaScriptNumber.Format(number), NumberStyles.Float, CultureInfo.InvariantCulture) == number,
            iter: 20_000,
            threads: 1);
}

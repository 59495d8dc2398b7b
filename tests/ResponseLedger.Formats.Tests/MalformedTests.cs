using System.Globalization;
using System.Text;

namespace ResponseLedger.Formats.Tests;

public sealed class MalformedTests
{
    private const string Head = "Frequency (Hz),Gain (dB),Phase (deg)\n";

    [Theory]
    [InlineData("", "emptyFile", null, null)]
    [InlineData(" \r\n\t\n", "emptyFile", null, null)]
    [InlineData("just words\nand more words\n", "noData", null, null)]
    [InlineData("Frequency (Hz),Gain (dB)\n", "noData", null, null)]
    [InlineData("Frequency (Hz),Gain (dB)\n10,abc\n20,abc\n", "badNumber", 3, 2)]
    [InlineData("Frequency (Hz);Gain (dB)\n10\n20\n", "shortRow", 2, 2)]
    [InlineData(Head + "10,-1,0\n20,NaN,0\n30,-3,0\n", "notANumber", 3, 2)]
    [InlineData(Head + "nan,-1,0\n20,-2,0\n30,-3,0\n", "notANumber", 2, 1)]
    [InlineData(Head + "10,-1,0\n20,-inf,0\n30,-3,0\n", "infinite", 3, 2)]
    [InlineData(Head + "10,-1,0\n20,1e999,0\n30,-3,0\n", "infinite", 3, 2)]
    [InlineData(Head + "10,-1,0\n20,-2,Infinity\n30,-3,0\n", "infinite", 3, 3)]
    [InlineData(Head + "0,-1,0\n20,-2,0\n30,-3,0\n", "zeroFrequency", 2, 1)]
    [InlineData(Head + "10,-1,0\n-20,-2,0\n30,-3,0\n", "negativeFrequency", 3, 1)]
    [InlineData(Head + "10,-1,0\n20,-2,0\n10,-3,0\n", "duplicateFrequency", 4, 1)]
    [InlineData(Head + "10,-1,0\n20,-2O,0\n30,-3,0\n", "badNumber", 3, 2)]
    [InlineData(Head + "1O,-1,0\n20,-2,0\n30,-3,0\n", "badNumber", 2, 1)]
    [InlineData(Head + "10,-1,0\n20 kHz,-2,0\n30,-3,0\n", "badNumber", 3, 1)]
    [InlineData(Head + "10,-1,0\n20,0x10,0\n30,-3,0\n", "badNumber", 3, 2)]
    [InlineData(Head + "10,-1,0\n20,-2\n30,-3,0\n", "shortRow", 3, 3)]
    [InlineData(Head + "10,-1\n20,-2,0\n30,-3,0\n", "shortRow", 2, 3)]
    [InlineData(Head + "10,-1,0\n20,-2,0,7\n30,-3,0\n", "extraFields", 3, 4)]
    [InlineData(Head + "10,-1,0\n20,,0\n30,-3,0\n", "emptyField", 3, 2)]
    [InlineData(Head + "10,-1,0\n20,-2,\n30,-3,0\n", "shortRow", 3, 3)]
    [InlineData(Head + "10,-1,0\n20,9.9E37,0\n30,-3,0\n", "overload", 3, 2)]
    [InlineData(Head + "10,-1,0\n20,-9.90000E+37,0\n30,-3,0\n", "overload", 3, 2)]
    [InlineData(Head + "10,-1,0\n20,-2,9.91E37\n30,-3,0\n", "overload", 3, 3)]
    [InlineData(Head + "10,-1,0\n20,-2,9.9000003E37\n30,-3,0\n", "overload", 3, 3)]
    [InlineData(Head + "10,-1,0\n20,-9.9000003E37,0\n30,-3,0\n", "overload", 3, 2)]
    [InlineData(Head + "10,-1,0\n20,-2,9.9100001e+37\n30,-3,0\n", "overload", 3, 3)]
    [InlineData("201,3\nFrequency (Hz),Gain (dB)\n10,-1\n20,-2\n", "numbersBeforeHeads", 2, null)]
    [InlineData(Head + "10,-1,0\n20,\"-2,0\n30,-3,0\n", "unclosedQuote", 3, 2)]
    [InlineData(Head + "10,-1,0\nend of sweep\n", "badNumber", 3, 1)]
    [InlineData(Head + "10,-1,0\n", "tooFewPoints", null, null)]
    [InlineData("f;|H|\n10;1\n20;-0.5\n", "negativeMagnitude", 3, 2)]
    [InlineData("f;Vin;Vout\n10;1;1\n20;0;1\n", "zeroInput", 3, 2)]
    [InlineData("f;Vin;Vout\n10;1;1\n20;1;-1\n", "negativeMagnitude", 3, 3)]
    [InlineData("Frequency (Hz);Gain (dB)\n1,000.5;-3\n2,000.5;-4\n", "thousandsSeparator", 2, 1)]
    [InlineData("Frequenz (Hz);Betrag (dB)\n1.000,5;-3,1\n2.000,5;-4,1\n", "thousandsSeparator", 2, 1)]
    [InlineData("Frequenz (Hz);Betrag (dB)\n100,5;-3,1\n1'000,5;-4,1\n", "thousandsSeparator", 3, 1)]
    [InlineData("Frequency (Hz)\tGain (dB)\n1,000,000\t-3\n2,000,000\t-4\n", "thousandsSeparator", 2, 1)]
    [InlineData("Frequency (Hz)\tGain (dB)\n1,000\t-3\n10,000\t-4\n", "decimalOpen", 2, null)]
    [InlineData("f (Hz),Gain (dB)\n1,5,2,5\n2,5,3,5\n", "extraFields", 1, null)]
    [InlineData("f;Gain (dB)\n1e300;1\n1e301;2\n1e400;3\n", "infinite", 4, 1)]
    [InlineData("f (GHz);Gain (dB)\n1e300;1\n1e301;2\n", "infinite", 2, null)]
    public void A_fault_is_named_with_its_line_and_field(string text, string code, int? line, int? column)
        => Reading.Of(text).Refused(code, line, column);

    [Fact]
    public void Every_fault_of_a_file_is_listed_in_the_order_of_lines()
    {
        FileReading reading = Reading.Of(Head + "10,NaN,x\n20,-2\n0,1,1\n30,1,1\n30,2,2\n");
        Assert.Equal(["2:2 notANumber", "2:3 badNumber", "3:3 shortRow", "4:1 zeroFrequency", "6:1 duplicateFrequency"],
            reading.Issues.Select(i => $"{i.Line}:{i.Column} {i.Code}"));
        Assert.Equal(5, reading.IssueCount);
    }

    [Fact]
    public void Fifty_faults_are_listed_and_all_are_counted()
    {
        var text = new StringBuilder(Head);
        for (int i = 1; i <= 200; i++)
            text.Append(CultureInfo.InvariantCulture, $"{i},{(i % 2 == 0 ? "bad" : "1")},0\n");
        for (int i = 1; i <= 80; i++)
            text.Append(CultureInfo.InvariantCulture, $"{2 * i - 1},1,0\n");
        FileReading reading = Reading.Of(text.ToString());
        Assert.Null(reading.Sweep);
        Assert.Equal(50, reading.Issues.Count);
        Assert.Equal(180, reading.IssueCount);
        Assert.Equal(Enumerable.Range(1, 50).Select(i => (int?)(2 * i + 1)), reading.Issues.Select(i => i.Line));
    }

    [Fact]
    public void What_stands_in_columns_left_aside_is_not_judged()
        => Reading.Of("Frequency (Hz),Gain (dB),Delay (s)\n10,-1,9.9E37\n20,-2,NaN\n").Taken();

    public static TheoryData<byte[]> Binaries => new()
    {
        new byte[] { 0x89, 0x50, 0x4E, 0x47, 0x0D, 0x0A, 0x1A, 0x0A, 0, 0, 0, 13 },
        new byte[] { 0x50, 0x4B, 3, 4, 20, 0, 6, 0 },
        new byte[] { 0x31, 0x2C, 0x32, 0x0A, 0, 0, 0, 0 },
        Enumerable.Range(0, 4096).Select(i => (byte)(i * 7)).ToArray(),
    };

    [Theory]
    [MemberData(nameof(Binaries))]
    public void A_binary_file_is_refused(byte[] content)
    {
        FileReading reading = SweepFileReader.Read(content, "unit.csv", null, TestContext.Current.CancellationToken);
        Assert.Null(reading.Sweep);
        Assert.Equal("binaryFile", Assert.Single(reading.Issues).Code);
    }

    [Fact]
    public void A_number_beside_a_sentinel_is_a_number()
        => Reading.Same(Reading.Of("f;|H|\n1;9.8999E37\n2;9.9101E37\n").Taken().FirstPlane, 9.8999e37, 9.9101e37);

    [Fact]
    public void Numbers_before_the_heads_are_named_with_both_lines()
        => Assert.Contains("Line 1 holds numbers and stands before the heads in line 2", Reading.Of("201,3\nFrequency (Hz),Gain (dB)\n10,-1\n").Issues[0].Message, StringComparison.Ordinal);

    [Fact]
    public void Every_sentence_tells_how_to_mend_the_file()
        => Assert.All(Reading.Of(Head + "10,NaN,x\n20,-2\n0,1,1\n30,1,1\n30,2,9.9e37\n").Issues,
            i => Assert.Matches("(take|correct|measure|add|keep|export)", i.Message));
}

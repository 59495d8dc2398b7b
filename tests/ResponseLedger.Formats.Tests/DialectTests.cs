using System.Text;
using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Formats.Tests;

public sealed class DialectTests
{
    // The same two points in every dialect: 1000.5 Hz, -0.5 dB, 10.25 degrees; 2000.75 Hz, -3.25 dB, -45.5 degrees.
    public static TheoryData<string, string, string> Dialects => new()
    {
        { "Frequency (Hz),Gain (dB),Phase (deg)\n1000.5,-0.5,10.25\n2000.75,-3.25,-45.5\n", "comma", "point" },
        { "Frequency (Hz);Gain (dB);Phase (deg)\n1000.5;-0.5;10.25\n2000.75;-3.25;-45.5\n", "semicolon", "point" },
        { "Frequenz (Hz);Betrag in dB;Phase / Grad\n1000,5;-0,5;10,25\n2000,75;-3,25;-45,5\n", "semicolon", "comma" },
        { "Frequency (Hz)\tGain (dB)\tPhase (deg)\n1000.5\t-0.5\t10.25\n2000.75\t-3.25\t-45.5", "tab", "point" },
        { "Frequenz [Hz]\tPegel [dB]\tPhase [Grad]\r\n1000,5\t-0,5\t10,25\r\n2000,75\t-3,25\t-45,5\r\n", "tab", "comma" },
        { "Frequency (Hz)   Gain (dB)   Phase (deg)\n  1000.5   -0.5 10.25\n 2000.75  -3.25    -45.5 \n", "blanks", "point" },
        { "Frequency (Hz) Gain (dB) Phase (deg)\n1000,5 -0,5 10,25\n2000,75 -3,25 -45,5\n", "blanks", "comma" },
        { "freq_hz gain_db phase_deg\r1000.5 -0.5 10.25\r2000.75 -3.25 -45.5\r", "blanks", "point" },
        { "\"Frequency (Hz)\",\"Gain (dB)\",\"Phase (deg)\"\n\"1000.5\",\"-0.5\",\"10.25\"\n\"2000.75\",\"-3.25\",\"-45.5\"\n", "comma", "point" },
        { "\"Frequenz (Hz)\",\"Betrag (dB)\",\"Phase (Grad)\"\n\"1000,5\",\"-0,5\",\"10,25\"\n\"2000,75\",\"-3,25\",\"-45,5\"\n", "comma", "comma" },
        { "Frequency (Hz), Gain (dB), Phase (deg),\n1000.5, -0.5, 10.25,\n2000.75, -3.25, -45.5,\n", "comma", "point" },
        { "Frequency;Gain;Phase\nHz;dB;deg\n1000.5;-0.5;10.25\n2000.75;-3.25;-45.5\n", "semicolon", "point" },
        { "Frequenz;Verst\u00E4rkung;Phase\n[kHz];[dB];[\u00B0]\n1,0005;-0,5;10,25\n2,00075;-3,25;-45,5\n", "semicolon", "comma" },
        { "Sweep of board 12\nOperator: M. Test\n\n# made by the bench\nFrequency (Hz),Gain (dB),Phase (deg)\n\n1000.5,-0.5,10.25\n# half way\n2000.75,-3.25,-45.5\n\n", "comma", "point" },
        { "# frequency_hz,gain_db,phase_deg\n1000.5,-0.5,10.25\n2000.75,-3.25,-45.5\n", "comma", "point" },
        { "Phase (deg),Gain (dB),Frequency (kHz)\n10.25,-0.5,1.0005\n-45.5,-3.25,2.00075\n", "comma", "point" },
        { "frequencyHz,gainDb,phaseDeg\n1000.5,-.5,1.025e1\n2.00075E+3,-325e-2,\u221245.5\n", "comma", "point" },
        { "No;Frequency (Hz);Gain (dB);Phase (deg);Status\n1;1000.5;-0.5;10.25;ok\n2;2000.75;-3.25;-45.5;ok\n", "semicolon", "point" },
    };

    [Theory]
    [MemberData(nameof(Dialects))]
    public void A_dialect_is_found_by_itself_and_told_back(string text, string delimiter, string mark)
    {
        FileReading reading = Reading.Of(text);
        Sweep sweep = reading.Taken();
        Assert.Equal(SweepForm.LevelPhase, sweep.Form);
        Reading.Near(sweep.FrequencyHz, 1000.5, 2000.75);
        Reading.Same(sweep.FirstPlane, -0.5, -3.25);
        Reading.Same(sweep.SecondPlane, 10.25, -45.5);
        Assert.Contains(reading.Notes, n => n.Code == "delimiter" && n.Message.Contains(delimiter, StringComparison.Ordinal));
        Assert.Contains(reading.Notes, n => n.Code == "decimal" && n.Message.Contains(mark, StringComparison.Ordinal));
    }

    public static TheoryData<string, byte[]> Encodings
    {
        get
        {
            const string text = "Frequenz (Hz);Verst\u00E4rkung (dB);Phase (\u00B0)\r\n10;-1,5;5\r\n20;-2,5;-10\r\n";
            return new()
            {
                { "UTF-8", Encoding.UTF8.GetBytes(text) },
                { "byte order mark", [0xEF, 0xBB, 0xBF, .. Encoding.UTF8.GetBytes(text)] },
                { "UTF-16, little", [0xFF, 0xFE, .. Encoding.Unicode.GetBytes(text)] },
                { "UTF-16, big", [0xFE, 0xFF, .. Encoding.BigEndianUnicode.GetBytes(text)] },
                { "UTF-16, little-endian, without", Encoding.Unicode.GetBytes(text) },
                { "UTF-16, big-endian, without", Encoding.BigEndianUnicode.GetBytes(text) },
                { "Latin-1", Encoding.Latin1.GetBytes(text) },
            };
        }
    }

    [Theory]
    [MemberData(nameof(Encodings))]
    public void An_encoding_is_found_by_itself_and_told_back(string told, byte[] content)
    {
        FileReading reading = SweepFileReader.Read(content, "unit.csv", null, TestContext.Current.CancellationToken);
        Sweep sweep = reading.Taken();
        Reading.Same(sweep.FirstPlane, -1.5, -2.5);
        Reading.Same(sweep.SecondPlane, 5, -10);
        Assert.Contains(reading.Notes, n => n.Code == "encoding" && n.Message.Contains(told, StringComparison.Ordinal));
    }

    [Fact]
    public void Rows_that_do_not_ascend_are_sorted_and_that_is_noted()
    {
        FileReading reading = Reading.Of("f/Hz;Gain/dB\n300;-3\n100;-1\n200;-2\n");
        Sweep sweep = reading.Taken();
        Reading.Same(sweep.FrequencyHz, 100, 200, 300);
        Reading.Same(sweep.FirstPlane, -1, -2, -3);
        Assert.Contains(reading.Notes, n => n.Code == "rowsSorted");
    }

    [Fact]
    public void Whole_numbers_leave_the_mark_to_the_first_fraction()
    {
        var text = new StringBuilder("Frequenz (Hz);Betrag (dB)\n");
        for (int i = 1; i <= 500; i++)
            text.Append(i).Append(";-3\n");
        text.Append("501,5;-3,25\n");
        Sweep sweep = Reading.Of(text.ToString()).Taken();
        Assert.Equal(501.5, sweep.FrequencyHz[500]);
        Assert.Equal(-3.25, sweep.FirstPlane[500]);
    }

    [Fact]
    public void The_digest_of_the_heads_is_that_of_their_words_and_not_of_their_numbers()
    {
        string? digest = Reading.Of("Frequency (Hz),Gain\n1,2\n3,4\n").HeadsDigest;
        Assert.Equal(64, digest?.Length);
        Assert.Equal(digest, Reading.Of("title\n frequency  (HZ) ; GAIN\n10;20\n30;40\n").HeadsDigest);
        Assert.NotEqual(digest, Reading.Of("Frequency (Hz),Level\n1,2\n3,4\n").HeadsDigest);
        Assert.Null(Reading.Of("1,2\n3,4\n").HeadsDigest);
    }
}

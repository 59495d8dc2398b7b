using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Formats.Tests;

/// <summary>Heads whose unit or words are not understood are asked, with the text named; units that are plain are scaled.</summary>
public sealed class DoubtfulHeadTests
{
    [Theory]
    [InlineData("Frequency (rpm)", "rpm")]
    [InlineData("Frequency (1/min)", "1/min")]
    [InlineData("Frequency (s)", "s")]
    [InlineData("Frequency/rpm", "rpm")]
    [InlineData("f/1/min", "1/min")]
    [InlineData("log10(Frequency)", "log10")]
    [InlineData("Frequency (log10 Hz)", "log10 Hz")]
    [InlineData("Frequency (10^3 Hz)", "10^3 Hz")]
    [InlineData("Frequency log10 (Hz)", "log10")]
    [InlineData("Normalised frequency", "Normalised")]
    [InlineData("Frequenz in Upm", "Upm")]
    [InlineData("Frequency x1000", "x1000")]
    [InlineData("Frequency (dB)", "dB")]
    public void A_frequency_that_is_not_understood_is_asked_and_never_offered_as_hertz(string head, string unread)
    {
        FileReading reading = Asked($"{head};Gain (dB)\n1000;0\n2000;-1\n", unread);
        Assert.Contains("kHz", reading.Issues[0].Message, StringComparison.Ordinal);
        Assert.Empty(reading.Candidates);
    }

    [Theory]
    [InlineData("Frequency (k)", "kHz", 1e6)]
    [InlineData("Frequency (M)", "MHz", 1e9)]
    [InlineData("Frequency (G)", "GHz", 1e12)]
    public void A_lone_prefix_is_asked_and_offered_as_what_it_may_stand_for(string head, string unit, double expectedHz)
    {
        string text = $"{head};Gain (dB)\n1000;0\n2000;-1\n";
        ColumnChoices candidate = Assert.Single(Asked(text, head[^2..^1]).Candidates);
        Assert.Equal(unit, candidate.Columns[0].Unit);
        Assert.Equal(expectedHz, Reading.Of(text, candidate).Taken().FrequencyHz[0]);
    }

    [Theory]
    [InlineData("Frequency (THz)", 1e15)]
    [InlineData("frequency_thz", 1e15)]
    [InlineData("Frequency (\u00B5Hz)", 1e-3)]
    [InlineData("krad/s", 1e6 / (2 * Math.PI))]
    [InlineData("omega (krad/s)", 1e6 / (2 * Math.PI))]
    [InlineData("\u03C9 (Mrad/s)", 1e9 / (2 * Math.PI))]
    public void A_plain_unit_of_frequency_is_scaled(string head, double expectedHz)
        => Reading.Near(Reading.Of($"{head};Gain (dB)\n1000;0\n2000;-1\n").Taken().FrequencyHz, expectedHz, 2 * expectedHz);

    [Theory]
    [InlineData("Log Mag", "Log")]
    [InlineData("ln|H|", "ln")]
    [InlineData("10log|H|", "10log")]
    [InlineData("log10|H|", "log10")]
    [InlineData("Magnitude (B)", "B")]
    [InlineData("Magnitude (dB10)", "dB10")]
    [InlineData("Magnitude (counts)", "counts")]
    [InlineData("Magnitude/counts", "counts")]
    [InlineData("Magnitude counts", "counts")]
    [InlineData("Magnitude * 10", "* 10")]
    [InlineData("Normalised gain (dB)", "Normalised")]
    [InlineData("Relative gain (dB)", "Relative")]
    [InlineData("10log|H| (dB)", "10log")]
    [InlineData("ln|H| (dB)", "ln")]
    [InlineData("Gain (dB) (V/V)", "V/V")]
    [InlineData("Gain (dB re 1 V)", "dB re 1 V")]
    [InlineData("Gain dB(A)", "A")]
    [InlineData("|H|^3", "^3")]
    public void A_gain_that_is_not_understood_is_asked(string head, string unread)
        => Asked($"Frequency (Hz);{head}\n1000;0.5\n2000;0.25\n", unread);

    [Theory]
    [InlineData("Magnitude (dBr)", "dBr", "dB")]
    [InlineData("Gain (dBc)", "dBc", "dB")]
    [InlineData("Magnitude (ppm)", "ppm", "ppm")]
    [InlineData("Magnitude (MV/V)", "MV/V", "mV/V MV/V")]
    [InlineData("|Z| (MOHM)", "MOHM", "mohm Mohm")]
    [InlineData("|Y| (MS)", "MS", "mS MS")]
    public void A_unit_that_may_mean_two_things_is_asked_with_both(string head, string stated, string units)
    {
        string text = $"Frequency (Hz);{head}\n1000;0.5\n2000;0.25\n";
        FileReading reading = Asked(text, stated);
        Assert.Equal(units, string.Join(' ', reading.Candidates.Select(c => c.Columns[1].Unit)));
    }

    [Theory]
    [InlineData("|Z| (kOhm)", 500)]
    [InlineData("|Z| (MOhm)", 5e5)]
    [InlineData("|Z| (M\u03A9)", 5e5)]
    [InlineData("|Z| (GOhm)", 5e8)]
    [InlineData("|Z| (mohm)", 5e-4)]
    [InlineData("|Y| (S)", 0.5)]
    [InlineData("|Y| (mS)", 5e-4)]
    [InlineData("|Y| (\u00B5S)", 5e-7)]
    [InlineData("Magnitude (mV/V)", 5e-4)]
    [InlineData("Magnitude (mV/MPa)", 5e-10)]
    [InlineData("Magnitude (Vrms/Vrms)", 0.5)]
    public void A_plain_unit_of_a_gain_is_scaled(string head, double expected)
    {
        Sweep sweep = Reading.Of($"Frequency (Hz);{head}\n1000;0.5\n2000;0.5\n").Taken();
        Assert.Equal(SweepForm.Ratio, sweep.Form);
        Reading.Near(sweep.FirstPlane, expected, expected);
        Assert.InRange(sweep.FirstPlane[0] / expected, 1 - 1e-12, 1 + 1e-12);
    }

    [Fact]
    public void A_neper_is_twenty_over_the_natural_logarithm_of_ten_decibels()
        => Reading.Near(Reading.Of("f;Gain (Np)\n1;1\n2;-2\n").Taken().FirstPlane, 20 / Math.Log(10), -40 / Math.Log(10));

    [Theory]
    [InlineData("Re (counts)", "Im (counts)", "counts")]
    [InlineData("Re x1000", "Im x1000", "x1000")]
    [InlineData("Re (MS)", "Im (MS)", "MS")]
    [InlineData("Re(Z)", "-Im(Z)", "-Im(Z)")]
    public void Parts_that_are_not_understood_are_asked(string real, string imaginary, string unread)
        => Asked($"f;{real};{imaginary}\n1000;0.5;0.25\n2000;0.25;0.125\n", unread);

    [Theory]
    [InlineData("Re (mS)", "Im (mS)", 1e-3)]
    [InlineData("Re(Z) (MOhm)", "Im(Z) (MOhm)", 1e6)]
    [InlineData("Re(Z) (kOhm)", "Im(Z) (kOhm)", 1e3)]
    public void Parts_in_a_plain_unit_are_scaled(string real, string imaginary, double scale)
    {
        Sweep sweep = Reading.Of($"f;{real};{imaginary}\n1000;0.5;-0.25\n2000;0.25;0.125\n").Taken();
        Reading.Near(sweep.FirstPlane, 0.5 * scale, 0.25 * scale);
        Reading.Near(sweep.SecondPlane, -0.25 * scale, 0.125 * scale);
    }

    [Theory]
    [InlineData("Vin (V)", "Vout (nV)", 0.25e-9)]
    [InlineData("Vin (V)", "Vout (pV)", 0.25e-12)]
    [InlineData("Vin rms", "Vout rms", 0.25)]
    [InlineData("Vin rms (V)", "Vout peak (mV)", 0.25e-3 / 1.4142135623730951)]
    [InlineData("Channel 1", "Channel 2", 0.25)]
    public void Amplitudes_in_a_plain_unit_are_scaled(string input, string output, double expected)
        => Assert.InRange(Reading.Of($"f;{input};{output}\n1000;2;0.5\n2000;4;1\n").Taken().FirstPlane[1] / expected, 1 - 1e-12, 1 + 1e-12);

    [Theory]
    [InlineData("Input (mA)", "Output (V)", "mA", 0)]
    [InlineData("Input (counts)", "Output (V)", "counts", 0)]
    [InlineData("Input (counts)", "Output (counts)", "counts", 0)]
    [InlineData("Input (x10)", "Output", "x10", 0)]
    [InlineData("Input (V)", "Output counts", "counts", 0)]
    [InlineData("Input (W)", "Output (W)", "W", 0)]
    [InlineData("Input W", "Output W", "W", 0)]
    [InlineData("Uin (mV)", "Uout (MV)", "MV", 2)]
    public void Amplitudes_that_are_not_understood_are_asked(string input, string output, string unread, int candidates)
        => Assert.Equal(candidates, Asked($"f;{input};{output}\n1000;2;0.5\n2000;4;1\n", unread).Candidates.Count);

    [Fact]
    public void A_phase_in_an_unknown_unit_is_asked_and_not_left_behind()
        => Assert.Equal(2, Asked("f;Gain (dB);Phase (turns)\n1;0;0.1\n2;0;0.2\n", "turns").Candidates.Count);

    [Fact]
    public void A_phase_in_milliradians_is_scaled()
        => Reading.Near(Reading.Of("f;|H|;Phase (mrad)\n1;1;1000\n2;1;2000\n").Taken().SecondPlane, 180 / Math.PI, 360 / Math.PI);

    [Theory]
    [InlineData("Hz;nonsense;deg", "nonsense")]
    [InlineData("rpm;dB;deg", "rpm")]
    [InlineData("Hz;counts;deg", "counts")]
    public void A_row_of_units_may_hold_one_that_is_not_understood_and_it_is_asked(string units, string unread)
        => Asked($"Frequency;Magnitude;Phase\n{units}\n1;0.5;10\n2;0.5;20\n", unread);

    [Fact]
    public void Units_that_contradict_each_other_are_asked()
        => Asked("Frequency (kHz);Gain\nHz;dB\n1;0\n2;0\n", "Hz");

    [Theory]
    [InlineData("Frequency (Hz);Gain board 12 (dB)")]
    [InlineData("Frequency (Hz);Gain (measured) dB")]
    [InlineData("Frequency (Hz);Log Mag (dB)")]
    [InlineData("Frequency (Hz);20*log10|H| (dB)")]
    [InlineData("freq[Hz];db:Trc1_S21")]
    [InlineData("Messung Frequenz;Gain (dB) (CH2)")]
    public void Words_that_only_decorate_a_stated_unit_are_no_doubt(string heads)
        => Reading.Same(Reading.Of($"{heads}\n1;0.5\n2;0.25\n").Taken().FirstPlane, 0.5, 0.25);

    [Fact]
    public void A_head_that_is_not_understood_does_no_harm_beside_one_that_is()
    {
        FileReading reading = Reading.Of("Frequency (Hz);log10(Frequency);Gain (dB);Gain (counts);Phase (deg)\n10;1;-1;5;10\n100;2;-2;6;20\n");
        Reading.Same(reading.Taken().FirstPlane, -1, -2);
        Assert.Contains(reading.Notes, n => n.Code == "columnsLeftAside" && n.Message.Contains("2, 4", StringComparison.Ordinal));
    }

    [Theory]
    [InlineData("Gain (W/W)", 4, 2)]
    [InlineData("Gain (mW/W)", 4000, 2)]
    [InlineData("|H|^2", 4, 2)]
    [InlineData("|H|\u00B2", 0.25, 0.5)]
    public void A_ratio_of_powers_is_ten_times_its_logarithm(string head, double power, double expected)
    {
        FileReading reading = Reading.Of(FormattableString.Invariant($"f;{head}\n1;{power}\n2;{power}\n"));
        Reading.Near(reading.Taken().FirstPlane, expected, expected);
        Assert.Contains(reading.Notes, n => n.Code == "powerRatio");
        Reading.Near(Reading.Of(FormattableString.Invariant($"f;{head}\n1;{power}\n2;{power}\n"), reading.Choices).Taken().FirstPlane, expected, expected);
    }

    [Theory]
    [InlineData("Power gain", 2)]
    [InlineData("Power gain (V/V)", 2)]
    [InlineData("Power ratio", 2)]
    public void A_gain_of_power_whose_unit_is_open_is_asked(string head, int candidates)
    {
        FileReading reading = Reading.Of($"f;{head}\n1;4\n2;4\n").Refused("columnsOpen", 1, null);
        Assert.Equal(candidates, reading.Candidates.Count);
        Assert.Contains(reading.Candidates, c => c.Columns[1].Unit == "W/W");
    }

    [Fact]
    public void A_gain_of_power_in_decibels_is_a_gain()
        => Reading.Same(Reading.Of("f;Power gain (dB)\n1;6\n2;3\n").Taken().FirstPlane, 6, 3);

    private static FileReading Asked(string text, string unread)
    {
        FileReading reading = Reading.Of(text);
        Assert.True(reading.Sweep is null, "The file was taken. " + reading.Words());
        ReadIssue issue = Assert.Single(reading.Issues);
        Assert.Equal("columnsOpen", issue.Code);
        Assert.Contains($"\"{unread}\"", issue.Message, StringComparison.Ordinal);
        foreach (ColumnChoices candidate in reading.Candidates)
            Assert.Equal(candidate.ToJson(), Reading.Of(text, candidate).Choices?.ToJson());
        return reading;
    }
}

using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Formats.Tests;

public sealed class HeadTests
{
    [Theory]
    [InlineData("Frequency (Hz)", 1e3)]
    [InlineData("Frequency", 1e3)]
    [InlineData("Freq.", 1e3)]
    [InlineData("f", 1e3)]
    [InlineData("f/kHz", 1e6)]
    [InlineData("f in kHz", 1e6)]
    [InlineData("Frequenz [MHz]", 1e9)]
    [InlineData("frequency_ghz", 1e12)]
    [InlineData("FrequencyKHz", 1e6)]
    [InlineData("Hz", 1e3)]
    [InlineData("\u03C9 (rad/s)", 1e3 / (2 * Math.PI))]
    [InlineData("omega", 1e3 / (2 * Math.PI))]
    [InlineData("omega_rad_s", 1e3 / (2 * Math.PI))]
    [InlineData("Kreisfrequenz / rad/s", 1e3 / (2 * Math.PI))]
    public void A_frequency_head_is_known_and_brought_to_hertz(string head, double expectedHz)
        => Reading.Near(Reading.Of($"{head};Gain (dB)\n1000;0\n2000;-1\n").Taken().FrequencyHz, expectedHz, 2 * expectedHz);

    [Theory]
    [InlineData("Gain [dB]", SweepForm.Level, 0.5)]
    [InlineData("Betrag in dB", SweepForm.Level, 0.5)]
    [InlineData("mag(dB)", SweepForm.Level, 0.5)]
    [InlineData("|H| (dB)", SweepForm.Level, 0.5)]
    [InlineData("20log|H|", SweepForm.Level, 0.5)]
    [InlineData("dB(S21)", SweepForm.Level, 0.5)]
    [InlineData("dB", SweepForm.Level, 0.5)]
    [InlineData("Level, dB", SweepForm.Level, 0.5)]
    [InlineData("Verst\u00E4rkung / dB", SweepForm.Level, 0.5)]
    [InlineData("Frequency response (dB)", SweepForm.Level, 0.5)]
    [InlineData("Ch2/Ch1 (dB)", SweepForm.Level, 0.5)]
    [InlineData("gain_db", SweepForm.Level, 0.5)]
    [InlineData("gainDb", SweepForm.Level, 0.5)]
    [InlineData("Attenuation (dB)", SweepForm.Level, -0.5)]
    [InlineData("Insertion loss [dB]", SweepForm.Level, -0.5)]
    [InlineData("D\u00E4mpfung in dB", SweepForm.Level, -0.5)]
    [InlineData("Einf\u00FCged\u00E4mpfung/dB", SweepForm.Level, -0.5)]
    [InlineData("|H|", SweepForm.Ratio, 0.5)]
    [InlineData("Magnitude", SweepForm.Ratio, 0.5)]
    [InlineData("Betrag", SweepForm.Ratio, 0.5)]
    [InlineData("Amplitude", SweepForm.Ratio, 0.5)]
    [InlineData("Gain (V/V)", SweepForm.Ratio, 0.5)]
    [InlineData("Gain V/V", SweepForm.Ratio, 0.5)]
    [InlineData("Gain (%)", SweepForm.Ratio, 0.005)]
    [InlineData("Sensitivity gain (mV/Pa)", SweepForm.Ratio, 0.0005)]
    [InlineData("Vout/Vin", SweepForm.Ratio, 0.5)]
    [InlineData("|Z| (kohm)", SweepForm.Ratio, 500)]
    public void A_gain_head_is_known(string head, SweepForm form, double expected)
    {
        Sweep sweep = Reading.Of($"Frequency (Hz);{head}\n1000;0.5\n2000;0.5\n").Taken();
        Assert.Equal(form, sweep.Form);
        Reading.Near(sweep.FirstPlane, expected, expected);
        Assert.False(sweep.HasPhase);
    }

    [Theory]
    [InlineData("Phase (deg)", 90)]
    [InlineData("Phase / Grad", 90)]
    [InlineData("Phase [\u00B0]", 90)]
    [InlineData("phase_deg", 90)]
    [InlineData("Winkel in Grad", 90)]
    [InlineData("ph(deg)", 90)]
    [InlineData("\u03C6 (degrees)", 90)]
    [InlineData("Phase CH2-CH1 (deg)", 90)]
    [InlineData("arg(H) (rad)", 90 * 180 / Math.PI)]
    [InlineData("Phase [rad]", 90 * 180 / Math.PI)]
    public void A_phase_head_is_known_and_brought_to_degrees(string head, double expectedDeg)
    {
        Sweep sweep = Reading.Of($"Frequency (Hz);|H|;{head}\n1000;0.5;90\n2000;0.5;90\n").Taken();
        Assert.Equal(SweepForm.RatioPhase, sweep.Form);
        Reading.Near(sweep.SecondPlane, expectedDeg, expectedDeg);
    }

    [Theory]
    [InlineData("Real", "Imag")]
    [InlineData("Re(H)", "Im(H)")]
    [InlineData("Realteil", "Imagin\u00E4rteil")]
    [InlineData("re", "im")]
    [InlineData("real (V/V)", "imaginary (V/V)")]
    public void Real_and_imaginary_heads_are_known(string real, string imaginary)
    {
        Sweep sweep = Reading.Of($"{imaginary};f;{real}\n-0.25;1000;0.5\n0.125;2000;-1\n").Taken();
        Assert.Equal(SweepForm.RealImaginary, sweep.Form);
        Reading.Same(sweep.FirstPlane, 0.5, -1);
        Reading.Same(sweep.SecondPlane, -0.25, 0.125);
    }

    [Theory]
    [InlineData("Input", "Output", 0.25)]
    [InlineData("Vin (V)", "Vout (V)", 0.25)]
    [InlineData("CH1 (V)", "CH2 (mV)", 0.00025)]
    [InlineData("Channel 1 Amplitude (mV)", "Channel 2 Amplitude (mV)", 0.25)]
    [InlineData("Eingang [\u00B5V]", "Ausgang [mV]", 250)]
    [InlineData("Kanal 1 / V", "Kanal 2 / V", 0.25)]
    [InlineData("in_v_rms", "out_v_rms", 0.25)]
    [InlineData("Input (V rms)", "Output (V peak)", 0.17677669529663687)]
    [InlineData("Input (Vpp)", "Output (Vrms)", 0.70710678118654757)]
    [InlineData("Input (Vpk)", "Output (Vpp)", 0.125)]
    public void A_pair_of_amplitudes_gives_output_over_input(string input, string output, double expected)
    {
        Sweep sweep = Reading.Of($"Frequency;{input};{output}\n1000;2;0.5\n2000;4;1\n").Taken();
        Assert.Equal(SweepForm.Ratio, sweep.Form);
        Reading.Near(sweep.FirstPlane, expected, expected);
    }

    [Theory]
    [InlineData("Input (dBV)", "Output (dBV)", -6)]
    [InlineData("Ch1 (dB)", "Ch2 (dB)", -6)]
    [InlineData("Input (dBmV)", "Output (dBV)", 54)]
    [InlineData("Input (dBu)", "Output (dBV)", -6 + 2.2184874961635639)]
    public void A_pair_of_levels_gives_their_difference(string input, string output, double expectedDb)
    {
        Sweep sweep = Reading.Of($"Frequency;{input};{output}\n1000;-2;-8\n2000;-3;-9\n").Taken();
        Assert.Equal(SweepForm.Level, sweep.Form);
        Reading.Near(sweep.FirstPlane, expectedDb, expectedDb);
    }

    [Fact]
    public void A_level_and_a_stated_voltage_are_compared_in_volts_rms()
        => Reading.Near(Reading.Of("f;Input (dBV);Output (V rms)\n1;20;5\n2;0;5\n").Taken().FirstPlane, 0.5, 5);

    [Fact]
    public void Two_phases_give_output_minus_input()
    {
        FileReading reading = Reading.Of("f;Ch1 (V);Ch1 Phase (deg);Ch2 (V);Ch2 Phase (deg)\n10;2;5;1;-40\n20;2;10;1;-80\n");
        Sweep sweep = reading.Taken();
        Assert.Equal(SweepForm.RatioPhase, sweep.Form);
        Reading.Same(sweep.SecondPlane, -45, -90);
        Assert.Contains(reading.Notes, n => n.Code == "phase");
    }

    [Fact]
    public void Amplitudes_with_the_difference_of_phase_are_taken()
        => Reading.Same(Reading.Of("f;Vin;Vout;Phase (deg)\n10;2;1;-45\n20;2;1;-90\n").Taken().SecondPlane, -45, -90);

    [Fact]
    public void Columns_that_say_the_same_are_left_aside_and_named()
    {
        FileReading reading = Reading.Of("Frequency (Hz);Ch1 (V);Ch2 (V);Gain (dB);Phase (deg)\n10;2;1;-6.0206;-45\n20;2;1;-6.0206;-90\n");
        Assert.Equal(SweepForm.LevelPhase, reading.Taken().Form);
        Assert.Contains(reading.Notes, n => n.Code == "columnsLeftAside" && n.Message.Contains("2, 3", StringComparison.Ordinal));
        Assert.Equal([ColumnQuantity.Frequency, ColumnQuantity.Ignore, ColumnQuantity.Ignore, ColumnQuantity.GainDb, ColumnQuantity.Phase], reading.Columns.Select(c => c.Quantity));
    }

    [Fact]
    public void A_unit_that_the_house_settles_is_noted()
    {
        FileReading reading = Reading.Of("Frequency;Vin;Vout (V)\n10;2;1\n20;2;1\n");
        reading.Taken();
        Assert.Equal(["The head of column 1 names no unit; it was taken in Hz.", "The head of column 2 names no unit; it was taken in V."],
            reading.Notes.Where(n => n.Code == "unitSettled").Select(n => n.Message));
    }

    [Fact]
    public void An_exact_zero_is_carried_as_a_magnitude_of_zero()
        => Reading.Same(Reading.Of("f;|H|\n1;1\n2;0\n3;1\n").Taken().FirstPlane, 1, 0, 1);
}

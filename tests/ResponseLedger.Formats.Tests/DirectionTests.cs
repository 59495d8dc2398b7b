using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Formats.Tests;

/// <summary>Which way round the two channels stand in a head: the plain opposite is turned with a note, the doubtful one asked.</summary>
public sealed class DirectionTests
{
    [Theory]
    [InlineData("Vin/Vout (dB)")]
    [InlineData("CH1/CH2 (dB)")]
    [InlineData("Channel 1 / Channel 2 (dB)")]
    [InlineData("Ue/Ua (dB)")]
    [InlineData("V in / V out (dB)")]
    [InlineData("1/|H| (dB)")]
    [InlineData("Input minus Output (dB)")]
    [InlineData("-20log|H|")]
    [InlineData("-Gain (dB)")]
    public void A_level_of_input_over_output_is_turned_and_noted(string head)
    {
        FileReading reading = Reading.Of($"f;{head}\n1;3\n2;-12\n");
        Reading.Same(reading.Taken().FirstPlane, -3, 12);
        Assert.Contains(reading.Notes, n => n.Code == "attenuation" && n.Message.Contains("opposite sign", StringComparison.Ordinal));
    }

    [Theory]
    [InlineData("Input/Output")]
    [InlineData("CH1/CH2")]
    [InlineData("Ue/Ua")]
    [InlineData("1/|H|")]
    [InlineData("|Vin|/|Vout|")]
    [InlineData("Eingang/Ausgang")]
    [InlineData("Vin/Vout (V/V)")]
    public void A_ratio_of_input_over_output_is_inverted_and_noted(string head)
    {
        FileReading reading = Reading.Of($"f;{head}\n1;4\n2;0.5\n");
        Sweep sweep = reading.Taken();
        Assert.Equal(SweepForm.Ratio, sweep.Form);
        Reading.Same(sweep.FirstPlane, 0.25, 2);
        Assert.Contains(reading.Notes, n => n.Code == "inverse");
        Reading.Same(Reading.Of($"f;{head}\n1;4\n2;0.5\n", reading.Choices).Taken().FirstPlane, 0.25, 2);
    }

    [Theory]
    [InlineData("-Phase (deg)")]
    [InlineData("\u2212arg(H) (deg)")]
    [InlineData("Phase Input minus Output (deg)")]
    [InlineData("arg(Vin/Vout) (deg)")]
    [InlineData("Phase CH1/CH2 (deg)")]
    public void A_phase_of_the_input_over_the_output_is_turned_and_noted(string head)
    {
        FileReading reading = Reading.Of($"f;|H|;{head}\n1;1;45\n2;1;-90\n");
        Reading.Same(reading.Taken().SecondPlane, -45, 90);
        Assert.Contains(reading.Notes, n => n.Code == "phaseLag");
        Reading.Same(Reading.Of($"f;|H|;{head}\n1;1;45\n2;1;-90\n", reading.Choices).Taken().SecondPlane, -45, 90);
    }

    [Theory]
    [InlineData("Phase CH1-CH2 (deg)")]
    [InlineData("Phase C1-C2 (deg)")]
    [InlineData("Phase in-out (deg)")]
    [InlineData("Phase (Input - Output) (deg)")]
    [InlineData("Phase 1-2 (deg)")]
    [InlineData("Phase A-B (deg)")]
    [InlineData("Phase 2->1 (deg)")]
    [InlineData("Phase Eingang-Ausgang (Grad)")]
    [InlineData("Phase lag (deg)")]
    [InlineData("Phasennacheilung (Grad)")]
    [InlineData("-Phase CH1-CH2 (deg)")]
    public void A_phase_that_benches_write_either_way_is_asked_and_both_ways_are_offered(string head)
    {
        string text = $"f;|H|;{head}\n1;1;45\n2;1;-90\n";
        FileReading reading = Reading.Of(text).Refused("columnsOpen", 1, null);
        Assert.Equal([ColumnQuantity.Phase, ColumnQuantity.PhaseLag], reading.Candidates.Select(c => c.Columns[2].Quantity));
        Assert.Contains("input first", reading.Issues[0].Message, StringComparison.Ordinal);
        Reading.Same(Reading.Of(text, reading.Candidates[0]).Taken().SecondPlane, 45, -90);
        Reading.Same(Reading.Of(text, reading.Candidates[1]).Taken().SecondPlane, -45, 90);
    }

    [Theory]
    [InlineData("Gain Vin/Vout (dB)", 2)]
    [InlineData("CH1-CH2 (dB)", 2)]
    [InlineData("CH2-CH1", 2)]
    [InlineData("CH1-CH2", 4)]
    [InlineData("1/Gain", 2)]
    public void A_gain_whose_direction_or_form_is_open_is_asked(string head, int candidates)
        => Assert.Equal(candidates, Reading.Of($"f;{head}\n1;4\n2;0.5\n").Refused("columnsOpen", 1, null).Candidates.Count);

    [Theory]
    [InlineData("Phase CH2-CH1 (deg)")]
    [InlineData("Phase 2-1 (deg)")]
    [InlineData("Phase 1->2 (deg)")]
    [InlineData("Phase (Output - Input) (deg)")]
    [InlineData("Phase input to output (deg)")]
    [InlineData("Phase Ausgang-Eingang (Grad)")]
    [InlineData("arg(Vout/Vin) (deg)")]
    [InlineData("- Phase (deg)")]
    public void A_phase_of_output_minus_input_stays(string head)
        => Reading.Same(Reading.Of($"f;|H|;{head}\n1;1;45\n2;1;-90\n").Taken().SecondPlane, 45, -90);

    [Fact]
    public void An_attenuation_may_name_input_over_output()
        => Reading.Same(Reading.Of("f;Attenuation Vin/Vout (dB)\n1;3\n2;12\n").Taken().FirstPlane, -3, -12);

    [Fact]
    public void An_inverse_of_zero_is_refused_on_its_line()
        => Reading.Of("f;Vin/Vout\n1;4\n2;0\n").Refused("zeroInput", 3, 2);

    [Theory]
    [InlineData("0.1\n-0.4\n-0.2\n", true)] // the largest is negative
    [InlineData("3\n-0.6\n20\n", true)] // both signs, more than ripple
    [InlineData("-3\n-6\n-20\n", true)]
    [InlineData("0.4\n-0.3\n-20\n", true)]
    [InlineData("20\n-0.5\n3\n", false)]
    [InlineData("0\n0\n0\n", false)]
    [InlineData("0\n3\n20\n", false)]
    public void An_attenuation_with_negative_values_beyond_ripple_is_asked(string values, bool asked)
    {
        string text = "f;Attenuation (dB)\n" + string.Concat(values.TrimEnd().Split('\n').Select((v, i) => $"{i + 1};{v}\n"));
        FileReading reading = Reading.Of(text);
        Assert.True(reading.Sweep is null == asked, reading.Words());
        if (!asked)
            return;
        reading.Refused("columnsOpen", 1, null);
        Assert.Equal([ColumnQuantity.GainDb, ColumnQuantity.AttenuationDb], reading.Candidates.Select(c => c.Columns[1].Quantity));
        double gain = Reading.Of(text, reading.Candidates[0]).Taken().FirstPlane[0];
        Assert.Equal(-gain, Reading.Of(text, reading.Candidates[1]).Taken().FirstPlane[0]);
    }

    [Fact]
    public void A_choice_of_other_columns_does_not_settle_the_sign_of_an_attenuation()
        => Reading.Of("f;Attenuation (dB);Phase\n1;-3;1\n2;-6;2\n", new ColumnChoices([new(3, ColumnQuantity.Phase, "deg")], null)).Refused("columnsOpen", 1, null);
}

using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Formats.Tests;

public sealed class OpenColumnTests
{
    [Theory]
    [InlineData("1000,0.5\n2000,0.25\n", 3)] // no heads: dB, ratio or attenuation
    [InlineData("1000,-0.5\n2000,-3\n", 2)] // negative: no ratio
    [InlineData("1000;0.5;10\n2000;0.25;20\n", 6)]
    [InlineData("1000;-0.5;10\n2000;0.25;20\n", 3)]
    [InlineData("1000;1;0.5;10\n2000;1;0.25;20\n", 3)]
    [InlineData("1000;1;0.5;10;5\n2000;1;0.25;20;6\n", 2)]
    [InlineData("1,5,2,5\n2,5,3,5\n", 3)] // four whole numbers a row, or two with commas: asked either way
    [InlineData("Frequency,Gain\n1000,0.5\n2000,0.25\n", 2)]
    [InlineData("Frequency,Level\n1000,0.5\n2000,0.25\n", 2)]
    [InlineData("Frequency (Hz),Gain (dB),Phase\n1000,0.5,1\n2000,0.25,1\n", 2)]
    [InlineData("Frequency (Hz),Gain,Phase\n1000,0.5,1\n2000,0.25,1\n", 4)]
    [InlineData("Frequency (mHz),Gain (dB)\n1000,0.5\n2000,0.25\n", 2)]
    [InlineData("Frequency,Input (V),Output (V rms)\n1000,0.5,1\n2000,0.25,1\n", 3)]
    [InlineData("Frequency,Gain CH2 (dB),Gain CH3 (dB)\n1000,0.5,1\n2000,0.25,1\n", 2)]
    [InlineData("Frequency,Gain (dB),Phase CH2 (deg)\n1000,0.5,1\n2000,0.25,1\n", 1)]
    [InlineData("Frequency,Output (V)\n1000,0.5\n2000,0.25\n", 3)]
    [InlineData("Frequency,Attenuation (dB)\n1000,-0.5\n2000,-3\n", 2)]
    [InlineData("Frequency,Loss (V/V)\n1000,0.5\n2000,3\n", 2)]
    [InlineData("freq[Hz];mag:Trc1_S21;ang:Trc1_S21\n1000;0.5;10\n2000;0.25;20\n", 2)]
    [InlineData("Frequency,Loss\n1000,0.5\n2000,3\n", 2)]
    public void What_is_open_is_asked_and_each_candidate_makes_a_sweep(string text, int candidates)
    {
        FileReading reading = Reading.Of(text);
        Assert.Null(reading.Sweep);
        Assert.Equal("columnsOpen", Assert.Single(reading.Issues).Code);
        Assert.True(reading.Candidates.Count == candidates, reading.Words());
        foreach (ColumnChoices candidate in reading.Candidates)
        {
            FileReading again = Reading.Of(text, candidate);
            again.Taken();
            Assert.Equal(candidate.ToJson(), again.Choices!.ToJson());
        }
    }

    [Fact]
    public void A_choice_rules_over_the_heads()
    {
        Assert.True(ColumnChoices.TryParse("""[{"column":2,"quantity":"frequency","unit":"kHz"},{"column":1,"quantity":"attenuationDb","unit":"dB"}]""", out ColumnChoices? choices, out _));
        Sweep sweep = Reading.Of("Frequency (Hz),Gain (dB)\n1000,1\n2000,2\n", choices).Taken();
        Reading.Same(sweep.FrequencyHz, 1000, 2000);
        Reading.Same(sweep.FirstPlane, -1000, -2000);
    }

    [Fact]
    public void Heads_fill_in_where_the_choice_alone_makes_no_sweep()
    {
        Assert.True(ColumnChoices.TryParse("""{"columns":[{"column":3,"quantity":"phase","unit":"rad"}]}""", out ColumnChoices? choices, out _));
        Sweep sweep = Reading.Of("Frequency,Gain (dB),Phase\n1000,1,3.141592653589793\n2000,2,0\n", choices).Taken();
        Reading.Near(sweep.SecondPlane, 180, 0);
    }

    [Theory]
    [InlineData("""[{"column":9,"quantity":"gainDb","unit":"dB"}]""")]
    [InlineData("""[{"column":1,"quantity":"frequency","unit":"dB"},{"column":2,"quantity":"gainDb","unit":"dB"}]""")]
    [InlineData("""[{"column":1,"quantity":"frequency","unit":"Hz"},{"column":2,"quantity":"frequency","unit":"Hz"}]""")]
    [InlineData("""[{"column":1,"quantity":"frequency","unit":"Hz"},{"column":2,"quantity":"phase","unit":"deg"}]""")]
    public void A_choice_that_makes_no_sweep_is_refused(string json)
    {
        Assert.True(ColumnChoices.TryParse(json, out ColumnChoices? choices, out _));
        Reading.Of("1000,1\n2000,2\n", choices).Refused("badChoice", null, null);
    }

    [Theory]
    [InlineData(ColumnQuantity.Phase, "", "Column 2 is chosen as phase of output minus input without a unit; state one of deg, rad and mrad.")]
    [InlineData(ColumnQuantity.Magnitude, "furlong", "Column 2: \"furlong\" is no unit of the magnitude; taken are ratio, %,")]
    [InlineData(ColumnQuantity.GainDb, "V", "Column 2: \"V\" is no unit of the gain; taken are dB and Np.")]
    public void A_unit_that_does_not_fit_is_answered_with_the_units_that_do(ColumnQuantity quantity, string unit, string sentence)
    {
        var choices = new ColumnChoices([new(1, ColumnQuantity.Frequency, "Hz"), new(2, quantity, unit)], null);
        Assert.StartsWith(sentence, Reading.Of("1000,1\n2000,2\n", choices).Refused("badChoice", null, null).Issues[0].Message, StringComparison.Ordinal);
    }

    [Theory]
    [InlineData("")]
    [InlineData("{")]
    [InlineData("7")]
    [InlineData("{}")]
    [InlineData("[]")]
    [InlineData("[7]")]
    [InlineData("""[{"column":0,"quantity":"phase"}]""")]
    [InlineData("""[{"column":1,"quantity":"loudness"}]""")]
    [InlineData("""[{"column":1,"quantity":"2"}]""")]
    [InlineData("""[{"column":1,"quantity":"phase","unit":7}]""")]
    [InlineData("""[{"column":1,"quantity":"phase"},{"column":1,"quantity":"phase"}]""")]
    [InlineData("""{"parameter":21}""")]
    public void Choices_that_are_no_choices_are_refused_with_a_sentence(string json)
    {
        Assert.False(ColumnChoices.TryParse(json, out ColumnChoices? choices, out string? problem));
        Assert.Null(choices);
        Assert.False(string.IsNullOrWhiteSpace(problem));
    }

    [Fact]
    public void Choices_survive_their_json()
    {
        var choices = new ColumnChoices([new(1, ColumnQuantity.Frequency, "kHz"), new(3, ColumnQuantity.OutputAmplitude, "mV rms")], "S31");
        Assert.True(ColumnChoices.TryParse(choices.ToJson(), out ColumnChoices? again, out string? problem), problem);
        Assert.Equal(choices.Columns, again!.Columns);
        Assert.Equal("S31", again.Parameter);
        Assert.StartsWith("""[{"column":1,"quantity":"frequency","unit":"kHz"}""", (choices with { Parameter = null }).ToJson(), StringComparison.Ordinal);
    }
}

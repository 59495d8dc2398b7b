using System.Numerics;
using System.Text.Json;
using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Formats.Tests;

public sealed class TouchstoneTests
{
    private static readonly JsonElement Expected = JsonDocument.Parse(File.ReadAllText(Path.Combine(Reading.ReferenceFolder, "touchstone", "expected.json"))).RootElement;

    public static TheoryData<string, string> Parameters
    {
        get
        {
            var data = new TheoryData<string, string>();
            foreach (JsonElement file in Expected.GetProperty("files").EnumerateArray())
            {
                foreach (JsonProperty parameter in file.GetProperty("points")[0].GetProperty("s").EnumerateObject())
                    data.Add(file.GetProperty("file").GetString()!, parameter.Name);
            }

            return data;
        }
    }

    [Theory]
    [MemberData(nameof(Parameters))]
    public void Every_parameter_of_the_reference_files_reads_to_the_last_digit(string file, string parameter)
    {
        byte[] content = File.ReadAllBytes(Path.Combine(Reading.ReferenceFolder, "touchstone", file));
        FileReading reading = SweepFileReader.Read(content, file, new ColumnChoices([], parameter), TestContext.Current.CancellationToken);
        Sweep sweep = reading.Taken();
        JsonElement points = Expected.GetProperty("files").EnumerateArray().First(f => f.GetProperty("file").GetString() == file).GetProperty("points");
        Assert.Equal(points.GetArrayLength(), sweep.Count);
        for (int i = 0; i < sweep.Count; i++)
        {
            double frequencyHz = points[i].GetProperty("frequencyHz").GetDouble();
            JsonElement pair = points[i].GetProperty("s").GetProperty(parameter);
            Assert.InRange(sweep.FrequencyHz[i] / frequencyHz, 1 - 1e-12, 1 + 1e-12);
            Complex gain = Gain(sweep, i);
            Assert.InRange(Math.Abs(gain.Real - pair[0].GetDouble()), 0, 1e-12);
            Assert.InRange(Math.Abs(gain.Imaginary - pair[1].GetDouble()), 0, 1e-12);
        }

        Assert.Equal(parameter, reading.Choices!.Parameter);
    }

    [Fact]
    public void The_default_is_S21_and_S11_of_one_port()
    {
        Assert.Equal("S21", Reading.OfFile("touchstone", "three-port-ma-khz.s3p").Choices!.Parameter);
        Assert.Equal("S11", Reading.OfFile("touchstone", "one-port-defaults.s1p").Choices!.Parameter);
        Assert.Contains(Reading.OfFile("touchstone", "two-port-db-mhz-noise.s2p").Notes, n => n.Code == "noise");
    }

    public static TheoryData<string, int> Malformed
    {
        get
        {
            var data = new TheoryData<string, int>();
            foreach (JsonElement file in Expected.GetProperty("malformed").EnumerateArray())
                data.Add(file.GetProperty("file").GetString()!, file.GetProperty("line").GetInt32());
            return data;
        }
    }

    [Theory]
    [MemberData(nameof(Malformed))]
    public void A_malformed_reference_file_is_refused_on_its_line(string file, int line)
    {
        FileReading reading = Reading.OfFile("touchstone", file);
        Assert.Null(reading.Sweep);
        Assert.Equal(line, Assert.Single(reading.Issues).Line);
    }

    [Theory]
    [InlineData("1 2 3\n2 3 4\n", "badOptionLine", 1, null)]
    [InlineData("! nothing\n", "badOptionLine", null, null)]
    [InlineData("# Hz S RI R 50\n", "noData", null, null)]
    [InlineData("# Hz S RI R\n1 2 3\n", "badOptionLine", 1, null)]
    [InlineData("# Hz Y RI R 50\n1 2 3\n", "notScattering", 1, null)]
    [InlineData("# Hz S RI R 50\n1 2 3\n", "tooFewPoints", null, null)]
    [InlineData("# Hz S RI R 50\n0 2 3\n1 2 3\n", "zeroFrequency", 2, 1)]
    [InlineData("# Hz S RI R 50\n1 2 3\n-1 2 3\n", "negativeFrequency", 3, 1)]
    [InlineData("# Hz S RI R 50\n1 2 3\n1 2 3\n", "duplicateFrequency", 3, null)]
    [InlineData("# Hz S MA R 50\n1 2 3\n  2 -2 3\n", "negativeMagnitude", 3, 5)]
    [InlineData("# Hz S RI R 50\n1 2 3\n2 NaN 3\n", "notANumber", 3, 3)]
    [InlineData("# Hz S RI R 50\n1 2 3\n2 inf 3\n", "infinite", 3, 3)]
    [InlineData("# Hz S RI R 50\n1 2 3\n2 9.9E37 3\n", "overload", 3, 3)]
    [InlineData("# Hz S RI R 50\n1 2 3\n2 3\n", "shortRow", 3, null)]
    [InlineData("# Hz S RI R 50\n1 2 3\n2 3 4 5\n", "extraFields", 3, null)]
    [InlineData("[Version] 3.0\n# Hz S RI R 50\n", "badKeyword", 1, null)]
    [InlineData("[Version] 2.0\n# Hz S RI R 50\n[Number of Ports] 1\n[Number of Frequencies] 3\n[Network Data]\n1 2 3\n2 3 4\n[End]\n", "badKeyword", 4, null)]
    [InlineData("[Version] 2.0\n# Hz S RI R 50\n[Number of Ports] 2\n[Network Data]\n1 2 3 4 5 6 7 8 9\n", "badKeyword", 5, null)]
    [InlineData("[Version] 2.0\n# Hz S RI R 50\n[Number of Ports] 1\n[Mood] good\n", "badKeyword", 4, null)]
    [InlineData("[Version] 2.0\n# Hz S RI R 50\n[Number of Ports] 1\n1 2 3\n", "badKeyword", 4, null)]
    public void A_fault_is_named_with_its_line_and_character(string text, string code, int? line, int? column)
        => Reading.Of(text, name: "x.s1p").Refused(code, line, column);

    [Fact]
    public void A_wrapped_record_that_is_cut_short_is_named_where_it_ends()
    {
        const string row = "1 0 0 0 0 0 0\n0 0 0 0 0 0\n0 0 0 0 0 0\n";
        string cut = "# Hz S RI R 50\n" + row + "2 0 0 0 0 0 0\n0 0 0 0 0 0\n0 0 0 0\n3" + row[1..] + "4" + row[1..];
        FileReading reading = Reading.Of(cut, name: "x.s3p").Refused("shortRow", 7, null);
        Assert.Single(reading.Issues);
    }

    [Theory]
    [InlineData("Lower", "1 11 0 21 0 22 0\n2 12 0 23 0 24 0\n", "S12", 21, 23)]
    [InlineData("Upper", "1 11 0 12 0 22 0\n2 12 0 13 0 24 0\n", "S21", 12, 13)]
    [InlineData("Upper", "1 11 0 12 0 22 0\n2 12 0 13 0 24 0\n", "S22", 22, 24)]
    public void A_triangular_matrix_is_symmetric(string format, string data, string parameter, double first, double second)
    {
        string text = $"[Version] 2.0\n# Hz S RI R 50\n[Number of Ports] 2\n[Two-Port Data Order] 21_12\n[Number of Frequencies] 2\n[Matrix Format] {format}\n[Network Data]\n{data}[End]\n";
        Reading.Same(Reading.Of(text, new ColumnChoices([], parameter), "x.ts").Taken().FirstPlane, first, second);
    }

    [Fact]
    public void A_file_without_the_extension_is_known_by_its_option_line_and_its_ports_by_the_first_record()
    {
        Assert.Equal("S21", Reading.Of("! note\n# MHz S RI R 50\n1 1 0 2 0 3 0 4 0\n2 1 0 2 0 3 0 4 0\n", name: "export.txt").Choices!.Parameter);
        Assert.Equal("S11", Reading.Of("# MHz S RI R 50\n1 1 0\n2 1 0\n", name: "export.txt").Choices!.Parameter);
        Reading.Same(Reading.Of("# kHz S DB\n1 1 0\n2 1 0\n", name: "export").Taken().FrequencyHz, 1000, 2000);
    }

    [Theory]
    [InlineData("# Hz dB\n1000,-1\n2000,-2\n", "columnsOpen")]
    [InlineData("# Hz dB deg\n1000 -1 5\n2000 -2 6\n", null)]
    [InlineData("# Hz S\n1000,-1\n2000,-2\n", "columnsOpen")]
    [InlineData("# Hz, dB\n1000,-1\n2000,-2\n", null)]
    public void A_comment_of_units_makes_no_Touchstone_file(string text, string? code)
    {
        foreach (string name in new[] { "sweep.csv", "sweep.txt" })
        {
            FileReading reading = Reading.Of(text, name: name);
            Assert.Equal("delimited", reading.Reader);
            Assert.Equal(code, reading.Issues.Count == 0 ? null : reading.Issues[0].Code);
            if (code is null)
                Reading.Same(reading.Taken().FirstPlane, -1, -2);
        }
    }

    [Theory]
    [InlineData("S31")]
    [InlineData("S0,1")]
    [InlineData("T21")]
    [InlineData("")]
    public void A_parameter_that_the_file_lacks_is_refused(string parameter)
        => Reading.Of("# Hz S RI R 50\n1 1 0 2 0 3 0 4 0\n2 1 0 2 0 3 0 4 0\n", new ColumnChoices([], parameter), "x.s2p").Refused("badChoice", null, null);

    private static Complex Gain(Sweep sweep, int i) => sweep.Form switch
    {
        SweepForm.RealImaginary => new Complex(sweep.FirstPlane[i], sweep.SecondPlane[i]),
        SweepForm.LevelPhase => Complex.FromPolarCoordinates(Math.Pow(10, sweep.FirstPlane[i] / 20), sweep.SecondPlane[i] * Math.PI / 180),
        _ => Complex.FromPolarCoordinates(sweep.FirstPlane[i], sweep.SecondPlane[i] * Math.PI / 180),
    };
}

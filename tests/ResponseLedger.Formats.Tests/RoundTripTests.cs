using System.Buffers;
using System.Globalization;
using System.Text;
using CsCheck;
using nietras.SeparatedValues;
using ResponseLedger.Engine;
using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Formats.Tests;

public sealed class RoundTripTests
{
    private static readonly Gen<double> Any = Gen.OneOf(Gen.Double[-1e3, 1e3], Gen.Double[-1e-12, 1e-12], Gen.Double[-1e12, 1e12]);

    private static readonly Gen<double[]> Frequencies = Gen.Double[1e-6, 12].Select(e => Math.Pow(10, e)).Array[2, 60]
        .Select(f => f.Distinct().Order().ToArray()).Where(f => f.Length >= 2);

    private static readonly Gen<Sweep> Sweeps =
        from frequencyHz in Frequencies
        from form in Gen.Enum<SweepForm>()
        from first in Any.Array[frequencyHz.Length]
        from second in Any.Array[frequencyHz.Length]
        select Sweep.Create(form, frequencyHz, form is SweepForm.Ratio or SweepForm.RatioPhase ? [.. first.Select(Math.Abs)] : first,
            form is SweepForm.Ratio or SweepForm.Level ? [] : second);

    [Fact]
    public void Csv_reads_back_as_the_identical_doubles() => Sweeps.Sample(sweep =>
    {
        Sweep again = Reading.Of(Encoding.UTF8.GetString(Csv(sweep))).Taken();
        return again.Form == sweep.Form && Same(again, sweep);
    }, seed: "0000KOIPe833", iter: 2_000);

    [Fact]
    public void Touchstone_reads_back_as_the_identical_doubles_and_refuses_magnitude_alone() => Sweeps.Sample(sweep =>
    {
        var buffer = new ArrayBufferWriter<byte>();
        Absence? refusal = TouchstoneWriter.Write(sweep, buffer);
        if (!sweep.HasPhase)
            return refusal?.Code == "phaseAbsent" && buffer.WrittenCount == 0;
        FileReading reading = SweepFileReader.Read(buffer.WrittenMemory, "unit.s1p", null, CancellationToken.None);
        Sweep again = reading.Taken();
        return refusal is null && again.Form == sweep.Form && Same(again, sweep);
    }, seed: "0000KOIPe833", iter: 2_000);

    [Fact]
    public void An_independent_reader_finds_the_same_numbers_in_the_csv() => Sweeps.Sample(sweep =>
    {
        using SepReader reader = Sep.New(',').Reader().From(Csv(sweep));
        int i = 0;
        foreach (SepReader.Row row in reader)
        {
            if (row[0].Parse<double>() != sweep.FrequencyHz[i] || row[1].Parse<double>() != sweep.FirstPlane[i]
                || (sweep.HasPhase && row[2].Parse<double>() != sweep.SecondPlane[i]))
            {
                return false;
            }

            i++;
        }

        return i == sweep.Count && reader.Header.ColNames.Count == (sweep.HasPhase ? 3 : 2);
    }, seed: "0000KOIPe833", iter: 200);

    [Fact]
    public void Numbers_read_the_same_with_comma_semicolon_tab_and_blanks_point_and_comma() => Sweeps.Sample(sweep =>
    {
        // A fraction of another length than three digits in the first row says that a comma is decimal.
        string point = "title\n" + Encoding.UTF8.GetString(Csv(sweep)).Replace("\n", "\r\n", StringComparison.Ordinal);
        foreach ((char delimiter, bool comma) in new[] { (';', false), (';', true), ('\t', false), ('\t', true), (' ', false), (' ', true) })
        {
            string text = point.Replace(',', delimiter);
            if (comma)
                text = text.Replace('.', ',');
            FileReading reading = Reading.Of(text);
            if (reading.Sweep is null ? reading.Issues[0].Code != "decimalOpen" : !Same(reading.Sweep, sweep))
                return false;
        }

        return true;
    }, seed: "0000KOIPe833", iter: 300);

    [Fact]
    public void Every_spelling_of_a_number_is_rounded_correctly()
    {
        Gen<string> digits = Gen.Char['0', '9'].Array[1, 24].Select(c => new string(c));
        Gen<string> spelling = Gen.Select(Gen.OneOf(Gen.Const(""), Gen.Const("-"), Gen.Const("+")), digits, Gen.OneOf(Gen.Const(""), digits.Select(d => "." + d)), Gen.OneOf(Gen.Const(""), Gen.Int[-330, 280].Select(e => FormattableString.Invariant($"e{e}"))),
            (sign, whole, fraction, power) => sign + whole + fraction + power);
        Gen.Select(spelling, spelling).Sample((a, b) =>
        {
            FileReading reading = Reading.Of($"f,Gain (dB)\n1,{a}\n2,{b}\n");
            double[] expected = [double.Parse(a, CultureInfo.InvariantCulture), double.Parse(b, CultureInfo.InvariantCulture)];
            return reading.Sweep is { } sweep ? sweep.FirstPlane.SequenceEqual(expected) : expected.Any(e => !double.IsFinite(e));
        }, seed: "0000KOIPe833", iter: 5_000);
    }

    [Fact]
    public void An_exact_zero_survives_both_writers_as_a_magnitude()
    {
        Sweep sweep = Sweep.Create(SweepForm.LevelPhase, [10, 20, 30], [-3.25, double.NegativeInfinity, 6.5], [10, 20, 30]);
        Sweep csv = Reading.Of(Encoding.UTF8.GetString(Csv(sweep))).Taken();
        var buffer = new ArrayBufferWriter<byte>();
        Assert.Null(TouchstoneWriter.Write(sweep, buffer));
        Sweep touchstone = SweepFileReader.Read(buffer.WrittenMemory, "x.s1p", null, TestContext.Current.CancellationToken).Taken();
        foreach (Sweep again in new[] { csv, touchstone })
        {
            Assert.Equal(SweepForm.RatioPhase, again.Form);
            Assert.Equal(0, again.FirstPlane[1]);
            Assert.InRange(20 * Math.Log10(again.FirstPlane[0]), -3.25 - 1e-12, -3.25 + 1e-12);
            Assert.InRange(20 * Math.Log10(again.FirstPlane[2]), 6.5 - 1e-12, 6.5 + 1e-12);
        }
    }

    [Fact]
    public void A_stream_takes_what_a_buffer_takes()
    {
        Sweep sweep = Sweep.Create(SweepForm.RealImaginary, [10, 20], [1, 0.1], [-1, 1.0 / 3]);
        using var stream = new MemoryStream();
        CsvSweepWriter.Write(sweep, stream);
        Assert.Equal(Csv(sweep), stream.ToArray());
        Assert.Equal("frequency_hz,real,imag\n10,1,-1\n20,0.1," + (1.0 / 3).ToString("R", CultureInfo.InvariantCulture) + "\n", Encoding.UTF8.GetString(stream.ToArray()));
        using var touchstone = new MemoryStream();
        Assert.Null(TouchstoneWriter.Write(sweep, touchstone));
        Assert.StartsWith("! One transfer", Encoding.UTF8.GetString(touchstone.ToArray()), StringComparison.Ordinal);
    }

    private static byte[] Csv(Sweep sweep)
    {
        var buffer = new ArrayBufferWriter<byte>();
        CsvSweepWriter.Write(sweep, buffer);
        return buffer.WrittenSpan.ToArray();
    }

    private static bool Same(Sweep a, Sweep b)
        => a.FrequencyHz.SequenceEqual(b.FrequencyHz) && a.FirstPlane.SequenceEqual(b.FirstPlane) && a.SecondPlane.SequenceEqual(b.SecondPlane);
}

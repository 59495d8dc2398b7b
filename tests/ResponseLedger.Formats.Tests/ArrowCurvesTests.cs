using Apache.Arrow;
using Apache.Arrow.Ipc;

namespace ResponseLedger.Formats.Tests;

public sealed class ArrowCurvesTests
{
    [Fact]
    public void An_overlay_comes_back_from_its_stream_with_numbers_absences_and_names()
    {
        using var stream = new MemoryStream();
        ArrowCurves.Write(stream, "gain", "dB", [10, 20, 30],
            [new ArrowCurve("r1", "S-1", "pass", [-1.5, null, 0.1]), new ArrowCurve("r2", "S-2", "", [1, 2, 3])]);
        stream.Position = 0;
        using var reader = new ArrowStreamReader(stream);
        using RecordBatch batch = reader.ReadNextRecordBatch()!;
        Assert.Equal("gain", batch.Schema.Metadata["quantity"]);
        Assert.Equal("dB", batch.Schema.Metadata["unit"]);
        Assert.Equal(["frequencyHz", "r1", "r2"], batch.Schema.FieldsList.Select(f => f.Name));
        Assert.Equal("S-1", batch.Schema.FieldsList[1].Metadata["serial"]);
        Assert.Equal("pass", batch.Schema.FieldsList[1].Metadata["outcome"]);
        Assert.Equal([10.0, 20, 30], Values(batch, 0));
        Assert.Equal([-1.5, null, 0.1], Values(batch, 1));
        Assert.Equal([1.0, 2, 3], Values(batch, 2));
        Assert.Null(reader.ReadNextRecordBatch());
    }

    private static IEnumerable<double?> Values(RecordBatch batch, int column)
        => Enumerable.Range(0, batch.Length).Select(i => ((DoubleArray)batch.Column(column)).GetValue(i));

    [Fact]
    public void An_overlay_without_runs_is_its_frequencies()
    {
        using var stream = new MemoryStream();
        ArrowCurves.Write(stream, "gain", "dB", [10, 20], []);
        stream.Position = 0;
        using var reader = new ArrowStreamReader(stream);
        using RecordBatch batch = reader.ReadNextRecordBatch()!;
        Assert.Equal(1, batch.ColumnCount);
        Assert.Equal(2, batch.Length);
    }

    [Theory]
    [InlineData(double.NaN)]
    [InlineData(double.NegativeInfinity)]
    public void A_value_that_is_not_finite_never_leaves(double value)
    {
        using var stream = new MemoryStream();
        Assert.Throws<ArgumentException>(() => ArrowCurves.Write(stream, "gain", "dB", [10], [new ArrowCurve("r", "s", "", [value])]));
    }

    [Fact]
    public void A_run_of_another_length_is_refused()
    {
        using var stream = new MemoryStream();
        Assert.Throws<ArgumentException>(() => ArrowCurves.Write(stream, "gain", "dB", [10, 20], [new ArrowCurve("r", "s", "", [1])]));
    }
}

using Apache.Arrow;
using Apache.Arrow.Ipc;
using Apache.Arrow.Types;

namespace ResponseLedger.Formats;

/// <summary>One run of an overlay as it is written to Arrow.</summary>
/// <param name="RunId">The run.</param>
/// <param name="Serial">The unit's serial number.</param>
/// <param name="Outcome">The verdict's outcome, as the API names it; empty where there is none.</param>
/// <param name="Values">One value a frequency; null where it is absent.</param>
public sealed record ArrowCurve(string RunId, string Serial, string Outcome, IReadOnlyList<double?> Values);

/// <summary>
/// Writes an overlay as an Arrow IPC stream of one batch: the column <c>frequencyHz</c>, then a float64 column a run, named by the
/// run's id, with <c>runId</c>, <c>serial</c>, <c>outcome</c>, <c>quantity</c> and <c>unit</c> as its metadata. The schema's metadata holds
/// <c>quantity</c> and <c>unit</c>. Absent values are nulls.
/// </summary>
public static class ArrowCurves
{
    /// <summary>The name of the column of frequencies.</summary>
    public const string FrequencyColumn = "frequencyHz";

    /// <summary>Writes the overlay; the stream stays open.</summary>
    /// <param name="output">Where to.</param>
    /// <param name="quantity">What the values are, such as <c>gain</c>.</param>
    /// <param name="unit">Their unit, such as <c>dB</c>.</param>
    /// <param name="frequencyHz">The common frequencies in Hz.</param>
    /// <param name="curves">The runs, each with one value a frequency.</param>
    /// <exception cref="ArgumentNullException">An argument is missing.</exception>
    /// <exception cref="ArgumentException">A run has another number of values than there are frequencies, or a value is not finite.</exception>
    public static void Write(Stream output, string quantity, string unit, IReadOnlyList<double> frequencyHz, IReadOnlyList<ArrowCurve> curves)
    {
        ArgumentNullException.ThrowIfNull(output);
        ArgumentNullException.ThrowIfNull(quantity);
        ArgumentNullException.ThrowIfNull(unit);
        ArgumentNullException.ThrowIfNull(frequencyHz);
        ArgumentNullException.ThrowIfNull(curves);
        var schema = new Schema.Builder()
            .Metadata("quantity", quantity)
            .Metadata("unit", unit)
            .Field(f => f.Name(FrequencyColumn).DataType(DoubleType.Default).Nullable(false).Metadata("unit", "Hz"));
        var columns = new List<IArrowArray>(curves.Count + 1) { Column(frequencyHz.Count, i => frequencyHz[i]) };
        foreach (ArrowCurve curve in curves)
        {
            if (curve.Values.Count != frequencyHz.Count)
                throw new ArgumentException($"Run {curve.RunId} has {curve.Values.Count} values for {frequencyHz.Count} frequencies.", nameof(curves));
            schema.Field(f => f.Name(curve.RunId).DataType(DoubleType.Default).Nullable(true)
                .Metadata("runId", curve.RunId).Metadata("serial", curve.Serial).Metadata("outcome", curve.Outcome)
                .Metadata("quantity", quantity).Metadata("unit", unit));
            columns.Add(Column(curve.Values.Count, i => curve.Values[i]));
        }

        Schema built = schema.Build();
        using var batch = new RecordBatch(built, columns, frequencyHz.Count);
        using var writer = new ArrowStreamWriter(output, built, leaveOpen: true);
        writer.WriteRecordBatch(batch);
        writer.WriteEnd();
    }

    private static DoubleArray Column(int count, Func<int, double?> value)
    {
        var column = new DoubleArray.Builder();
        column.Reserve(count);
        for (int i = 0; i < count; i++)
        {
            if (value(i) is not { } present)
                column.AppendNull();
            else if (double.IsFinite(present))
                column.Append(present);
            else
                throw new ArgumentException($"Value {i} is not finite; send null where a value is absent.", nameof(value));
        }

        return column.Build();
    }
}

using System.Buffers;
using System.Globalization;
using System.Text.Json;
using ResponseLedger.Records.Verdicts;
using ResponseLedger.Store.Queries;

namespace ResponseLedger.Server.Lots;

/// <summary>The members of an overlay, for its description; <see cref="OverlayJson"/> writes them.</summary>
internal sealed record OverlayShape(
    string Quantity,
    string Basis,
    string Unit,
    LotConditionView Condition,
    double[] FrequencyHz,
    OverlayRunShape[] Runs,
    OverlayGoldenShape? Golden,
    OverlayLimitShape[] Limits,
    OverlayNote[] Notes);

/// <summary>A run of an overlay; one value a frequency, null where it is absent.</summary>
internal sealed record OverlayRunShape(Guid RunId, string Serial, string? Outcome, double?[] Values);

/// <summary>The golden run of an overlay.</summary>
internal sealed record OverlayGoldenShape(Guid RunId, string Serial, double?[] Values);

/// <summary>A limit of an overlay: side is upper or lower; null where it has no value.</summary>
internal sealed record OverlayLimitShape(string Name, string Side, double[] FrequencyHz, double?[] Values);

/// <summary>Writes an overlay as JSON. The numbers of each run, by far the most of it, are put into text on several cores, in pooled memory.</summary>
internal static class OverlayJson
{
    // The longest double in round-trip form has 24 characters; a comma follows it.
    private const int LongestNumber = 25;

    public static void Write(IBufferWriter<byte> output, Overlay overlay)
    {
        var texts = new PooledText[overlay.Runs.Count];
        try
        {
            Parallel.For(0, texts.Length, i => texts[i] = TextOf(overlay.Axis, overlay.Runs[i]));
            using var writer = new Utf8JsonWriter(output, new JsonWriterOptions { SkipValidation = true });
            Write(writer, overlay, texts);
        }
        finally
        {
            foreach (var text in texts)
                text.Return();
        }
    }

    private static void Write(Utf8JsonWriter writer, Overlay overlay, PooledText[] texts)
    {
        var (question, curves) = (overlay.Question, overlay.Curves);
        writer.WriteStartObject();
        writer.WriteString("quantity", question.QuantityWord);
        writer.WriteString("basis", question.BasisWord);
        writer.WriteString("unit", question.UnitOf(curves.GainUnit));
        WriteCondition(writer, curves.Condition);
        WriteNumbers(writer, "frequencyHz", overlay.Axis.FrequencyHz);
        writer.WriteStartArray("runs");
        for (var i = 0; i < texts.Length; i++)
        {
            var run = curves.Runs[i];
            writer.WriteStartObject();
            writer.WriteString("runId", run.RunId);
            writer.WriteString("serial", run.Serial);
            writer.WriteString("outcome", run.Outcome is { } outcome ? OutcomeWords.Format(outcome) : null);
            writer.WritePropertyName("values");
            writer.WriteRawValue(texts[i].Utf8, skipInputValidation: true);
            writer.WriteEndObject();
        }

        writer.WriteEndArray();
        WriteGolden(writer, overlay);
        writer.WriteStartArray("limits");
        foreach (var limit in overlay.Limits)
        {
            writer.WriteStartObject();
            writer.WriteString("name", limit.Name);
            writer.WriteString("side", limit.Side);
            WriteNumbers(writer, "frequencyHz", limit.FrequencyHz);
            WriteNumbers(writer, "values", limit.Values);
            writer.WriteEndObject();
        }

        writer.WriteEndArray();
        writer.WriteStartArray("notes");
        foreach (var note in overlay.Notes)
        {
            writer.WriteStartObject();
            writer.WriteString("code", note.Code);
            writer.WriteString("message", note.Message);
            writer.WriteEndObject();
        }

        writer.WriteEndArray();
        writer.WriteEndObject();
    }

    private static void WriteCondition(Utf8JsonWriter writer, LotCondition condition)
    {
        writer.WriteStartObject("condition");
        writer.WriteString("id", condition.Id);
        writer.WriteString("name", condition.Name);
        if (condition.MaskRevision is { } revision)
            writer.WriteNumber("maskRevision", revision);
        else
            writer.WriteNull("maskRevision");
        if (condition.GoldenRunId is { } golden)
            writer.WriteString("goldenRunId", golden);
        else
            writer.WriteNull("goldenRunId");
        writer.WriteEndObject();
    }

    private static void WriteGolden(Utf8JsonWriter writer, Overlay overlay)
    {
        if (overlay is not { Golden: { } line, Curves.Golden: { } golden })
        {
            writer.WriteNull("golden");
            return;
        }

        writer.WriteStartObject("golden");
        writer.WriteString("runId", golden.RunId);
        writer.WriteString("serial", golden.Serial);
        var values = new double[overlay.Axis.FrequencyHz.Length];
        overlay.Axis.Fill(line, values);
        WriteNumbers(writer, "values", values);
        writer.WriteEndObject();
    }

    private static void WriteNumbers(Utf8JsonWriter writer, string name, ReadOnlySpan<double> values)
    {
        writer.WriteStartArray(name);
        foreach (var value in values)
        {
            if (double.IsFinite(value))
                writer.WriteNumberValue(value);
            else
                writer.WriteNullValue();
        }

        writer.WriteEndArray();
    }

    private static PooledText TextOf(OverlayAxis axis, OverlayLine line)
    {
        var count = axis.FrequencyHz.Length;
        var values = ArrayPool<double>.Shared.Rent(count);
        var text = ArrayPool<byte>.Shared.Rent(count * LongestNumber + 2);
        axis.Fill(line, values.AsSpan(0, count));
        var length = 0;
        text[length++] = (byte)'[';
        for (var i = 0; i < count; i++)
        {
            if (i > 0)
                text[length++] = (byte)',';
            if (double.IsFinite(values[i]))
            {
                values[i].TryFormat(text.AsSpan(length), out var written, default, CultureInfo.InvariantCulture);
                length += written;
            }
            else
            {
                "null"u8.CopyTo(text.AsSpan(length));
                length += 4;
            }
        }

        text[length++] = (byte)']';
        ArrayPool<double>.Shared.Return(values);
        return new PooledText(text, length);
    }

    private readonly record struct PooledText(byte[]? Bytes, int Length)
    {
        public ReadOnlySpan<byte> Utf8 => Bytes.AsSpan(0, Length);

        public void Return()
        {
            if (Bytes is not null)
                ArrayPool<byte>.Shared.Return(Bytes);
        }
    }
}

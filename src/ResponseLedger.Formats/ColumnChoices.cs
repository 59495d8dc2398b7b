using System.Text;
using System.Text.Json;

namespace ResponseLedger.Formats;

/// <summary>What one column holds.</summary>
/// <param name="Column">The 1-based column.</param>
/// <param name="Quantity">What it holds.</param>
/// <param name="Unit">Its unit, such as <c>kHz</c>, <c>dB</c>, <c>V rms</c>, <c>deg</c>; empty where there is nothing to choose (Hz, dB, ratio, V).</param>
public sealed record ColumnChoice(int Column, ColumnQuantity Quantity, string Unit);

/// <summary>What the columns of a file hold, or which parameter of a Touchstone file is the run.</summary>
/// <param name="Columns">The columns that are used; those not named are left aside where the named ones suffice.</param>
/// <param name="Parameter">Touchstone: the parameter, such as <c>S31</c> or <c>S10,1</c>; null for the default.</param>
public sealed record ColumnChoices(IReadOnlyList<ColumnChoice> Columns, string? Parameter)
{
    private const char Unreadable = '\uFFFD';

    private const int LargestColumn = 4096;

    /// <summary>Reads choices from JSON: an array of <c>{column, quantity, unit}</c>, or an object with <c>columns</c> and <c>parameter</c>.</summary>
    /// <param name="json">The text; at most a few kilobytes are sensible.</param>
    /// <param name="choices">The choices, null when the text is refused.</param>
    /// <param name="problem">What is wrong with the text, null when it is taken.</param>
    /// <returns>Whether the text was taken.</returns>
    public static bool TryParse(string json, out ColumnChoices? choices, out string? problem)
    {
        choices = null;
        JsonDocument document;
        try
        {
            document = JsonDocument.Parse(json ?? "");
        }
        catch (JsonException)
        {
            problem = "The columns are not JSON; send [{\"column\":1,\"quantity\":\"frequency\",\"unit\":\"Hz\"},...].";
            return false;
        }

        using (document)
        {
            JsonElement list = document.RootElement;
            string? parameter = null;
            if (list.ValueKind == JsonValueKind.Object)
            {
                if (list.TryGetProperty("parameter", out JsonElement named) && named.ValueKind != JsonValueKind.Null)
                {
                    if (named.ValueKind != JsonValueKind.String)
                    {
                        problem = "The parameter is not a text; send for example \"S21\".";
                        return false;
                    }

                    parameter = TextOf(named);
                    if (parameter.Any(c => char.IsControl(c) || c == Unreadable))
                    {
                        problem = "The parameter holds characters that no parameter has; send for example \"S21\".";
                        return false;
                    }
                }

                if (!list.TryGetProperty("columns", out JsonElement inner) || inner.ValueKind == JsonValueKind.Null)
                {
                    problem = parameter is null ? "Neither columns nor a parameter is given." : null;
                    choices = parameter is null ? null : new ColumnChoices([], parameter);
                    return problem is null;
                }

                list = inner;
            }

            if (list.ValueKind != JsonValueKind.Array)
            {
                problem = "The columns are not a list; send [{\"column\":1,\"quantity\":\"frequency\",\"unit\":\"Hz\"},...].";
                return false;
            }

            var columns = new List<ColumnChoice>();
            foreach (JsonElement entry in list.EnumerateArray())
            {
                problem = ReadChoice(entry, out ColumnChoice? choice);
                if (problem is not null)
                    return false;
                if (columns.Exists(c => c.Column == choice!.Column))
                {
                    problem = $"Column {choice!.Column} is named twice.";
                    return false;
                }

                columns.Add(choice!);
            }

            problem = columns.Count == 0 && parameter is null ? "No column is named." : null;
            choices = problem is null ? new ColumnChoices(columns, parameter) : null;
            return problem is null;
        }
    }

    /// <summary>The choices as JSON: an array of columns, or an object where a parameter is chosen.</summary>
    public string ToJson()
    {
        using var buffer = new MemoryStream();
        using (var writer = new Utf8JsonWriter(buffer))
        {
            if (Parameter is not null)
            {
                writer.WriteStartObject();
                writer.WriteString("parameter", Parameter);
                writer.WritePropertyName("columns");
            }

            writer.WriteStartArray();
            foreach (ColumnChoice choice in Columns)
            {
                writer.WriteStartObject();
                writer.WriteNumber("column", choice.Column);
                writer.WriteString("quantity", JsonNamingPolicy.CamelCase.ConvertName(choice.Quantity.ToString()));
                writer.WriteString("unit", choice.Unit);
                writer.WriteEndObject();
            }

            writer.WriteEndArray();
            if (Parameter is not null)
                writer.WriteEndObject();
        }

        return Encoding.UTF8.GetString(buffer.GetBuffer(), 0, (int)buffer.Length);
    }

    private static string? ReadChoice(JsonElement entry, out ColumnChoice? choice)
    {
        choice = null;
        if (entry.ValueKind != JsonValueKind.Object)
            return "A column is not an object with column, quantity and unit.";
        if (!entry.TryGetProperty("column", out JsonElement column) || column.ValueKind != JsonValueKind.Number
            || !column.TryGetInt32(out int number) || number is < 1 or > LargestColumn)
            return $"A column number is missing or outside 1 to {LargestColumn}.";
        if (!entry.TryGetProperty("quantity", out JsonElement named) || named.ValueKind != JsonValueKind.String
            || !TryQuantity(TextOf(named), out ColumnQuantity quantity))
        {
            return $"Column {number} has no known quantity; known are "
                + string.Join(", ", Enum.GetNames<ColumnQuantity>().Select(JsonNamingPolicy.CamelCase.ConvertName)) + ".";
        }

        string unit = "";
        if (entry.TryGetProperty("unit", out JsonElement stated) && stated.ValueKind != JsonValueKind.Null)
        {
            if (stated.ValueKind != JsonValueKind.String)
                return $"The unit of column {number} is not a text.";
            unit = TextOf(stated);
        }

        choice = new ColumnChoice(number, quantity, unit);
        return null;
    }

    // A text that is half of a surrogate pair cannot be read; no quantity, unit or parameter is named so.
    private static string TextOf(JsonElement text)
    {
        try
        {
            return text.GetString()!;
        }
        catch (InvalidOperationException)
        {
            return Unreadable.ToString();
        }
    }

    private static bool TryQuantity(string name, out ColumnQuantity quantity)
    {
        foreach (ColumnQuantity known in Enum.GetValues<ColumnQuantity>())
        {
            if (string.Equals(name, known.ToString(), StringComparison.OrdinalIgnoreCase))
            {
                quantity = known;
                return true;
            }
        }

        quantity = ColumnQuantity.Ignore;
        return false;
    }
}

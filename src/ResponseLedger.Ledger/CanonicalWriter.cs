using System.Buffers;
using System.Globalization;
using System.Text;
using System.Text.Json;
using System.Text.Json.Nodes;

namespace ResponseLedger.Ledger;

/// <summary>Writes one JSON value by the rules of RFC 8785 section 3.2.</summary>
internal readonly struct CanonicalWriter(ArrayBufferWriter<byte> buffer)
{
    private static readonly UTF8Encoding Strict = new(encoderShouldEmitUTF8Identifier: false, throwOnInvalidBytes: true);

    public void Write(JsonNode? node, int depth)
    {
        switch (node)
        {
            case null:
                Raw("null");
                break;
            case JsonObject members:
                WriteObject(MembersOf(members), depth, static (writer, value, at) => writer.Write(value, at));
                break;
            case JsonArray items:
                WriteArray(items, depth, static (writer, value, at) => writer.Write(value, at));
                break;
            case JsonValue value:
                WriteValue(value, depth);
                break;
        }
    }

    public void Write(JsonElement element, int depth)
    {
        switch (element.ValueKind)
        {
            case JsonValueKind.Object:
                WriteObject(MembersOf(element), depth, static (writer, value, at) => writer.Write(value, at));
                break;
            case JsonValueKind.Array:
                WriteArray(element.EnumerateArray(), depth, static (writer, value, at) => writer.Write(value, at));
                break;
            case JsonValueKind.String:
                WriteString(TextOf(element));
                break;
            case JsonValueKind.Number:
                Raw(EcmaScriptNumber.Format(double.Parse(element.GetRawText(), NumberStyles.Float, CultureInfo.InvariantCulture)));
                break;
            case JsonValueKind.True:
                Raw("true");
                break;
            case JsonValueKind.False:
                Raw("false");
                break;
            case JsonValueKind.Null:
                Raw("null");
                break;
            default:
                throw new CanonicalJsonException("An undefined value has no canonical form.");
        }
    }

    private void WriteObject<T>(List<KeyValuePair<string, T>> members, int depth, Action<CanonicalWriter, T, int> write)
    {
        Descend(depth);

        // Section 3.2.3: names ascend by UTF-16 code unit, which is what ordinal comparison of .NET strings does.
        members.Sort(static (a, b) => string.CompareOrdinal(a.Key, b.Key));
        Raw("{");
        for (var i = 0; i < members.Count; i++)
        {
            if (i > 0)
            {
                if (string.Equals(members[i - 1].Key, members[i].Key, StringComparison.Ordinal))
                    throw new CanonicalJsonException($"The member \"{members[i].Key}\" stands twice in one object.");
                Raw(",");
            }

            WriteString(members[i].Key);
            Raw(":");
            write(this, members[i].Value, depth + 1);
        }

        Raw("}");
    }

    private void WriteArray<T>(IEnumerable<T> items, int depth, Action<CanonicalWriter, T, int> write)
    {
        Descend(depth);
        Raw("[");
        var first = true;
        foreach (var item in items)
        {
            if (!first)
                Raw(",");
            first = false;
            write(this, item, depth + 1);
        }

        Raw("]");
    }

    private void WriteValue(JsonValue value, int depth)
    {
        if (value.TryGetValue(out JsonElement element))
        {
            Write(element, depth);
            return;
        }

        switch (value.GetValueKind())
        {
            case JsonValueKind.String:
                // Only a string or char can hold a lone surrogate; dates and ids are written by the serializer in ASCII.
                WriteString(value.TryGetValue(out string? text) ? text : SerializedTextOf(value));
                break;
            case JsonValueKind.Number:
                Raw(EcmaScriptNumber.Format(NumberOf(value)));
                break;
            case JsonValueKind.True:
                Raw("true");
                break;
            case JsonValueKind.False:
                Raw("false");
                break;
            default:
                throw new CanonicalJsonException("Build documents of objects, arrays, strings, numbers and booleans.");
        }
    }

    private static double NumberOf(JsonValue value)
    {
        if (value.TryGetValue(out double real))
            return real;
        if (value.TryGetValue(out float single) && !float.IsFinite(single))
            return single;
        var text = value.ToJsonString();
        var number = double.Parse(text, NumberStyles.Float, CultureInfo.InvariantCulture);

        // RFC 8785 appendix D: an integer that a double cannot hold belongs in a string, else its last digits are lost in silence.
        if (decimal.TryParse(text, NumberStyles.Float, CultureInfo.InvariantCulture, out var exact)
            && decimal.IsInteger(exact)
            && new System.Numerics.BigInteger(exact) != new System.Numerics.BigInteger(number))
        {
            throw new CanonicalJsonException($"The integer {text} does not fit a double; write it as a string.");
        }

        return number;
    }

    private void WriteString(string text)
    {
        var escaped = new StringBuilder(text.Length + 2).Append('"');
        foreach (var unit in text)
        {
            _ = unit switch
            {
                '"' => escaped.Append("\\\""),
                '\\' => escaped.Append("\\\\"),
                '\b' => escaped.Append("\\b"),
                '\t' => escaped.Append("\\t"),
                '\n' => escaped.Append("\\n"),
                '\f' => escaped.Append("\\f"),
                '\r' => escaped.Append("\\r"),
                < ' ' => escaped.Append(CultureInfo.InvariantCulture, $"\\u{(int)unit:x4}"),
                _ => escaped.Append(unit),
            };
        }

        Raw(escaped.Append('"').ToString());
    }

    private void Raw(string text)
    {
        try
        {
            var written = Strict.GetBytes(text, buffer.GetSpan(Strict.GetMaxByteCount(text.Length)));
            buffer.Advance(written);
        }
        catch (EncoderFallbackException lone)
        {
            throw new CanonicalJsonException("A string holds half of a surrogate pair.", lone);
        }
    }

    private static void Descend(int depth)
    {
        if (depth >= CanonicalJson.MaxDepth)
            throw new CanonicalJsonException($"Objects and arrays nest deeper than {CanonicalJson.MaxDepth}.");
    }

    private static List<KeyValuePair<string, JsonNode?>> MembersOf(JsonObject members)
    {
        try
        {
            return [.. members];
        }
        catch (Exception refused) when (refused is ArgumentException or InvalidOperationException)
        {
            throw new CanonicalJsonException("An object has a member twice, or a name that is not text.", refused);
        }
    }

    private static List<KeyValuePair<string, JsonElement>> MembersOf(JsonElement element)
    {
        var members = new List<KeyValuePair<string, JsonElement>>();
        try
        {
            foreach (var member in element.EnumerateObject())
                members.Add(new(member.Name, member.Value));
        }
        catch (InvalidOperationException lone)
        {
            throw new CanonicalJsonException("A member name holds half of a surrogate pair.", lone);
        }

        return members;
    }

    private static string TextOf(JsonElement element)
    {
        try
        {
            return element.GetString()!;
        }
        catch (InvalidOperationException lone)
        {
            throw new CanonicalJsonException("A string holds half of a surrogate pair.", lone);
        }
    }

    private static string SerializedTextOf(JsonValue value)
    {
        if (value.TryGetValue(out char unit))
            return unit.ToString();
        using var document = JsonDocument.Parse(value.ToJsonString());
        return document.RootElement.GetString()!;
    }
}

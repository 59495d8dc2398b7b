using System.Globalization;
using System.Text.Json;
using System.Text.Json.Serialization;
using ResponseLedger.Ledger;

namespace ResponseLedger.Server.Http;

/// <summary>How the API writes JSON: camelCase, words for enumerations, times in UTC with microseconds, no non-finite number.</summary>
internal static class Json
{
    public static void Configure(JsonSerializerOptions options)
    {
        options.PropertyNamingPolicy = JsonNamingPolicy.CamelCase;
        options.DictionaryKeyPolicy = null;
        options.NumberHandling = JsonNumberHandling.Strict;
        options.Converters.Add(new JsonStringEnumConverter(JsonNamingPolicy.CamelCase, allowIntegerValues: false));
        options.Converters.Add(new MicrosecondTime());
    }

    private sealed class MicrosecondTime : JsonConverter<DateTimeOffset>
    {
        public override DateTimeOffset Read(ref Utf8JsonReader reader, Type typeToConvert, JsonSerializerOptions options)
            => reader.TokenType == JsonTokenType.String
                && DateTimeOffset.TryParse(reader.GetString(), CultureInfo.InvariantCulture, DateTimeStyles.AssumeUniversal | DateTimeStyles.AdjustToUniversal, out var time)
                ? Microseconds.Cut(time)
                : throw new JsonException("A time is written as RFC 3339, such as 2026-03-01T09:30:00Z.");

        public override void Write(Utf8JsonWriter writer, DateTimeOffset value, JsonSerializerOptions options)
            => writer.WriteStringValue(Microseconds.Format(value));
    }
}

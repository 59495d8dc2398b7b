using System.Text.Json;
using System.Text.Json.Serialization;

namespace ResponseLedger.Server.Devices;

/// <summary>A member of a change that tells "set to nothing" (an explicit null) from "left as it is" (left out).</summary>
/// <param name="IsGiven">Whether the member stood in the request.</param>
/// <param name="Value">What it was set to.</param>
[JsonConverter(typeof(GivenConverterFactory))]
internal readonly record struct Given<T>(bool IsGiven, T Value)
{
    /// <summary>The new value, or the one that was.</summary>
    public T Or(T before) => IsGiven ? Value : before;
}

/// <summary>Reads <see cref="Given{T}"/> as its value.</summary>
internal sealed class GivenConverterFactory : JsonConverterFactory
{
    public override bool CanConvert(Type typeToConvert) => typeToConvert.IsGenericType && typeToConvert.GetGenericTypeDefinition() == typeof(Given<>);

    public override JsonConverter CreateConverter(Type typeToConvert, JsonSerializerOptions options)
        => (JsonConverter)Activator.CreateInstance(typeof(Converter<>).MakeGenericType(typeToConvert.GetGenericArguments()))!;

    private sealed class Converter<T> : JsonConverter<Given<T>>
    {
        public override bool HandleNull => true;

        public override Given<T> Read(ref Utf8JsonReader reader, Type typeToConvert, JsonSerializerOptions options)
        {
            try
            {
                return new(true, JsonSerializer.Deserialize<T>(ref reader, options)!);
            }
            catch (JsonException)
            {
                // A fresh one: the serializer outside adds the path of the member, which the inner one does not know.
                throw new JsonException();
            }
        }

        public override void Write(Utf8JsonWriter writer, Given<T> value, JsonSerializerOptions options)
            => JsonSerializer.Serialize(writer, value.Value, options);
    }
}

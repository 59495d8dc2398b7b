using System.Text.Json.Nodes;

namespace ResponseLedger.Records.Strict;

/// <summary>Numbers on their way out: finite or null, never anything else.</summary>
internal static class JsonNumber
{
    /// <summary>A JSON number, or null for an absent one.</summary>
    /// <exception cref="ArgumentException">The number is not finite: what has no value must be absent, with a reason.</exception>
    public static JsonNode? Of(double? number) => number is { } value ? JsonValue.Create(Finite(value)) : null;

    public static double? FiniteOrAbsent(double? number) => number is { } value ? Finite(value) : null;

    private static double Finite(double value) => double.IsFinite(value)
        ? value
        : throw new ArgumentException("A number that is not finite stands where an absent one belongs.");
}

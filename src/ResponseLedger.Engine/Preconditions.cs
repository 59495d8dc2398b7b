using System.Diagnostics.CodeAnalysis;
using System.Globalization;

namespace ResponseLedger.Engine;

/// <summary>The one place that refuses unusable arguments; every sentence names the argument, the value and what would be taken.</summary>
internal static class Preconditions
{
    internal static void RequireSameCount(int count, int expected, string parameter)
    {
        if (count != expected)
            Refuse(parameter, $"{parameter} holds {Say(count)} values where the sweep has {Say(expected)} points; give one value a point.");
    }

    internal static void RequireAscendingFrequencies(ReadOnlySpan<double> frequencyHz, string parameter)
    {
        if (frequencyHz.Length < 2)
            Refuse(parameter, $"A sweep needs 2 or more points; {Say(frequencyHz.Length)} came.");
        double previous = 0;
        for (int i = 0; i < frequencyHz.Length; i++)
        {
            double frequency = frequencyHz[i];
            if (!double.IsFinite(frequency) || frequency <= 0)
                Refuse(parameter, $"Frequency {Say(i + 1)} is {Say(frequency)} Hz; frequencies are finite and above 0 Hz.");
            if (frequency <= previous)
                Refuse(parameter, $"Frequency {Say(i + 1)} is {Say(frequency)} Hz after {Say(previous)} Hz; frequencies ascend strictly.");
            previous = frequency;
        }
    }

    internal static void RequireFinite(ReadOnlySpan<double> values, string parameter)
    {
        for (int i = 0; i < values.Length; i++)
        {
            if (!double.IsFinite(values[i]))
                Refuse(parameter, $"Value {Say(i + 1)} of {parameter} is {Say(values[i])}; it must be finite.");
        }
    }

    internal static void RequireLevels(ReadOnlySpan<double> levelDb, string parameter)
    {
        for (int i = 0; i < levelDb.Length; i++)
        {
            if (double.IsNaN(levelDb[i]) || double.IsPositiveInfinity(levelDb[i]))
                Refuse(parameter, $"Level {Say(i + 1)} is {Say(levelDb[i])} dB; a level is finite, or negative infinity for a gain of exactly zero.");
        }
    }

    internal static void RequireRatios(ReadOnlySpan<double> ratio, string parameter)
    {
        for (int i = 0; i < ratio.Length; i++)
        {
            if (!double.IsFinite(ratio[i]) || ratio[i] < 0)
                Refuse(parameter, $"Ratio {Say(i + 1)} is {Say(ratio[i])}; a magnitude is finite and zero or more.");
        }
    }

    internal static void RequirePositive(double value, string parameter)
    {
        if (!double.IsFinite(value) || value <= 0)
            Refuse(parameter, $"{parameter} is {Say(value)}; it must be finite and above 0.");
    }

    internal static void Require([DoesNotReturnIf(false)] bool condition, string parameter, string sentence)
    {
        if (!condition)
            Refuse(parameter, sentence);
    }

    /// <summary>A number as sentences carry it: shortest form that reads back, decimal point.</summary>
    internal static string Say(double value) => value.ToString("R", CultureInfo.InvariantCulture);

    [DoesNotReturn]
    private static void Refuse(string parameter, string sentence) => throw new ArgumentException(sentence, parameter);
}

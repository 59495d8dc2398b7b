namespace ResponseLedger.Engine.Sweeps;

/// <summary>
/// A curve that runs straight against log f between its points. Values may be negative infinity (a gain of exactly zero) or
/// NaN (absent); a piece with such an end has no interior value.
/// </summary>
internal readonly ref struct Curve(ReadOnlySpan<double> frequencyHz, ReadOnlySpan<double> values)
{
    internal ReadOnlySpan<double> FrequencyHz { get; } = frequencyHz;

    internal ReadOnlySpan<double> Values { get; } = values;

    internal int Count => FrequencyHz.Length;

    internal double FirstHz => FrequencyHz[0];

    internal double LastHz => FrequencyHz[^1];

    internal bool Spans(double frequencyHz) => frequencyHz >= FirstHz && frequencyHz <= LastHz;

    /// <summary>The piece that holds a frequency inside the span: the index of its starting point, at most Count - 2.</summary>
    internal int PieceOf(double frequencyHz)
    {
        int index = FrequencyHz.BinarySearch(frequencyHz);
        if (index < 0)
            index = ~index - 1;
        return Math.Clamp(index, 0, Count - 2);
    }

    /// <summary>The value at a frequency; NaN outside the span and where there is none.</summary>
    internal double ValueAt(double frequencyHz)
    {
        if (!Spans(frequencyHz))
            return double.NaN;
        int piece = PieceOf(frequencyHz);
        return OnPiece(piece, frequencyHz);
    }

    /// <summary>The value on a known piece.</summary>
    internal double OnPiece(int piece, double frequencyHz)
        => LogAxis.Lerp(Values[piece], Values[piece + 1], LogAxis.Fraction(FrequencyHz[piece], FrequencyHz[piece + 1], frequencyHz));

    /// <summary>The part between two frequencies inside the span, with a point at either edge.</summary>
    internal CurvePart Part(double fromHz, double toHz)
    {
        int first = PieceOf(fromHz) + 1;
        int last = first;
        while (last < Count && FrequencyHz[last] < toHz)
            last++;
        if (FrequencyHz[first] <= fromHz)
            first++;
        int inside = Math.Max(0, last - first);
        var f = new double[inside + 2];
        var v = new double[inside + 2];
        f[0] = fromHz;
        v[0] = ValueAt(fromHz);
        FrequencyHz.Slice(Math.Min(first, Count), inside).CopyTo(f.AsSpan(1));
        Values.Slice(Math.Min(first, Count), inside).CopyTo(v.AsSpan(1));
        f[^1] = toHz;
        v[^1] = ValueAt(toHz);
        return new CurvePart(f, v);
    }
}

/// <summary>A part of a curve between two frequencies, edges included.</summary>
internal readonly record struct CurvePart(double[] FrequencyHz, double[] Values)
{
    internal int Count => FrequencyHz.Length;

    /// <summary>Whether every point, and so the whole part, has a finite value.</summary>
    internal bool IsFinite => Array.TrueForAll(Values, double.IsFinite);
}

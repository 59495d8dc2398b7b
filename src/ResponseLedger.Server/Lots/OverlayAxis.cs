namespace ResponseLedger.Server.Lots;

/// <summary>
/// The one frequency axis of an overlay. The union of all grids where that is short enough; else columns of equal width in log f,
/// each with its first and last frequency, at which a curve shows the least and the greatest value of the column in the order in
/// which they occur: so no peak and no notch is lost, and a column of two points is shown as it is.
/// </summary>
internal sealed class OverlayAxis
{
    private readonly bool isReduced;

    private OverlayAxis(double[] frequencyHz, bool isReduced)
    {
        FrequencyHz = frequencyHz;
        this.isReduced = isReduced;
    }

    /// <summary>Frequencies in Hz, strictly ascending.</summary>
    public double[] FrequencyHz { get; }

    /// <summary>The axis of these curves.</summary>
    /// <param name="lines">The curves.</param>
    /// <param name="points">At most how many frequencies.</param>
    public static OverlayAxis Of(IReadOnlyList<OverlayLine> lines, int points)
    {
        var union = Union(lines);
        return union.Length <= points ? new OverlayAxis(union, isReduced: false) : new OverlayAxis(Columns(union, points / 2), isReduced: true);
    }

    /// <summary>Writes a curve's value at every frequency; NaN outside its span and where it has none.</summary>
    public void Fill(OverlayLine line, Span<double> values)
    {
        var own = line.FrequencyHz;
        var kept = line.Values;
        if (kept.IsEmpty)
        {
            values.Fill(double.NaN);
            return;
        }

        if (own.SequenceEqual(FrequencyHz))
            kept.CopyTo(values);
        else
            Interpolate(own, kept, values);
        if (isReduced)
            TakeExtremes(own, kept, values);
        if (line.Offset != 0)
        {
            foreach (ref var value in values)
                value += line.Offset;
        }
    }

    private void Interpolate(ReadOnlySpan<double> own, ReadOnlySpan<double> kept, Span<double> values)
    {
        var at = 0;
        for (var i = 0; i < values.Length; i++)
        {
            var frequencyHz = FrequencyHz[i];
            while (at < own.Length && own[at] < frequencyHz)
                at++;
            values[i] = at == own.Length || (at == 0 && own[0] > frequencyHz) ? double.NaN
                : own[at] == frequencyHz ? kept[at]
                : Between(own[at - 1], kept[at - 1], own[at], kept[at], frequencyHz);
        }
    }

    // Straight against log f; a piece with an end that is not finite has no interior value.
    private static double Between(double fromHz, double from, double toHz, double to, double frequencyHz)
    {
        var value = from + (to - from) * (Math.Log(frequencyHz / fromHz) / Math.Log(toHz / fromHz));
        return double.IsFinite(value) ? value : double.NaN;
    }

    // The values at a column's ends stand there already; the points between them may reach further. Where a curve begins or ends
    // inside a column it keeps the value at the end that it covers: outside its span nothing is shown.
    private void TakeExtremes(ReadOnlySpan<double> own, ReadOnlySpan<double> kept, Span<double> values)
    {
        var next = 0;
        for (var i = 0; i + 1 < values.Length; i += 2)
        {
            while (next < own.Length && own[next] <= FrequencyHz[i])
                next++;
            var first = next;
            while (next < own.Length && own[next] < FrequencyHz[i + 1])
                next++;
            if (next == first || own[0] > FrequencyHz[i] || own[^1] < FrequencyHz[i + 1])
                continue;

            var (leastAt, greatestAt) = (first - 1, first - 1);
            var (least, greatest) = (values[i], values[i]);
            for (var k = first; k <= next; k++)
            {
                var value = k == next ? values[i + 1] : kept[k];
                if (double.IsNaN(least) || value < least)
                    (least, leastAt) = (value, k);
                if (double.IsNaN(greatest) || value > greatest)
                    (greatest, greatestAt) = (value, k);
            }

            (values[i], values[i + 1]) = leastAt <= greatestAt ? (least, greatest) : (greatest, least);
        }
    }

    private static double[] Union(IReadOnlyList<OverlayLine> lines)
    {
        var grids = new List<OverlayLine>();
        foreach (var line in lines)
        {
            if (!line.FrequencyHz.IsEmpty && !grids.Exists(g => g.FrequencyHz.SequenceEqual(line.FrequencyHz)))
                grids.Add(line);
        }

        if (grids.Count == 0)
            return [];
        if (grids.Count == 1)
            return grids[0].FrequencyHz.ToArray();

        var all = new List<double>();
        foreach (var grid in grids)
            all.AddRange(grid.FrequencyHz);
        all.Sort();
        var last = double.NaN;
        all.RemoveAll(f =>
        {
            var repeated = f == last;
            last = f;
            return repeated;
        });
        return [.. all];
    }

    // The axis is a sequence of pairs: a column of one frequency takes one of the next, and at the end it widens the last pair.
    private static double[] Columns(double[] union, int columns)
    {
        var pairs = new List<double>(2 * columns);
        var width = Math.Log(union[^1] / union[0]);
        var start = 0;
        while (start < union.Length)
        {
            var column = ColumnOf(union[start]);
            var end = start + 1;
            while (end < union.Length && ColumnOf(union[end]) == column)
                end++;
            if (end - start > 1)
                pairs.AddRange([union[start], union[end - 1]]);
            else if (end < union.Length)
                pairs.AddRange([union[start], union[end++]]);
            else if (pairs.Count > 0)
                pairs[^1] = union[start];
            start = end;
        }

        return [.. pairs];

        int ColumnOf(double frequencyHz) => Math.Min(columns - 1, (int)(columns * (Math.Log(frequencyHz / union[0]) / width)));
    }
}

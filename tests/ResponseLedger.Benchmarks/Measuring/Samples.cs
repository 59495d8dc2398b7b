using System.Diagnostics;

namespace ResponseLedger.Benchmarks.Measuring;

/// <summary>Times of many repetitions, in milliseconds.</summary>
internal sealed class Samples
{
    private readonly List<double> sorted = [];

    public int Count => sorted.Count;

    public double Median => Quantile(0.5);

    public double P95 => Quantile(0.95);

    public double Slowest => Quantile(1);

    public void Add(double milliseconds)
    {
        var at = sorted.BinarySearch(milliseconds);
        sorted.Insert(at < 0 ? ~at : at, milliseconds);
    }

    /// <summary>Times a piece of work, after as many unmeasured rounds of it.</summary>
    public static Samples Of(int warmUp, int rounds, Action<int> work)
    {
        for (var i = 0; i < warmUp; i++)
            work(i);
        var samples = new Samples();
        for (var i = 0; i < rounds; i++)
        {
            var start = Stopwatch.GetTimestamp();
            work(warmUp + i);
            samples.Add(Stopwatch.GetElapsedTime(start).TotalMilliseconds);
        }

        return samples;
    }

    /// <summary>Times a piece of work that waits, after as many unmeasured rounds of it.</summary>
    public static async Task<Samples> OfAsync(int warmUp, int rounds, Func<int, Task> work)
    {
        for (var i = 0; i < warmUp; i++)
            await work(i);
        var samples = new Samples();
        for (var i = 0; i < rounds; i++)
        {
            var start = Stopwatch.GetTimestamp();
            await work(warmUp + i);
            samples.Add(Stopwatch.GetElapsedTime(start).TotalMilliseconds);
        }

        return samples;
    }

    private double Quantile(double share)
    {
        if (sorted.Count == 0)
            return double.NaN;
        var place = share * (sorted.Count - 1);
        var below = (int)place;
        var above = Math.Min(below + 1, sorted.Count - 1);
        return sorted[below] + (place - below) * (sorted[above] - sorted[below]);
    }
}

using MathNet.Numerics;

namespace ResponseLedger.Engine.Lots;

/// <summary>
/// Exact binomial bounds of a proportion after Clopper and Pearson (1934): the lower bound is the p at which k or more of n has the
/// tail probability, the upper the p at which k or fewer has it; as roots of the regularised incomplete beta function, bracketed.
/// </summary>
public static class ClopperPearson
{
    /// <summary>Both bounds, (1 - confidence) / 2 in each tail. The lower is 0 for none of n, the upper 1 for all of n.</summary>
    /// <param name="count">How many, 0 to <paramref name="of"/>.</param>
    /// <param name="of">Of how many, 1 or more.</param>
    /// <param name="confidence">Above 0 and below 1.</param>
    /// <exception cref="ArgumentException">An argument is out of its range.</exception>
    public static (double Lower, double Upper) TwoSided(long count, long of, double confidence)
    {
        double tail = Tail(count, of, confidence) / 2;
        return (LowerAt(count, of, tail), UpperAt(count, of, tail));
    }

    /// <summary>The one-sided lower bound.</summary>
    /// <inheritdoc cref="TwoSided" path="/param"/>
    /// <inheritdoc cref="TwoSided" path="/exception"/>
    public static double Lower(long count, long of, double confidence) => LowerAt(count, of, Tail(count, of, confidence));

    /// <summary>The one-sided upper bound.</summary>
    /// <inheritdoc cref="TwoSided" path="/param"/>
    /// <inheritdoc cref="TwoSided" path="/exception"/>
    public static double Upper(long count, long of, double confidence) => UpperAt(count, of, Tail(count, of, confidence));

    private static double Tail(long count, long of, double confidence)
    {
        Preconditions.Require(of >= 1, nameof(of), "A proportion is of 1 or more.");
        Preconditions.Require(count >= 0 && count <= of, nameof(count), "The count lies between 0 and the total.");
        Preconditions.Require(confidence > 0 && confidence < 1, nameof(confidence), "The confidence lies above 0 and below 1.");
        return 1 - confidence;
    }

    // k or more of n: I_p(k, n - k + 1).
    private static double LowerAt(long count, long of, double tail)
        => count == 0 ? 0 : BetaQuantile(count, of - count + 1, tail);

    // k or fewer of n: 1 - I_p(k + 1, n - k) = I_(1-p)(n - k, k + 1).
    private static double UpperAt(long count, long of, double tail)
        => count == of ? 1 : 1 - BetaQuantile(of - count, count + 1, tail);

    /// <summary>The x at which I_x(a, b) is the probability, by bisection down to neighbouring doubles, so it is as good as I itself.</summary>
    private static double BetaQuantile(double a, double b, double probability)
    {
        double low = 0;
        double high = 1;
        while (true)
        {
            double middle = low + (high - low) / 2;
            if (middle <= low || middle >= high || high - low < 1e-17)
                return middle;
            if (SpecialFunctions.BetaRegularized(a, b, middle) < probability)
                low = middle;
            else
                high = middle;
        }
    }
}

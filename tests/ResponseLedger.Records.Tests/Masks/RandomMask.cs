using ResponseLedger.Engine.Masks;
using ResponseLedger.Engine.Measures;
using ResponseLedger.Records.Masks;

namespace ResponseLedger.Records.Tests.Masks;

/// <summary>Draws masks whose shape is right, whatever their criteria mean.</summary>
internal static class RandomMask
{
    private const string Letters = "abcXYZ 0189-_äß€\"\\/";

    public static MaskDocument Draw(Random random)
    {
        var limits = Many(random, 4, () => DrawLimit(random));
        var requirements = Many(random, 4, () => DrawRequirement(random));
        return new MaskDocument(Text(random), new Mask(limits, requirements));
    }

    private static CurveLimit DrawLimit(Random random)
    {
        var basis = (LimitBasis)random.Next(1, 4);
        return new CurveLimit(
            Text(random),
            (CurveQuantity)random.Next(1, 4),
            (LimitSide)random.Next(1, 3),
            basis,
            basis == LimitBasis.Reference ? DrawReference(random) : null,
            Maybe(random),
            Maybe(random),
            Maybe(random),
            Many(random, 5, () => new LimitCorner(Number(random), Number(random))));
    }

    private static Requirement DrawRequirement(Random random)
    {
        var parameters = new Dictionary<string, double>();
        for (var i = random.Next(4); i > 0; i--)
            parameters[$"p{random.Next(100)}Hz"] = Number(random);
        var call = new MeasureCall(Text(random), parameters, random.Next(2) == 0 ? DrawReference(random) : null);
        return new Requirement(Text(random), call, Text(random), Maybe(random), Maybe(random), Maybe(random), random.Next(2) == 0);
    }

    private static ReferenceLevel DrawReference(Random random) => random.Next(3) switch
    {
        0 => new ReferenceLevel.Peak(),
        1 => new ReferenceLevel.AtFrequency(Number(random)),
        _ => new ReferenceLevel.Band(Number(random), Number(random)),
    };

    private static List<T> Many<T>(Random random, int most, Func<T> draw)
        => [.. Enumerable.Range(0, random.Next(most + 1)).Select(_ => draw())];

    private static double? Maybe(Random random) => random.Next(2) == 0 ? null : Number(random);

    private static double Number(Random random)
    {
        double number;
        do
            number = BitConverter.Int64BitsToDouble(random.NextInt64(long.MinValue, long.MaxValue));
        while (!double.IsFinite(number));
        return number;
    }

    private static string Text(Random random)
        => "n" + new string([.. Enumerable.Range(0, random.Next(12)).Select(_ => Letters[random.Next(Letters.Length)])]);
}

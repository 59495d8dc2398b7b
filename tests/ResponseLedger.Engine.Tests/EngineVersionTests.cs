using System.Globalization;
using System.Security.Cryptography;
using System.Text;
using ResponseLedger.Engine.Lots;
using ResponseLedger.Engine.Masks;
using ResponseLedger.Engine.Measures;
using ResponseLedger.Engine.Sweeps;
using ResponseLedger.Engine.Tests.Masks;

namespace ResponseLedger.Engine.Tests;

/// <summary>
/// The engine version is pinned in every verdict, so numbers must not change under it. A table of results over fixed runs, each to seven
/// significant digits (platforms differ in the last bits of logarithms), is digested and compared with the digest of this version.
/// </summary>
public sealed class EngineVersionTests
{
    private const int Version = 1;
    private const string Digest = "cd5c7200f008b96d8889cde4ae7942da5c15d6e4b36f1ef1d6dcbbde90ae3cfb";

    [Fact]
    public void The_numbers_are_those_of_the_stated_version()
    {
        string table = Table();
        string digest = Convert.ToHexStringLower(SHA256.HashData(Encoding.UTF8.GetBytes(table)));
        Assert.True(
            EngineVersion.Current == Version && digest == Digest,
            $"The engine's numbers or its version changed. If results may come out differently on purpose, raise EngineVersion.Current, then set Version and Digest here to "
            + $"{EngineVersion.Current} and {digest}. If not, the engine is broken. The table is now:\n{table}");
    }

    private static string Table()
    {
        var table = new StringBuilder();
        var loops = ReferenceData.Json("loops.json").GetProperty("loops");
        var filters = ReferenceData.Json("filters.json").GetProperty("filters");
        foreach (var item in filters.EnumerateArray().Concat(loops.EnumerateArray()))
        {
            string id = item.GetProperty("id").GetString()!;
            var grid = item.GetProperty("grid");
            var run = Sweep.Create(
                SweepForm.RealImaginary, ReferenceData.Numbers(grid.GetProperty("frequencyHz")),
                ReferenceData.Numbers(grid.GetProperty("re")), ReferenceData.Numbers(grid.GetProperty("im")));
            double fromHz = run.FrequencyHz[run.Count / 4] * 1.001;
            double toHz = run.FrequencyHz[run.Count * 3 / 4] * 1.001;
            (string, double)[] band = [("fromHz", fromHz), ("toHz", toHz)];
            Write(table, id, run.Measure("level", ("frequencyHz", fromHz)));
            Write(table, id, run.Measure("phase", ("frequencyHz", toHz)));
            Write(table, id, run.Measure("delay", ("frequencyHz", fromHz)));
            Write(table, id, run.Measure("delay", ("frequencyHz", fromHz), ("apertureRatio", 1.3)));
            Write(table, id, run.Measure("peak", band));
            Write(table, id, run.Measure("bandwidth", new ReferenceLevel.Band(fromHz, toHz), ("dropDb", 10)));
            Write(table, id, run.Measure("shapeFactor", Measuring.Peak, ("outerDropDb", 10), ("innerDropDb", 3)));
            Write(table, id, run.Measure("ripple", band));
            Write(table, id, run.Measure("attenuation", new ReferenceLevel.AtFrequency(fromHz), band));
            Write(table, id, run.Measure("slope", band));
            // Of the filters some cross 0 dB at their peak by rounding alone, with margins of 180 degrees of either sign.
            if (item.TryGetProperty("criticalPhaseDeg", out var critical))
                Write(table, id, run.Measure("loopMargins", ("criticalPhaseDeg", critical.GetDouble())));
            var limit = Masking.Upper((fromHz, 1), (toHz, 1)) with { Basis = LimitBasis.Reference, Reference = Measuring.Peak };
            var golden = run.OverFrequencies(Array.ConvertAll(run.FrequencyHz.ToArray(), f => f * 1.01));
            Write(table, id, run.Judge(limit));
            Write(table, id, run.Judge(Masking.Lower((fromHz, -1), (toHz, -2)).AgainstGolden(), golden));
            Write(table, id, run.Judge(Masking.Upper((fromHz, 3), (toHz, 5)).AgainstGolden().Of(CurveQuantity.PhaseDeg), golden));
        }

        var (lower, upper) = ClopperPearson.TwoSided(7, 125, 0.95);
        table.Append(Say(lower)).Append(' ').Append(Say(upper)).Append('\n');
        return table.ToString();
    }

    private static void Write(StringBuilder table, string id, MeasureResult result)
        => table.Append(CultureInfo.InvariantCulture, $"{id} {result.Call.Measure}: {string.Join(' ', result.Outputs.Select(o => Say(o.Value)))} {result.Reason?.Code}\n");

    private static void Write(StringBuilder table, string id, CriterionResult result)
        => table.Append(CultureInfo.InvariantCulture, $"{id} {result.Name}: {result.Outcome} {Say(result.Margin)} {Say(result.FrequencyHz)} {result.Reason?.Code}\n");

    /// <summary>Seven significant digits; what is under 1e-9 is rounding and reads 0.</summary>
    private static string Say(double? value)
        => value is not { } v ? "absent" : Math.Abs(v) < 1e-9 ? "0" : v.ToString("E6", CultureInfo.InvariantCulture);
}

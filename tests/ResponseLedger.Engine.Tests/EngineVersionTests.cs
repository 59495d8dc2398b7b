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
    private const string Digest = "50617547d0e1815d85dcb11baca074eab4ed6ba47d50dbee0c5c4dd29232ea10";

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
            WriteKinds(table, id, run, golden, fromHz, toHz);
        }

        var (lower, upper) = ClopperPearson.TwoSided(7, 125, 0.95);
        table.Append(Say(lower)).Append(' ').Append(Say(upper)).Append('\n');
        return table.ToString();
    }

    /// <summary>Kinds of results that the measures alone do not show: delay limits, whole turns, requirements, ends, density.</summary>
    private static void WriteKinds(StringBuilder table, string id, Sweep run, Sweep golden, double fromHz, double toHz)
    {
        Write(table, id, run.Judge(Masking.Upper((fromHz, 1e-4), (toHz, 2e-4)).Of(CurveQuantity.DelaySeconds)));
        Write(table, id, run.Judge(Masking.Lower((fromHz, -1e-5), (toHz, -2e-5)).AgainstGolden().Of(CurveQuantity.DelaySeconds), golden));
        Write(table, id, run.Judge(Masking.Upper((fromHz, 400), (toHz, 300)).Of(CurveQuantity.PhaseDeg)));
        Write(table, id, run.Judge(Masking.Require("level", "gainDb", -20, 3, null, ("frequencyHz", fromHz))));
        Write(table, id, run.Judge(Masking.Upper((run.FrequencyHz[0] / 1.05, 40), (toHz, 40)) with { EndRatio = 1.1 }));
        Write(table, id, run.Judge(Masking.Upper((fromHz, 40), (toHz, 40)) with { MinPointsPerDecade = 60 }));
        var pair = new Mask([Masking.Upper((fromHz, 100), (toHz, 100)).Of(CurveQuantity.PhaseDeg), Masking.Lower((fromHz, -250), (toHz, -900)).Of(CurveQuantity.PhaseDeg)], []);
        foreach (var criterion in MaskEvaluator.Evaluate(run, null, pair, DeviceTraits.Transfer).Criteria)
            Write(table, id, criterion);
    }

    private static void Write(StringBuilder table, string id, MeasureResult result)
        => table.Append(CultureInfo.InvariantCulture, $"{id} {result.Call.Measure}: {string.Join(' ', result.Outputs.Select(o => Say(o.Value)))} {result.Reason?.Code}\n");

    private static void Write(StringBuilder table, string id, CriterionResult result)
        => table.Append(CultureInfo.InvariantCulture, $"{id} {result.Name}: {result.Outcome} {Say(result.Margin)} {Say(result.FrequencyHz)} {result.Reason?.Code}\n");

    /// <summary>Seven significant digits; what is under 1e-9 is rounding and reads 0.</summary>
    private static string Say(double? value)
        => value is not { } v ? "absent" : Math.Abs(v) < 1e-9 ? "0" : v.ToString("E6", CultureInfo.InvariantCulture);
}

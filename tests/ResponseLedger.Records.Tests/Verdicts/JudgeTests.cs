using System.Text;
using ResponseLedger.Engine.Masks;
using ResponseLedger.Engine.Measures;
using ResponseLedger.Engine.Sweeps;
using ResponseLedger.Ledger;
using ResponseLedger.Records.Masks;
using ResponseLedger.Records.Verdicts;

namespace ResponseLedger.Records.Tests.Verdicts;

public sealed class JudgeTests
{
    private static readonly double[] GridHz = [.. Enumerable.Range(0, 121).Select(i => 10 * Math.Pow(10, i / 30.0))];

    /// <summary>A first-order low-pass with its corner at 1 kHz and 20 dB of gain, from its equation.</summary>
    private static Sweep LowPass { get; } = SweepOf(f => 10 / Complex(1, f / 1000));

    private static readonly CurveLimit NearGolden = new(
        "near golden", CurveQuantity.GainDb, LimitSide.Upper, LimitBasis.Golden, null, null, null, null, [new(20, 0.1), new(50_000, 0.1)]);

    [Fact]
    public void A_limit_relative_to_the_golden_run_without_one_is_inconclusive()
    {
        var judgement = Judge.Evaluate(LowPass, BasisOf(new Mask([NearGolden], []), golden: null));
        Assert.Equal(Outcome.Inconclusive, judgement.Stored.Outcome);
        Assert.Equal("noGoldenRun", judgement.Evaluation.Criteria[0].Reason!.Code);
        Assert.Equal([null], judgement.Stored.Margins);
    }

    [Fact]
    public void The_golden_run_stands_in_the_middle_of_its_own_limits()
    {
        var judgement = Judge.Evaluate(LowPass, BasisOf(new Mask([NearGolden], []), LowPass));
        Assert.Equal(Outcome.Pass, judgement.Stored.Outcome);
        Assert.Equal(0.1, judgement.Stored.Margins[0]!.Value, 1e-12);
    }

    /// <summary>Names and units for lists come from the mask alone; they must be those that the engine states.</summary>
    [Fact]
    public void Every_output_of_every_measure_has_the_same_name_and_unit_in_lists_as_in_verdicts()
    {
        var requirements = MeasureCatalogue.All
            .SelectMany(d => d.Outputs.Select(o => new Requirement($"{d.Name} {o.Name}", CallOf(d), o.Name, -1e9, null, null)))
            .ToArray();
        Assert.True(requirements.Length > 20, $"{requirements.Length} outputs");
        CurveLimit[] limits =
        [
            NearGolden,
            NearGolden with { Name = "phase", Quantity = CurveQuantity.PhaseDeg, Basis = LimitBasis.Absolute, Corners = [new(20, 360), new(50_000, 360)] },
            NearGolden with { Name = "delay", Quantity = CurveQuantity.DelaySeconds, Basis = LimitBasis.Absolute, Corners = [new(20, 1), new(50_000, 1)] },
        ];
        var basis = BasisOf(new Mask(limits, requirements), LowPass);
        Assert.Empty(basis.Mask.Mask.ReleaseProblems());
        var judgement = Judge.Evaluate(LowPass, basis);
        for (var i = 0; i < judgement.Evaluation.Criteria.Count; i++)
        {
            var criterion = judgement.Evaluation.Criteria[i];
            var listed = StoredVerdict.WorstOf(basis.Mask.Mask, judgement.Stored with { WorstIndex = i })!;
            Assert.Equal(
                (criterion.Name, criterion.Unit, criterion.Outcome, criterion.Margin, criterion.FrequencyHz),
                (listed.Criterion, listed.Unit, listed.Outcome, listed.Margin, listed.FrequencyHz));
        }

        var verdict = VerdictDocument.Write(judgement.Evaluation, basis.Mask.Mask, 1, Judge.EngineVersion);
        Assert.Equal(requirements.Length, verdict["measures"]!.AsObject().Count);
        Assert.True(CanonicalJson.IsCanonical(CanonicalJson.Serialize(verdict)));
    }

    [Fact]
    public void A_gain_of_exactly_zero_leaves_no_infinite_number_in_the_verdict()
    {
        var run = SweepOf(f => f is > 900 and < 1100 ? 0 : 1);
        Assert.Contains(double.NegativeInfinity, run.GainDb.ToArray());
        var top = NearGolden with { Name = "top", Basis = LimitBasis.Absolute };
        var mask = new Mask([top, top with { Name = "bottom", Side = LimitSide.Lower }], [new("level", new("level", new Dictionary<string, double> { ["frequencyHz"] = 1000 }), "gainDb", -3, null, null)]);
        var basis = BasisOf(mask, golden: null);
        var judgement = Judge.Evaluate(run, basis);
        Assert.Equal(Outcome.Fail, judgement.Stored.Outcome);
        CanonicalJson.Serialize(VerdictDocument.Write(judgement.Evaluation, basis.Mask.Mask, 1, 1));
        Assert.All(judgement.Stored.Margins, m => Assert.True(m is null || double.IsFinite(m.Value)));
    }

    [Fact]
    public void A_refused_file_has_its_issues_and_no_judgement()
    {
        var content = Encoding.UTF8.GetBytes("frequency,gain dB\n100,0\n200,NaN\n");
        var file = Judge.Evaluate(content, "SN-1.csv", null, BasisOf(new Mask([NearGolden], []), null), TestContext.Current.CancellationToken);
        Assert.Null(file.Reading.Sweep);
        Assert.NotEmpty(file.Reading.Issues);
        Assert.Null(file.Judgement);
    }

    [Fact]
    public void Without_a_released_mask_a_file_is_read_and_not_judged()
    {
        var content = Encoding.UTF8.GetBytes("frequency,gain dB\n100,0\n200,-3\n");
        var file = Judge.Evaluate(content, "SN-1.csv", null, null, TestContext.Current.CancellationToken);
        Assert.Equal(2, file.Reading.Sweep?.Count);
        Assert.Null(file.Judgement);
    }

    private static JudgementBasis BasisOf(Mask mask, Sweep? golden)
        => new(MaskRevisionDocument.Create(Guid.Empty, Guid.Empty, 1, new MaskDocument("mask", mask)), golden, DeviceTraits.Transfer);

    private static MeasureCall CallOf(MeasureDefinition definition)
    {
        var parameters = definition.Parameters.Where(p => p.Required).ToDictionary(
            p => p.Name,
            p => p.Name switch
            {
                "fromHz" => 2_000,
                "toHz" => 20_000,
                "outerDropDb" => 20,
                _ when p.Name.EndsWith("Hz", StringComparison.Ordinal) => 1_000,
                _ => 3.0,
            });
        return new MeasureCall(definition.Name, parameters, definition.TakesReference ? new ReferenceLevel.Peak() : null);
    }

    private static System.Numerics.Complex Complex(double re, double im) => new(re, im);

    private static Sweep SweepOf(Func<double, System.Numerics.Complex> gain)
    {
        var values = GridHz.Select(gain).ToArray();
        return Sweep.Create(SweepForm.RealImaginary, GridHz, [.. values.Select(v => v.Real)], [.. values.Select(v => v.Imaginary)]);
    }
}

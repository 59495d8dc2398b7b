using ResponseLedger.Engine.Masks;
using ResponseLedger.Engine.Measures;
using static ResponseLedger.Engine.Tests.Masks.Masking;

namespace ResponseLedger.Engine.Tests.Masks;

public sealed class MaskCheckTests
{
    private static readonly CurveLimit Good = Upper((10, 1), (100, 1));

    private static readonly Requirement Peak = Require("peak", "gainDb", 0, 1, null);

    public static TheoryData<string, CurveLimit> BadLimits => new()
    {
        { "limits[0].name", Good with { Name = " " } },
        { "limits[0].quantity", Good with { Quantity = 0 } },
        { "limits[0].side", Good with { Side = (LimitSide)7 } },
        { "limits[0].basis", Good with { Basis = 0 } },
        { "limits[0].reference", Good with { Reference = Measuring.Peak } },
        { "limits[0].reference", Good with { Basis = LimitBasis.Reference } },
        { "limits[0].reference", Good with { Basis = LimitBasis.Reference, Reference = new ReferenceLevel.Band(5, 5) } },
        { "limits[0].reference", Good with { Basis = LimitBasis.Reference, Reference = new ReferenceLevel.AtFrequency(double.NaN) } },
        { "limits[0].basis", Good with { Basis = LimitBasis.Reference, Reference = Measuring.Peak, Quantity = CurveQuantity.PhaseDeg } },
        { "limits[0].minPointsPerDecade", Good with { MinPointsPerDecade = 0 } },
        { "limits[0].endRatio", Good with { EndRatio = 0.99 } },
        { "limits[0].scale", Good with { Scale = 0 } },
        { "limits[0].scale", Good with { Scale = double.PositiveInfinity } },
        { "limits[0].corners", Upper((10, 1)) },
        { "limits[0].corners", Upper((10, 1), (10, 2)) },
        { "limits[0].corners[1].frequencyHz", Upper((10, 1), (9, 1), (100, 1)) },
        { "limits[0].corners[0].frequencyHz", Upper((0, 1), (100, 1)) },
        { "limits[0].corners[1].frequencyHz", Upper((10, 1), (double.PositiveInfinity, 1)) },
        { "limits[0].corners[2].frequencyHz", Upper((10, 1), (10, 2), (10, 3), (20, 1)) },
        { "limits[0].corners[1].value", Upper((10, 1), (20, double.NaN)) },
        { "limits[0].corners[1].value", Upper((10, 1), (20, 1e6)) },
        { "limits[0].corners[0].value", Upper((10, 400_000), (20, 1)).Of(CurveQuantity.PhaseDeg) },
        { "limits[0].corners[0].value", Upper((10, 5_000), (20, 1)).Of(CurveQuantity.DelaySeconds) },
    };

    [Theory, MemberData(nameof(BadLimits))]
    public void What_is_wrong_with_a_limit_is_named_by_its_path(string path, CurveLimit limit)
    {
        var problem = Assert.Single(MaskEvaluator.ProblemsOf(new Mask([limit], [])));
        Assert.Equal(path, problem.Path);
        Assert.NotEmpty(problem.Sentence);
    }

    public static TheoryData<string, Requirement> BadRequirements => new()
    {
        { "requirements[0].name", Peak with { Name = "" } },
        { "requirements[0].measure", Peak with { Call = new MeasureCall("loudness", new Dictionary<string, double>()) } },
        { "requirements[0].parameters.frequencyHz", Require("level", "gainDb", 0, 1, null) },
        { "requirements[0].parameters.wrongHz", Require("peak", "gainDb", 0, 1, null, ("wrongHz", 1)) },
        { "requirements[0].reference", Require("bandwidth", "q", 0, 1, null, ("dropDb", 3)) },
        { "requirements[0].output", Peak with { Output = "phaseDeg" } },
        { "requirements[0].acceptNoCrossover", Peak with { AcceptNoCrossover = true } },
        { "requirements[0].min", Peak with { Min = null, Max = null } },
        { "requirements[0].min", Peak with { Min = double.NaN } },
        { "requirements[0].max", Peak with { Max = double.PositiveInfinity } },
        { "requirements[0].min", Peak with { Min = 2 } },
        { "requirements[0].scale", Peak with { Scale = -1 } },
    };

    [Theory, MemberData(nameof(BadRequirements))]
    public void What_is_wrong_with_a_requirement_is_named_by_its_path(string path, Requirement requirement)
        => Assert.Equal(path, Assert.Single(MaskEvaluator.ProblemsOf(new Mask([], [requirement]))).Path);

    [Fact]
    public void A_good_mask_has_no_problems_and_an_empty_one_has()
    {
        Assert.Empty(MaskEvaluator.ProblemsOf(new Mask([Good, Lower((10, 1), (100, 1))], [Peak])));
        Assert.Equal("limits", Assert.Single(MaskEvaluator.ProblemsOf(new Mask([], []))).Path);
    }

    [Fact]
    public void Names_are_unique_across_limits_and_requirements()
    {
        var problems = MaskEvaluator.ProblemsOf(new Mask([Good, Good], [Peak with { Name = Good.Name }]));
        Assert.Equal(["limits[1].name", "requirements[0].name"], problems.Select(p => p.Path));
    }

    [Fact]
    public void An_upper_limit_under_a_lower_one_over_an_interval_is_a_problem()
    {
        Assert.Equal("limits[1].corners", ProblemOf(Upper((10, 0), (100, 10)), Lower((10, 1), (100, 1))));
        Assert.Equal("limits[1].corners", ProblemOf(Lower((1, 0), (1000, 0)), Upper((10, 1), (30, -0.001), (100, 1))));
        // Touching at a frequency, or a step that meets another, holds no interval.
        Assert.Null(ProblemOf(Upper((10, 5), (30, 1), (100, 5)), Lower((10, 1), (100, 1))));
        Assert.Null(ProblemOf(Upper((10, 5), (30, 5), (30, 2), (100, 2)), Lower((10, 3), (30, 3), (30, 0), (100, 0))));
        Assert.Equal("limits[1].corners", ProblemOf(Upper((10, 5), (30, 5), (30, 2), (100, 2)), Lower((10, 3), (31, 3), (31, 0), (100, 0))));
        // Of other bases, quantities or spans nothing is said.
        Assert.Null(ProblemOf(Upper((10, 0), (100, 0)), Lower((10, 1), (100, 1)).AgainstGolden()));
        Assert.Null(ProblemOf(Upper((10, 0), (100, 0)), Lower((10, 1), (100, 1)).Of(CurveQuantity.PhaseDeg)));
        Assert.Null(ProblemOf(Upper((10, 0), (100, 0)), Lower((100, 1), (1000, 1))));

        static string? ProblemOf(CurveLimit a, CurveLimit b) => MaskEvaluator.ProblemsOf(new Mask([a, b], [])).SingleOrDefault()?.Path;
    }
}

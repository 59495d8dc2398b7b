using System.Text;
using System.Text.Json;
using ResponseLedger.Engine.Masks;
using ResponseLedger.Engine.Measures;
using ResponseLedger.Records.Masks;

namespace ResponseLedger.Records.Tests.Masks;

public sealed class MaskDocumentTests
{
    [Fact]
    public void A_mask_with_every_member_becomes_what_the_engine_takes()
    {
        var document = Parsed(MaskJson.Full);
        Assert.Equal("Anti-alias filter, ±0.5 dB", document.Title);
        var stop = document.Mask.Limits[0];
        Assert.Equal(
            ("stop band", CurveQuantity.GainDb, LimitSide.Upper, LimitBasis.Reference, new ReferenceLevel.Band(100, 1000)),
            (stop.Name, stop.Quantity, stop.Side, stop.Basis, stop.Reference));
        Assert.Equal((20, 1.05, 0.5), (stop.MinPointsPerDecade, stop.EndRatio, stop.Scale));
        Assert.Equal([new LimitCorner(2e4, -40), new LimitCorner(1e5, -60.5)], stop.Corners);
        var golden = document.Mask.Limits[1];
        Assert.Equal((LimitBasis.Golden, null, null), (golden.Basis, golden.Reference, golden.Scale));
        Assert.Equal(CurveQuantity.DelaySeconds, document.Mask.Limits[2].Quantity);

        var corner = document.Mask.Requirements[0];
        Assert.Equal(("bandwidth", "upperHz", 950, 1050, 10), (corner.Call.Measure, corner.Output, corner.Min, corner.Max, corner.Scale));
        Assert.Equal(3.0103, Assert.Single(corner.Call.Parameters).Value);
        Assert.Equal(new ReferenceLevel.AtFrequency(100), corner.Call.Reference);
        Assert.False(corner.AcceptNoCrossover);
        Assert.True(document.Mask.Requirements[1].AcceptNoCrossover);
        Assert.Null(document.Mask.Requirements[1].Max);
        Assert.Empty(document.Mask.Requirements[1].Call.Parameters);
        Assert.Equal(new ReferenceLevel.Peak(), document.Mask.Requirements[2].Call.Reference);
    }

    [Fact]
    public void The_canonical_bytes_of_a_mask_are_exactly_these()
        => Assert.Equal(MaskJson.Canonical, Encoding.UTF8.GetString(Parsed(MaskJson.Full).ToCanonicalBytes()));

    [Fact]
    public void A_mask_reads_back_from_its_own_bytes_and_from_its_own_json()
    {
        var document = Parsed(MaskJson.Full);
        var bytes = document.ToCanonicalBytes();
        Assert.True(MaskDocument.TryParse(bytes, out var back, out _));
        Assert.Equal(bytes, back.ToCanonicalBytes());
        Assert.Equal(bytes, Parsed(document.ToJson().ToJsonString()).ToCanonicalBytes());
    }

    [Fact]
    public void Random_masks_read_back_as_they_were_written()
    {
        var random = new Random(20260301);
        for (var round = 0; round < 300; round++)
        {
            var mask = RandomMask.Draw(random);
            var bytes = mask.ToCanonicalBytes();
            Assert.True(MaskDocument.TryParse(bytes, out var back, out var problems), string.Join("; ", problems));
            Assert.Equal(bytes, back.ToCanonicalBytes());
            Assert.Equal(mask.Mask.Limits.SelectMany(l => l.Corners), back.Mask.Limits.SelectMany(l => l.Corners));
        }
    }

    [Fact]
    public void A_mask_without_criteria_is_a_mask()
    {
        var document = Parsed("""{"title":"none yet","limits":[],"requirements":[]}""");
        Assert.Empty(document.Mask.Limits);
        Assert.Empty(document.Mask.Requirements);
    }

    [Theory]
    [InlineData(double.NaN)]
    [InlineData(double.PositiveInfinity)]
    public void A_mask_with_a_number_that_is_not_finite_is_never_written(double number)
    {
        var limit = new CurveLimit("a", CurveQuantity.GainDb, LimitSide.Upper, LimitBasis.Absolute, null, null, null, null, [new(1, number)]);
        var document = new MaskDocument("a", new Mask([limit], []));
        Assert.Throws<ArgumentException>(() => document.ToJson());
        Assert.Throws<ArgumentException>(() => document.ToCanonicalBytes());
    }

    /// <summary>Each case takes the full mask, puts a value in place of one member, and says at which path the problem stands.</summary>
    [Theory]
    [InlineData("title", "7", "title", "Expected a text")]
    [InlineData("title", "\"  \"", "title", "must not be empty")]
    [InlineData("title", "null", "title", "missing")]
    [InlineData("titel", "\"a\"", "titel", "not known")]
    [InlineData("limits", "{}", "limits", "Expected an array")]
    [InlineData("limits", "null", "limits", "missing")]
    [InlineData("limits[0]", "3", "limits[0]", "Expected an object")]
    [InlineData("limits[0].name", "null", "limits[0].name", "missing")]
    [InlineData("limits[1].quantity", "\"gain\"", "limits[1].quantity", "gainDb, phaseDeg, delaySeconds")]
    [InlineData("limits[1].side", "\"Upper\"", "limits[1].side", "upper, lower")]
    [InlineData("limits[1].basis", "1", "limits[1].basis", "Expected a text")]
    [InlineData("limits[1].colour", "1", "limits[1].colour", "not known")]
    [InlineData("limits[0].reference", "null", "limits[0].reference", "missing")]
    [InlineData("limits[1].reference", "{\"kind\":\"peak\"}", "limits[1].reference", "basis reference")]
    [InlineData("limits[0].reference.kind", "\"mean\"", "limits[0].reference.kind", "peak, frequency, band")]
    [InlineData("limits[0].reference.toHz", "null", "limits[0].reference.toHz", "missing")]
    [InlineData("limits[0].reference.frequencyHz", "1", "limits[0].reference.frequencyHz", "kind frequency")]
    [InlineData("limits[0].scale", "\"1\"", "limits[0].scale", "without quotation marks")]
    [InlineData("limits[0].endRatio", "true", "limits[0].endRatio", "Expected a number")]
    [InlineData("limits[0].minPointsPerDecade", "1e999", "limits[0].minPointsPerDecade", "too large")]
    [InlineData("limits[0].corners[1].value", "\"-60\"", "limits[0].corners[1].value", "without quotation marks")]
    [InlineData("limits[0].corners[1].value", "null", "limits[0].corners[1].value", "missing")]
    [InlineData("limits[0].corners[0].gainDb", "1", "limits[0].corners[0].gainDb", "not known")]
    [InlineData("limits[0].corners[0]", "[1,2]", "limits[0].corners[0]", "Expected an object")]
    [InlineData("requirements[0].parameters", "[]", "requirements[0].parameters", "Expected an object")]
    [InlineData("requirements[0].parameters.dropDb", "\"3\"", "requirements[0].parameters.dropDb", "without quotation marks")]
    [InlineData("requirements[0].parameters.reference", "100", "requirements[0].parameters.reference", "Expected an object")]
    [InlineData("requirements[2].parameters.reference.fromHz", "5", "requirements[2].parameters.reference.fromHz", "kind band")]
    [InlineData("requirements[0].measure", "null", "requirements[0].measure", "missing")]
    [InlineData("requirements[0].output", "5", "requirements[0].output", "Expected a text")]
    [InlineData("requirements[1].min", "[45]", "requirements[1].min", "Expected a number, found an array")]
    [InlineData("requirements[1].acceptNoCrossover", "1", "requirements[1].acceptNoCrossover", "true or false")]
    [InlineData("requirements[1].maximum", "90", "requirements[1].maximum", "not known")]
    public void A_wrong_member_is_told_by_its_path(string place, string value, string path, string sentence)
    {
        using var json = JsonDocument.Parse(JsonEdit.Set(MaskJson.Full, place, value));
        Assert.False(MaskDocument.TryParse(json.RootElement, out var document, out var problems));
        Assert.Null(document);
        var problem = Assert.Single(problems);
        Assert.Equal(path, problem.Path);
        Assert.Contains(sentence, problem.Sentence, StringComparison.Ordinal);
    }

    [Theory]
    [InlineData("""{"title":"a","title":"b","limits":[],"requirements":[]}""", "title", "twice")]
    [InlineData("""{"title":"\ud800","limits":[],"requirements":[]}""", "title", "surrogate")]
    [InlineData("""{"title":"a","\ud800":1,"limits":[],"requirements":[]}""", "", "surrogate")]
    [InlineData("[]", "", "Expected an object, found an array")]
    [InlineData("null", "", "Expected an object, found null")]
    [InlineData("{\"title\":", "", "not JSON")]
    [InlineData("", "", "not JSON")]
    public void Json_that_is_no_plain_object_is_told(string json, string path, string sentence)
    {
        Assert.False(MaskDocument.TryParse(Encoding.UTF8.GetBytes(json), out _, out var problems));
        Assert.Contains(problems, p => p.Path == path && p.Sentence.Contains(sentence, StringComparison.Ordinal));
    }

    [Fact]
    public void All_problems_are_told_at_once_and_not_without_end()
    {
        using var three = JsonDocument.Parse("""{"title":1,"limits":2,"requirements":3}""");
        Assert.False(MaskDocument.TryParse(three.RootElement, out _, out var problems));
        Assert.Equal(["title", "limits", "requirements"], problems.Select(p => p.Path));

        using var many = JsonDocument.Parse($$"""{"title":"a","limits":[{{string.Join(',', Enumerable.Repeat("0", 5000))}}],"requirements":[]}""");
        Assert.False(MaskDocument.TryParse(many.RootElement, out _, out problems));
        Assert.Equal(50, problems.Count);
    }

    [Fact]
    public void An_element_that_was_never_set_is_told_and_does_not_throw()
    {
        Assert.False(MaskDocument.TryParse(default(JsonElement), out _, out var problems));
        Assert.Equal(string.Empty, Assert.Single(problems).Path);
    }

    [Fact]
    public void Bytes_with_random_damage_never_throw()
    {
        var random = new Random(6962);
        var whole = Encoding.UTF8.GetBytes(MaskJson.Full);
        var taken = 0;
        for (var round = 0; round < 5000; round++)
        {
            var damaged = whole.ToArray();
            for (var i = random.Next(1, 4); i > 0; i--)
                damaged[random.Next(damaged.Length)] = (byte)random.Next(256);
            if (MaskDocument.TryParse(damaged.AsMemory(0, random.Next(10) == 0 ? random.Next(damaged.Length) : damaged.Length), out var document, out var problems))
                taken += document.ToCanonicalBytes().Length > 0 ? 1 : 0;
            else
                Assert.NotEmpty(problems);
        }

        Assert.InRange(taken, 1, 4999);
    }

    internal static MaskDocument Parsed(string json)
    {
        using var parsed = JsonDocument.Parse(json);
        Assert.True(MaskDocument.TryParse(parsed.RootElement, out var document, out var problems), string.Join("; ", problems));
        Assert.Empty(problems);
        return document;
    }
}

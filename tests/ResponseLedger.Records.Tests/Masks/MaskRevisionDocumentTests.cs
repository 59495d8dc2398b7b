using System.Text;
using ResponseLedger.Engine.Masks;
using ResponseLedger.Records.Masks;

namespace ResponseLedger.Records.Tests.Masks;

public sealed class MaskRevisionDocumentTests
{
    private static readonly Guid Device = Guid.Parse("01890a5d-ac96-774b-bcce-b302099a8057");
    private static readonly Guid Condition = Guid.Parse("01890a5d-ac96-774b-bcce-b302099a8058");

    /// <summary>Written by hand; its digest in the first test was computed by another program.</summary>
    private const string Exact =
        """{"conditionId":"01890a5d-ac96-774b-bcce-b302099a8058","deviceId":"01890a5d-ac96-774b-bcce-b302099a8057","format":"responseledger.maskRevision/1","limits":[{"basis":"absolute","corners":[{"frequencyHz":100,"value":0.5},{"frequencyHz":1000,"value":0.5}],"name":"top","quantity":"gainDb","side":"upper"}],"requirements":[],"revision":3,"title":"Pass band"}""";

    private static MaskDocument Mask => new(
        "Pass band",
        new Mask([new CurveLimit("top", CurveQuantity.GainDb, LimitSide.Upper, LimitBasis.Absolute, null, null, null, null, [new(100, 0.5), new(1000, 0.5)])], []));

    [Fact]
    public void The_bytes_of_a_revision_are_exactly_these()
    {
        var document = MaskRevisionDocument.Create(Device, Condition, 3, Mask);
        Assert.Equal(Exact, Encoding.UTF8.GetString(document.Bytes.Span));
        Assert.Equal("44825560d54d17a4fdce4e9b6b7e093a055b67f595433d1c53310ad0b6ca8e4c", Convert.ToHexStringLower(document.Sha256.Span));
    }

    [Fact]
    public void A_revision_reads_back_from_its_bytes()
    {
        Assert.True(MaskRevisionDocument.TryParse(Encoding.UTF8.GetBytes(Exact), out var document, out var problems));
        Assert.Empty(problems);
        Assert.Equal((Device, Condition, 3, "Pass band"), (document.DeviceId, document.ConditionId, document.Revision, document.Mask.Title));
        Assert.Equal(Mask.ToCanonicalBytes(), document.Mask.ToCanonicalBytes());
    }

    [Fact]
    public void A_revision_does_not_change_with_the_mask_it_was_made_of()
    {
        var corners = new List<LimitCorner> { new(100, 0.5), new(1000, 0.5) };
        var limits = new List<CurveLimit>
        {
            new("top", CurveQuantity.GainDb, LimitSide.Upper, LimitBasis.Absolute, null, null, null, null, corners),
        };
        var document = MaskRevisionDocument.Create(Device, Condition, 3, new MaskDocument("Pass band", new Mask(limits, [])));
        corners.Clear();
        limits.Clear();
        Assert.Equal(2, Assert.Single(document.Mask.Mask.Limits).Corners.Count);
    }

    [Theory]
    [InlineData("\"revision\":3", "\"revision\":0", "revision")]
    [InlineData("\"revision\":3", "\"revision\":1.5", "revision")]
    [InlineData("\"revision\":3", "\"revision\":\"3\"", "revision")]
    [InlineData("maskRevision/1", "maskRevision/2", "format")]
    [InlineData("01890a5d-ac96-774b-bcce-b302099a8057", "01890a5dac96774bbcceb302099a8057", "deviceId")]
    [InlineData("\"title\":\"Pass band\"", "\"title\":\"Pass band\",\"x\":1", "x")]
    [InlineData("\"value\":0.5", "\"value\":\"0.5\"", "limits[0].corners[0].value")]
    [InlineData("01890a5d-ac96-774b-bcce-b302099a8057", "01890A5D-ac96-774b-bcce-b302099a8057", "")]
    [InlineData("\"value\":0.5", "\"value\":0.50", "")]
    [InlineData("\"revision\":3", "\"revision\": 3", "")]
    [InlineData("\"requirements\":[],", "", "requirements")]
    public void Bytes_that_are_not_the_canonical_ones_are_refused(string old, string damaged, string path)
    {
        var bytes = Encoding.UTF8.GetBytes(Exact.Replace(old, damaged, StringComparison.Ordinal));
        Assert.False(MaskRevisionDocument.TryParse(bytes, out var document, out var problems));
        Assert.Null(document);
        Assert.Equal(path, problems[0].Path);
    }

    [Fact]
    public void What_would_not_read_back_is_not_released()
    {
        Assert.Throws<ArgumentException>(() => MaskRevisionDocument.Create(Device, Condition, 0, Mask));
        Assert.Throws<ArgumentException>(() => MaskRevisionDocument.Create(Device, Condition, 1, Mask with { Title = " " }));
        var broken = Mask.Mask.Limits[0] with { Scale = double.NaN };
        Assert.Throws<ArgumentException>(() => MaskRevisionDocument.Create(Device, Condition, 1, new("a", new([broken], []))));
    }

    [Fact]
    public void Each_part_of_a_revision_reaches_its_digest()
    {
        string[] digests =
        [
            .. new[]
            {
                MaskRevisionDocument.Create(Device, Condition, 3, Mask),
                MaskRevisionDocument.Create(Condition, Condition, 3, Mask),
                MaskRevisionDocument.Create(Device, Device, 3, Mask),
                MaskRevisionDocument.Create(Device, Condition, 4, Mask),
                MaskRevisionDocument.Create(Device, Condition, 3, Mask with { Title = "Pass  band" }),
                MaskRevisionDocument.Create(Device, Condition, 3, new("Pass band", new([], []))),
            }.Select(d => Convert.ToHexStringLower(d.Sha256.Span)),
        ];
        Assert.Equal(digests.Length, digests.Distinct(StringComparer.Ordinal).Count());
    }
}

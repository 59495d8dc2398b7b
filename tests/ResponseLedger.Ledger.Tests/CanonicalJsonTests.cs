using System.Text;
using System.Text.Json;
using System.Text.Json.Nodes;
using CsCheck;

namespace ResponseLedger.Ledger.Tests;

/// <summary>RFC 8785. The examples of its sections 3.2.2 and 3.2.3 were written down from memory and agree with several public transcriptions.</summary>
public sealed class CanonicalJsonTests
{
    private const string Section322 = """
        {
          "numbers": [333333333.33333329, 1E30, 4.50, 2e-3, 0.000000000000000000000000001],
          "string": "\u20ac$\u000F\u000aA'\u0042\u0022\u005c\\\"\/",
          "literals": [null, true, false]
        }
        """;

    private const string Section322Canonical =
        """{"literals":[null,true,false],"numbers":[333333333.3333333,1e+30,4.5,0.002,1e-27],"string":"€$\u000f\nA'B\"\\\\\"/"}""";

    private const string Section323 = """
        {
          "\u20ac": "Euro Sign",
          "\r": "Carriage Return",
          "\ufb33": "Hebrew Letter Dalet With Dagesh",
          "1": "One",
          "\ud83d\ude00": "Emoji: Grinning Face",
          "\u0080": "Control",
          "\u00f6": "Latin Small Letter O With Diaeresis"
        }
        """;

    private static readonly string[] Section323Order =
    [
        "Carriage Return", "One", "Control", "Latin Small Letter O With Diaeresis", "Euro Sign", "Emoji: Grinning Face",
        "Hebrew Letter Dalet With Dagesh",
    ];

    [Fact]
    public void The_example_of_section_3_2_2_comes_out_as_published()
    {
        Assert.Equal(Section322Canonical, OfElement(Section322));
        Assert.Equal(Section322Canonical, OfNode(Section322));
    }

    [Fact]
    public void The_names_of_section_3_2_3_ascend_by_utf_16_code_unit()
    {
        foreach (var canonical in new[] { OfElement(Section323), OfNode(Section323) })
        {
            using var document = JsonDocument.Parse(canonical);
            Assert.Equal(Section323Order, document.RootElement.EnumerateObject().Select(m => m.Value.GetString()));
        }
    }

    [Theory]
    [InlineData("\u0000", "\\u0000")]
    [InlineData("\b\t\n\f\r", "\\b\\t\\n\\f\\r")]
    [InlineData("\u000b\u001f", "\\u000b\\u001f")]
    [InlineData("\"\\/", "\\\"\\\\/")]
    [InlineData("\u007f\u2028<&>'ä", "\u007f\u2028<&>'ä")]
    [InlineData("\ud83d\ude00", "\ud83d\ude00")]
    public void Only_what_must_be_escaped_is_escaped(string text, string inside)
        => Assert.Equal($"\"{inside}\"", Encoding.UTF8.GetString(CanonicalJson.Serialize(JsonValue.Create(text))));

    [Theory]
    [InlineData("""{"a":1,"a":1}""")]
    [InlineData("""{"a":1,"\u0061":2}""")]
    [InlineData("""[{"b":{"c":1,"d":2,"c":3}}]""")]
    public void A_name_that_stands_twice_is_refused(string json)
    {
        using var document = JsonDocument.Parse(json);
        Assert.Throws<CanonicalJsonException>(() => CanonicalJson.Serialize(document.RootElement));
        Assert.Throws<CanonicalJsonException>(() => CanonicalJson.Serialize(JsonNode.Parse(json)));
    }

    [Theory]
    [InlineData("""["\ud83d"]""")]
    [InlineData("""["\ude00\ud83d"]""")]
    [InlineData("""{"\udead":1}""")]
    public void A_lone_surrogate_in_json_text_is_refused(string json)
    {
        using var document = JsonDocument.Parse(json);
        Assert.Throws<CanonicalJsonException>(() => CanonicalJson.Serialize(document.RootElement));
        Assert.Throws<CanonicalJsonException>(() => CanonicalJson.Serialize(JsonNode.Parse(json)));
    }

    [Fact]
    public void A_lone_surrogate_in_a_built_document_is_refused_and_not_replaced()
    {
        Assert.Throws<CanonicalJsonException>(() => CanonicalJson.Serialize(new JsonArray("\ud83d")));
        Assert.Throws<CanonicalJsonException>(() => CanonicalJson.Serialize(new JsonObject { ["\udead"] = 1 }));
        Assert.Throws<CanonicalJsonException>(() => CanonicalJson.Serialize(JsonValue.Create('\ud83d')));
    }

    [Theory]
    [InlineData(double.NaN)]
    [InlineData(double.PositiveInfinity)]
    [InlineData(double.NegativeInfinity)]
    public void A_number_that_is_not_finite_is_refused(double number)
        => Assert.Throws<CanonicalJsonException>(() => CanonicalJson.Serialize(new JsonObject { ["a"] = number }));

    [Fact]
    public void A_number_beyond_every_double_is_refused()
    {
        using var document = JsonDocument.Parse("[1e999]");
        Assert.Throws<CanonicalJsonException>(() => CanonicalJson.Serialize(document.RootElement));
        Assert.Throws<CanonicalJsonException>(() => CanonicalJson.Serialize(new JsonArray(float.PositiveInfinity)));
    }

    [Fact]
    public void An_integer_that_a_double_cannot_hold_is_refused_where_it_is_built()
    {
        Assert.Throws<CanonicalJsonException>(() => CanonicalJson.Serialize(JsonValue.Create(9_007_199_254_740_993)));
        Assert.Throws<CanonicalJsonException>(() => CanonicalJson.Serialize(JsonValue.Create(ulong.MaxValue)));
        Assert.Equal("9007199254740992", Encoding.UTF8.GetString(CanonicalJson.Serialize(JsonValue.Create(9_007_199_254_740_992))));
        Assert.Equal("0.1", Encoding.UTF8.GetString(CanonicalJson.Serialize(JsonValue.Create(0.1m))));
    }

    [Fact]
    public void Nesting_beyond_the_limit_is_refused_without_exhausting_the_stack()
    {
        JsonNode deep = new JsonArray();
        for (var i = 1; i < CanonicalJson.MaxDepth; i++)
            deep = new JsonArray(deep);
        Assert.Equal(2 * CanonicalJson.MaxDepth, CanonicalJson.Serialize(deep).Length);
        Assert.Throws<CanonicalJsonException>(() => CanonicalJson.Serialize(new JsonArray(deep)));
    }

    [Fact]
    public void Canonical_bytes_are_their_own_canonical_form()
    {
        Assert.True(CanonicalJson.IsCanonical(Encoding.UTF8.GetBytes(Section322Canonical)));
        Assert.False(CanonicalJson.IsCanonical(Encoding.UTF8.GetBytes(Section322)));
        Assert.False(CanonicalJson.IsCanonical("{\"a\":1 }"u8.ToArray()));
        Assert.False(CanonicalJson.IsCanonical("{\"a\":1"u8.ToArray()));
        Assert.False(CanonicalJson.IsCanonical("[\"\\ud83d\"]"u8.ToArray()));
        Assert.False(CanonicalJson.IsCanonical(Array.Empty<byte>()));
        Assert.False(CanonicalJson.IsCanonical(new byte[] { (byte)'"', 0xff, (byte)'"' }));
    }

    [Fact]
    public void Member_order_and_spacing_never_reach_the_bytes()
    {
        var members = Gen.Dictionary(Gen.String[Gen.Char["abÄ€z\n\""], 0, 6], Gen.Double[-1e6, 1e6])[0, 8];
        members.Sample(
            dictionary =>
            {
                var forward = new JsonObject([.. dictionary.Select(m => KeyValuePair.Create(m.Key, (JsonNode?)JsonValue.Create(m.Value)))]);
                var backward = new JsonObject([.. dictionary.Reverse().Select(m => KeyValuePair.Create(m.Key, (JsonNode?)JsonValue.Create(m.Value)))]);
                var bytes = CanonicalJson.Serialize(forward);
                using var spaced = JsonDocument.Parse(backward.ToJsonString(new JsonSerializerOptions { WriteIndented = true }));
                Assert.Equal(bytes, CanonicalJson.Serialize(backward));
                Assert.Equal(bytes, CanonicalJson.Serialize(spaced.RootElement));
                Assert.True(CanonicalJson.IsCanonical(bytes));
            },
            iter: 1_000,
            threads: 1);
    }

    [Fact]
    public void The_digest_is_sha_256()
        => Assert.Equal(
            "e3b0c44298fc1c149afbf4c8996fb92427ae41e4649b934ca495991b7852b855",
            Convert.ToHexStringLower(CanonicalJson.Digest([])));

    private static string OfElement(string json)
    {
        using var document = JsonDocument.Parse(json);
        return Encoding.UTF8.GetString(CanonicalJson.Serialize(document.RootElement));
    }

    private static string OfNode(string json) => Encoding.UTF8.GetString(CanonicalJson.Serialize(JsonNode.Parse(json)));
}

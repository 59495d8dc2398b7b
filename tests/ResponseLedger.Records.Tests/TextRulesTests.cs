using System.Text.Json.Nodes;
using ResponseLedger.Records.Masks;

namespace ResponseLedger.Records.Tests;

public sealed class TextRulesTests
{
    [Theory]
    [InlineData("a\0b")]
    [InlineData("a\nb")]
    [InlineData("a\tb")]
    [InlineData("a\u0085b")]
    [InlineData("a\u2028b")]
    [InlineData("a\u202Ab")]
    [InlineData("a\u202Eb")]
    [InlineData("a\u2066b")]
    [InlineData("a\u2069b")]
    public void No_name_of_a_mask_holds_more_than_one_plain_line(string text)
    {
        Assert.NotNull(TextRules.AgainstName(text));
        foreach (var at in new[] { "title", "limits", "requirements" })
        {
            var mask = new JsonObject
            {
                ["title"] = at == "title" ? text : "T",
                ["limits"] = new JsonArray(new JsonObject
                {
                    ["name"] = at == "limits" ? text : "L", ["quantity"] = "gainDb", ["side"] = "upper", ["basis"] = "absolute", ["corners"] = new JsonArray(),
                }),
                ["requirements"] = new JsonArray(new JsonObject { ["name"] = at == "requirements" ? text : "R", ["measure"] = "peak", ["output"] = "gainDb" }),
            };

            Assert.False(MaskDocument.TryParse(System.Text.Encoding.UTF8.GetBytes(mask.ToJsonString()), out _, out var problems));
            Assert.Equal(at == "title" ? "title" : $"{at}[0].name", Assert.Single(problems).Path);
        }
    }

    [Theory]
    [InlineData("Anti-alias filter, ±0.5 dB")]
    [InlineData("😀 \u200F\u0646")]
    public void Ordinary_texts_of_any_script_are_taken(string text)
    {
        Assert.Null(TextRules.AgainstName(text));
        Assert.Null(TextRules.AgainstProse(text));
    }

    [Fact]
    public void Prose_has_lines_and_tabs_and_no_other_control_character()
    {
        Assert.Null(TextRules.AgainstProse("one\r\n\ttwo"));
        Assert.NotNull(TextRules.AgainstProse("one\0"));
        Assert.NotNull(TextRules.AgainstProse("one\u0007"));
        Assert.NotNull(TextRules.AgainstProse("one\uDC00"));
        Assert.NotNull(TextRules.AgainstName("one\uD83D"));
    }
}

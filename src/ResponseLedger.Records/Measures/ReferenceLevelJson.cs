using System.Text.Json.Nodes;
using ResponseLedger.Engine.Measures;
using ResponseLedger.Records.Strict;

namespace ResponseLedger.Records.Measures;

/// <summary>A reference level in JSON: <c>{kind:"peak"|"frequency"|"band", frequencyHz?, fromHz?, toHz?}</c>.</summary>
internal static class ReferenceLevelJson
{
    private enum Kind
    {
        Peak,
        Frequency,
        Band,
    }

    private static readonly Dictionary<string, Kind> Kinds = new(StringComparer.Ordinal)
    {
        ["peak"] = Kind.Peak,
        ["frequency"] = Kind.Frequency,
        ["band"] = Kind.Band,
    };

    public static ReferenceLevel? Read(ObjectReader reader)
    {
        var kind = reader.Word("kind", Kinds);
        var frequencyHz = Member("frequencyHz", Kind.Frequency, "frequency");
        var fromHz = Member("fromHz", Kind.Band, "band");
        var toHz = Member("toHz", Kind.Band, "band");
        reader.Finish();
        return (kind, frequencyHz, fromHz, toHz) switch
        {
            (Kind.Peak, _, _, _) => new ReferenceLevel.Peak(),
            (Kind.Frequency, { } at, _, _) => new ReferenceLevel.AtFrequency(at),
            (Kind.Band, _, { } from, { } to) => new ReferenceLevel.Band(from, to),
            _ => null,
        };

        double? Member(string name, Kind owner, string ownerWord)
        {
            if (kind == owner)
                return reader.Number(name);
            if (kind is null)
                return reader.OptionalNumber(name);
            reader.Refuse(name, $"Only a reference of kind {ownerWord} has this member.");
            return null;
        }
    }

    public static JsonObject Write(ReferenceLevel reference) => reference switch
    {
        ReferenceLevel.Peak => new JsonObject { ["kind"] = "peak" },
        ReferenceLevel.AtFrequency at => new JsonObject { ["kind"] = "frequency", ["frequencyHz"] = JsonNumber.Of(at.FrequencyHz) },
        ReferenceLevel.Band band => new JsonObject
        {
            ["kind"] = "band",
            ["fromHz"] = JsonNumber.Of(band.FromHz),
            ["toHz"] = JsonNumber.Of(band.ToHz),
        },
        _ => throw new ArgumentOutOfRangeException(nameof(reference), reference, "There is no such reference level."),
    };
}

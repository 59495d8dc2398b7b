using System.Text.Json;
using System.Text.Json.Nodes;
using ResponseLedger.Engine.Masks;
using ResponseLedger.Engine.Measures;
using ResponseLedger.Records.Measures;
using ResponseLedger.Records.Strict;

namespace ResponseLedger.Records.Masks;

/// <summary>Limits and requirements of a mask in JSON.</summary>
internal static class CriteriaJson
{
    public static CurveLimit? ReadLimit(JsonElement json, string path, ProblemList problems)
    {
        if (ObjectReader.Open(json, path, problems) is not { } reader)
            return null;
        var name = reader.Name("name");
        var quantity = reader.Word("quantity", MaskWords.Quantities);
        var side = reader.Word("side", MaskWords.Sides);
        var basis = reader.Word("basis", MaskWords.Bases);
        var reference = ReadReference(reader, basis);
        var minPointsPerDecade = reader.OptionalNumber("minPointsPerDecade");
        var endRatio = reader.OptionalNumber("endRatio");
        var scale = reader.OptionalNumber("scale");
        var corners = reader.Items("corners", ReadCorner);
        reader.Finish();
        if (name is null || quantity is null || side is null || basis is null)
            return null;
        return new CurveLimit(
            name, quantity.Value, side.Value, basis.Value, reference, minPointsPerDecade, endRatio, scale, [.. corners.Select(c => c.Corner)]);
    }

    public static Requirement? ReadRequirement(JsonElement json, string path, ProblemList problems)
    {
        if (ObjectReader.Open(json, path, problems) is not { } reader)
            return null;
        var name = reader.Name("name");
        var call = MeasureCallJson.Read(reader);
        var output = reader.Name("output");
        var min = reader.OptionalNumber("min");
        var max = reader.OptionalNumber("max");
        var scale = reader.OptionalNumber("scale");
        var acceptNoCrossover = reader.Flag("acceptNoCrossover");
        reader.Finish();
        if (name is null || call is null || output is null)
            return null;
        return new Requirement(name, call, output, min, max, scale, acceptNoCrossover);
    }

    public static JsonObject Write(CurveLimit limit)
    {
        var json = new JsonObject
        {
            ["name"] = limit.Name,
            ["quantity"] = MaskWords.Of(MaskWords.Quantities, limit.Quantity),
            ["side"] = MaskWords.Of(MaskWords.Sides, limit.Side),
            ["basis"] = MaskWords.Of(MaskWords.Bases, limit.Basis),
        };
        if (limit.Reference is { } reference)
            json["reference"] = ReferenceLevelJson.Write(reference);
        AddStated(json, "minPointsPerDecade", limit.MinPointsPerDecade);
        AddStated(json, "endRatio", limit.EndRatio);
        AddStated(json, "scale", limit.Scale);
        json["corners"] = new JsonArray([.. limit.Corners.Select(Write)]);
        return json;
    }

    public static JsonObject Write(Requirement requirement)
    {
        var json = new JsonObject
        {
            ["name"] = requirement.Name,
            ["measure"] = requirement.Call.Measure,
            ["parameters"] = MeasureCallJson.WriteParameters(requirement.Call),
            ["output"] = requirement.Output,
        };
        AddStated(json, "min", requirement.Min);
        AddStated(json, "max", requirement.Max);
        AddStated(json, "scale", requirement.Scale);
        if (requirement.AcceptNoCrossover)
            json["acceptNoCrossover"] = true;
        return json;
    }

    private static ReferenceLevel? ReadReference(ObjectReader reader, LimitBasis? basis)
    {
        if (basis is { } stated && stated != LimitBasis.Reference)
        {
            reader.Refuse("reference", "Only a limit with the basis reference has this member.");
            return null;
        }

        var level = basis is null ? reader.OptionalObject("reference") : reader.Object("reference");
        return level is null ? null : ReferenceLevelJson.Read(level);
    }

    private static CornerRead? ReadCorner(JsonElement json, string path, ProblemList problems)
    {
        if (ObjectReader.Open(json, path, problems) is not { } reader)
            return null;
        var frequencyHz = reader.Number("frequencyHz");
        var value = reader.Number("value");
        reader.Finish();
        return frequencyHz is { } f && value is { } v ? new CornerRead(new LimitCorner(f, v)) : null;
    }

    private static JsonObject Write(LimitCorner corner) => new()
    {
        ["frequencyHz"] = JsonNumber.Of(corner.FrequencyHz),
        ["value"] = JsonNumber.Of(corner.Value),
    };

    private static void AddStated(JsonObject json, string name, double? number)
    {
        if (number is not null)
            json[name] = JsonNumber.Of(number);
    }

    /// <summary>A corner as a reference, so that one that could not be read is null.</summary>
    private sealed record CornerRead(LimitCorner Corner);
}

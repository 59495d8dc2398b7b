using System.Diagnostics.CodeAnalysis;
using System.Text.Json;
using System.Text.Json.Nodes;
using ResponseLedger.Engine;
using ResponseLedger.Engine.Measures;
using ResponseLedger.Ledger;
using ResponseLedger.Records.Strict;

namespace ResponseLedger.Records.Measures;

/// <summary>Measures as people ask for them and read them, in JSON.</summary>
public static class MeasureCallJson
{
    private const string LoopMargins = "loopMargins";

    /// <summary>Reads <c>{measure, parameters}</c> strictly. Never throws.</summary>
    /// <remarks>The shape alone is judged here; names and ranges are judged by <see cref="MeasureCatalogue.ProblemsOf"/>.</remarks>
    public static bool TryParse(
        JsonElement json,
        [NotNullWhen(true)] out MeasureCall? call,
        out IReadOnlyList<DocumentProblem> problems)
    {
        call = StrictDocument.Read(json, ReadRoot, out problems);
        return call is not null;
    }

    /// <summary>Writes <c>{measure, parameters}</c>.</summary>
    public static JsonObject Write(MeasureCall call)
    {
        ArgumentNullException.ThrowIfNull(call);
        return new JsonObject { ["measure"] = call.Measure, ["parameters"] = WriteParameters(call) };
    }

    /// <summary>Writes <c>{measure, outputs, reason?, explanation?, notes?, gainCrossovers?, phaseCrossovers?}</c>; an absent output is null.</summary>
    public static JsonObject Write(MeasureResult result)
    {
        ArgumentNullException.ThrowIfNull(result);
        var outputs = new JsonObject();
        foreach (var output in result.Outputs)
            outputs[output.Name] = JsonNumber.Of(output.Value);

        var json = new JsonObject { ["measure"] = result.Call.Measure, ["outputs"] = outputs };
        if (result.Reason is { } reason)
        {
            json["reason"] = reason.Code;
            json["explanation"] = reason.Sentence;
        }

        if (result.Notes.Count > 0)
            json["notes"] = WriteNotes(result.Notes);
        if (result.Call.Measure == LoopMargins)
        {
            json["gainCrossovers"] = new JsonArray([.. result.GainCrossovers.Select(WriteCrossover)]);
            json["phaseCrossovers"] = new JsonArray([.. result.PhaseCrossovers.Select(WriteCrossover)]);
        }

        return json;
    }

    /// <summary>One text for equal calls, whatever the order of their parameters.</summary>
    public static string KeyOf(MeasureCall call) => Convert.ToBase64String(CanonicalJson.Serialize(Write(call)));

    /// <summary>Reads the members <c>measure</c> and <c>parameters</c> of an object that may have others.</summary>
    internal static MeasureCall? Read(ObjectReader reader)
    {
        var measure = reader.Name("measure");
        var numbers = new SortedDictionary<string, double>(StringComparer.Ordinal);
        ReferenceLevel? reference = null;

        // A measure without parameters may leave the whole object out.
        if (reader.OptionalObject("parameters") is { } parameters)
        {
            if (parameters.OptionalObject("reference") is { } level)
                reference = ReferenceLevelJson.Read(level);
            foreach (var name in parameters.Names.Where(name => name != "reference"))
            {
                if (TextRules.AgainstName(name) is { } problem)
                    parameters.Add(name, problem);
                else if (parameters.OptionalNumber(name) is { } number)
                    numbers[name] = number;
            }
        }

        return measure is null ? null : new MeasureCall(measure, numbers, reference);
    }

    internal static JsonObject WriteParameters(MeasureCall call)
    {
        var parameters = new JsonObject();
        foreach (var (name, value) in call.Parameters.OrderBy(p => p.Key, StringComparer.Ordinal))
            parameters[name] = JsonNumber.Of(value);
        if (call.Reference is { } reference)
            parameters["reference"] = ReferenceLevelJson.Write(reference);
        return parameters;
    }

    private static MeasureCall? ReadRoot(JsonElement root, ProblemList problems)
    {
        if (ObjectReader.Open(root, string.Empty, problems) is not { } reader)
            return null;
        var call = Read(reader);
        reader.Finish();
        return call;
    }

    internal static JsonArray WriteNotes(IReadOnlyList<Absence> notes) => new([.. notes.Select(WriteNote)]);

    private static JsonObject WriteNote(Absence note) => new() { ["code"] = note.Code, ["message"] = note.Sentence };

    private static JsonObject WriteCrossover(GainCrossover crossover) => new()
    {
        ["frequencyHz"] = JsonNumber.Of(crossover.FrequencyHz),
        ["phaseMarginDeg"] = JsonNumber.Of(crossover.PhaseMarginDeg),
    };

    private static JsonObject WriteCrossover(PhaseCrossover crossover) => new()
    {
        ["frequencyHz"] = JsonNumber.Of(crossover.FrequencyHz),
        ["gainMarginDb"] = JsonNumber.Of(crossover.GainMarginDb),
    };
}

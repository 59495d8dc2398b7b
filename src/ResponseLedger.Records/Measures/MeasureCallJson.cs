using System.Diagnostics.CodeAnalysis;
using System.Text.Json;
using System.Text.Json.Nodes;
using ResponseLedger.Engine.Measures;

namespace ResponseLedger.Records.Measures;

/// <summary>Measures as people ask for them and read them, in JSON.</summary>
public static class MeasureCallJson
{
    /// <summary>Reads <c>{measure, parameters}</c> strictly. Never throws.</summary>
    public static bool TryParse(
        JsonElement json,
        [NotNullWhen(true)] out MeasureCall? call,
        out IReadOnlyList<DocumentProblem> problems) => throw new NotImplementedException();

    /// <summary>Writes <c>{measure, parameters}</c>.</summary>
    public static JsonObject Write(MeasureCall call) => throw new NotImplementedException();

    /// <summary>Writes <c>{measure, outputs, reason?, explanation?, notes?, gainCrossovers?, phaseCrossovers?}</c>; an absent output is null.</summary>
    public static JsonObject Write(MeasureResult result) => throw new NotImplementedException();
}

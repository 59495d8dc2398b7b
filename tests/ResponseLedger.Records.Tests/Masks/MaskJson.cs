namespace ResponseLedger.Records.Tests.Masks;

/// <summary>One mask that states every member that a mask can have, and its canonical form written by hand.</summary>
internal static class MaskJson
{
    public const string Full = """
        {
          "title": "Anti-alias filter, ±0.5 dB",
          "limits": [
            {
              "name": "stop band", "quantity": "gainDb", "side": "upper", "basis": "reference",
              "reference": { "kind": "band", "fromHz": 100, "toHz": 1e3 },
              "minPointsPerDecade": 20, "endRatio": 1.05, "scale": 0.5,
              "corners": [ { "frequencyHz": 2.0e4, "value": -40 }, { "frequencyHz": 100000, "value": -60.5 } ]
            },
            {
              "name": "like golden", "quantity": "phaseDeg", "side": "lower", "basis": "golden", "reference": null,
              "corners": [ { "frequencyHz": 10, "value": -2 }, { "frequencyHz": 10, "value": -3 } ]
            },
            {
              "name": "delay", "quantity": "delaySeconds", "side": "upper", "basis": "absolute",
              "corners": [ { "value": 0.000001, "frequencyHz": 10 }, { "value": 1e-7, "frequencyHz": 20 } ]
            }
          ],
          "requirements": [
            {
              "name": "corner", "measure": "bandwidth", "output": "upperHz", "min": 950, "max": 1050, "scale": 10,
              "parameters": { "reference": { "kind": "frequency", "frequencyHz": 100 }, "dropDb": 3.0103 }
            },
            {
              "name": "margin", "measure": "loopMargins", "output": "phaseMarginDeg", "min": 45, "acceptNoCrossover": true
            },
            {
              "name": "peak drop", "measure": "attenuation", "output": "attenuationDb", "max": 1, "acceptNoCrossover": false,
              "parameters": { "fromHz": 5, "toHz": 6, "reference": { "kind": "peak" } }
            }
          ]
        }
        """;

    /// <summary>To be read without the line ends.</summary>
    public static string Canonical { get; } = """
        {"limits":[
        {"basis":"reference","corners":[{"frequencyHz":20000,"value":-40},{"frequencyHz":100000,"value":-60.5}],"endRatio":1.05,"minPointsPerDecade":20,"name":"stop band","quantity":"gainDb","reference":{"fromHz":100,"kind":"band","toHz":1000},"scale":0.5,"side":"upper"},
        {"basis":"golden","corners":[{"frequencyHz":10,"value":-2},{"frequencyHz":10,"value":-3}],"name":"like golden","quantity":"phaseDeg","side":"lower"},
        {"basis":"absolute","corners":[{"frequencyHz":10,"value":0.000001},{"frequencyHz":20,"value":1e-7}],"name":"delay","quantity":"delaySeconds","side":"upper"}],
        "requirements":[
        {"max":1050,"measure":"bandwidth","min":950,"name":"corner","output":"upperHz","parameters":{"dropDb":3.0103,"reference":{"frequencyHz":100,"kind":"frequency"}},"scale":10},
        {"acceptNoCrossover":true,"measure":"loopMargins","min":45,"name":"margin","output":"phaseMarginDeg","parameters":{}},
        {"max":1,"measure":"attenuation","name":"peak drop","output":"attenuationDb","parameters":{"fromHz":5,"reference":{"kind":"peak"},"toHz":6}}],
        "title":"Anti-alias filter, ±0.5 dB"}
        """.ReplaceLineEndings(string.Empty);
}

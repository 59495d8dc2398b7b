namespace ResponseLedger.Server.Demo;

/// <summary>The acceptance masks of the demo lab, as they would be sent to the API.</summary>
internal static class DemoMasks
{
    public const string AntiAliasBoard = """
        {
          "title": "AAF-210 acceptance",
          "limits": [
            { "name": "Gain ceiling", "quantity": "gainDb", "side": "upper", "basis": "reference", "reference": { "kind": "frequency", "frequencyHz": 1000 },
              "minPointsPerDecade": 20, "scale": 0.3,
              "corners": [ { "frequencyHz": 100, "value": 0.3 }, { "frequencyHz": 8000, "value": 0.3 }, { "frequencyHz": 11000, "value": -2.8 }, { "frequencyHz": 30000, "value": -36.5 }, { "frequencyHz": 100000, "value": -77 } ] },
            { "name": "Pass-band floor", "quantity": "gainDb", "side": "lower", "basis": "reference", "reference": { "kind": "frequency", "frequencyHz": 1000 },
              "minPointsPerDecade": 20, "scale": 0.2,
              "corners": [ { "frequencyHz": 100, "value": -0.2 }, { "frequencyHz": 5000, "value": -0.3 }, { "frequencyHz": 9000, "value": -2.9 } ] },
            { "name": "Phase above golden", "quantity": "phaseDeg", "side": "upper", "basis": "golden", "scale": 1,
              "corners": [ { "frequencyHz": 100, "value": 1 }, { "frequencyHz": 2000, "value": 3 }, { "frequencyHz": 10000, "value": 12 } ] },
            { "name": "Phase below golden", "quantity": "phaseDeg", "side": "lower", "basis": "golden",
              "corners": [ { "frequencyHz": 100, "value": -1 }, { "frequencyHz": 2000, "value": -3 }, { "frequencyHz": 10000, "value": -12 } ] }
          ],
          "requirements": [
            { "name": "Gain at 1 kHz", "measure": "level", "parameters": { "frequencyHz": 1000 }, "output": "gainDb", "min": -0.15, "max": 0.15, "scale": 0.15 },
            { "name": "Corner", "measure": "bandwidth", "parameters": { "dropDb": 3.0103, "reference": { "kind": "frequency", "frequencyHz": 1000 } }, "output": "upperHz", "min": 9600, "max": 10400, "scale": 400 },
            { "name": "Roll-off", "measure": "slope", "parameters": { "fromHz": 25000, "toHz": 80000 }, "output": "dbPerDecade", "min": -82, "max": -77, "scale": 2 }
          ]
        }
        """;

    public const string PreamplifierStandard = """
        {
          "title": "HPA-32 acceptance, gain 20 dB",
          "limits": [
            { "name": "Gain ceiling", "quantity": "gainDb", "side": "upper", "basis": "absolute", "scale": 0.3,
              "corners": [ { "frequencyHz": 1, "value": 11 }, { "frequencyHz": 2.5, "value": 17 }, { "frequencyHz": 5, "value": 20.3 }, { "frequencyHz": 200000, "value": 20.3 } ] },
            { "name": "Gain floor", "quantity": "gainDb", "side": "lower", "basis": "absolute", "scale": 0.4,
              "corners": [ { "frequencyHz": 20, "value": 19.6 }, { "frequencyHz": 40000, "value": 19.4 }, { "frequencyHz": 100000, "value": 17.5 } ] },
            { "name": "Phase above golden", "quantity": "phaseDeg", "side": "upper", "basis": "golden",
              "corners": [ { "frequencyHz": 10, "value": 4 }, { "frequencyHz": 1000, "value": 1 }, { "frequencyHz": 30000, "value": 4 } ] },
            { "name": "Phase below golden", "quantity": "phaseDeg", "side": "lower", "basis": "golden",
              "corners": [ { "frequencyHz": 10, "value": -4 }, { "frequencyHz": 1000, "value": -1 }, { "frequencyHz": 30000, "value": -4 } ] }
          ],
          "requirements": [
            { "name": "Gain at 1 kHz", "measure": "level", "parameters": { "frequencyHz": 1000 }, "output": "gainDb", "min": 19.9, "max": 20.1, "scale": 0.1 },
            { "name": "Lower corner", "measure": "bandwidth", "parameters": { "dropDb": 3.0103, "reference": { "kind": "frequency", "frequencyHz": 1000 } }, "output": "lowerHz", "max": 3.8, "scale": 0.4 }
          ]
        }
        """;

    public const string PreamplifierHighGain = """
        {
          "title": "HPA-32 acceptance, gain 40 dB",
          "limits": [
            { "name": "Gain ceiling", "quantity": "gainDb", "side": "upper", "basis": "absolute", "scale": 0.3,
              "corners": [ { "frequencyHz": 1, "value": 31 }, { "frequencyHz": 2.5, "value": 37 }, { "frequencyHz": 5, "value": 40.3 }, { "frequencyHz": 200000, "value": 40.3 } ] },
            { "name": "Gain floor", "quantity": "gainDb", "side": "lower", "basis": "absolute", "scale": 0.4,
              "corners": [ { "frequencyHz": 20, "value": 39.6 }, { "frequencyHz": 40000, "value": 39.1 }, { "frequencyHz": 100000, "value": 36.5 } ] }
          ],
          "requirements": [
            { "name": "Gain at 1 kHz", "measure": "level", "parameters": { "frequencyHz": 1000 }, "output": "gainDb", "min": 39.85, "max": 40.15, "scale": 0.15 }
          ]
        }
        """;

    public const string ServoLoop = """
        {
          "title": "SVL-07 acceptance",
          "limits": [
            { "name": "Loop gain ceiling", "quantity": "gainDb", "side": "upper", "basis": "golden",
              "corners": [ { "frequencyHz": 1, "value": 1 }, { "frequencyHz": 300, "value": 1 }, { "frequencyHz": 1000, "value": 2 } ] },
            { "name": "Loop gain floor", "quantity": "gainDb", "side": "lower", "basis": "golden",
              "corners": [ { "frequencyHz": 1, "value": -1.2 }, { "frequencyHz": 300, "value": -1.2 }, { "frequencyHz": 1000, "value": -2 } ] }
          ],
          "requirements": [
            { "name": "Phase margin", "measure": "loopMargins", "parameters": {}, "output": "phaseMarginDeg", "min": 60, "scale": 5 },
            { "name": "Gain margin", "measure": "loopMargins", "parameters": {}, "output": "gainMarginDb", "min": 18, "scale": 2 },
            { "name": "Crossover", "measure": "loopMargins", "parameters": {}, "output": "gainCrossoverHz", "min": 17, "max": 22, "scale": 2 }
          ]
        }
        """;
}

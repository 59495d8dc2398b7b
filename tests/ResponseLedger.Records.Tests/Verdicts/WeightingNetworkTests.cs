using System.Globalization;
using System.Text.Json.Nodes;
using ResponseLedger.Engine.Masks;
using ResponseLedger.Engine.Measures;
using ResponseLedger.Engine.Sweeps;
using ResponseLedger.Records.Masks;
using ResponseLedger.Records.Verdicts;

namespace ResponseLedger.Records.Tests.Verdicts;

/// <summary>
/// Rec. ITU-R BS.468-4: the network of Figure 1a as a file, the mask of Table 1 as JSON, and the verdict between them.
/// Expected margins are those that the reference set states, to 1e-7 dB.
/// </summary>
public sealed class WeightingNetworkTests
{
    [Fact]
    public void By_the_bare_table_the_network_is_a_narrow_miss_at_6303_Hz()
    {
        var judgement = Judged(openedDb: 0, frequencyFactor: 1);
        Assert.Equal(Outcome.Fail, judgement.Evaluation.Outcome);
        var upper = judgement.Evaluation.Criteria[0];
        Assert.Equal((Outcome.Fail, "upper tolerance"), (upper.Outcome, upper.Name));
        Assert.Equal(-0.01662959, upper.Margin!.Value, 1e-7);
        Assert.Equal(6303.0964, upper.FrequencyHz!.Value, 1e-4);
        var lower = judgement.Evaluation.Criteria[1];
        Assert.Equal(Outcome.Pass, lower.Outcome);
        Assert.Equal(0.01662283, lower.Margin!.Value, 1e-7);
        Assert.Equal(6300, lower.FrequencyHz!.Value, 1e-9);
    }

    [Fact]
    public void With_tolerances_opened_by_the_table_s_rounding_the_network_passes()
        => Assert.Equal(Outcome.Pass, Judged(openedDb: 0.05, frequencyFactor: 1).Evaluation.Outcome);

    [Fact]
    public void Scaled_by_six_percent_along_frequency_the_network_fails()
        => Assert.Equal(Outcome.Fail, Judged(openedDb: 0.05, frequencyFactor: 1.06).Evaluation.Outcome);

    [Fact]
    public void The_stored_row_names_the_same_worst_criterion_as_the_evaluation()
    {
        var judgement = Judged(openedDb: 0, frequencyFactor: 1);
        var worst = StoredVerdict.WorstOf(Mask(0), judgement.Stored)!;
        Assert.Equal(("upper tolerance", "dB", Outcome.Fail), (worst.Criterion, worst.Unit, worst.Outcome));
        Assert.Equal(judgement.Evaluation.Criteria[0].Margin, worst.Margin);
    }

    private static Judgement Judged(double openedDb, double frequencyFactor)
    {
        var revision = MaskRevisionDocument.Create(Guid.Empty, Guid.Empty, 1, Mask(openedDb));
        var basis = new JudgementBasis(revision, null, DeviceTraits.Transfer);
        var file = Judge.Evaluate(ReferenceFiles.Read("itu-r-bs468-4-network.csv"), "network.csv", null, basis, TestContext.Current.CancellationToken);
        Assert.True(file.Reading.Sweep is not null, string.Join("; ", file.Reading.Issues));
        if (frequencyFactor == 1)
            return file.Judgement!;
        var run = file.Reading.Sweep;
        double[] scaledHz = [.. run.FrequencyHz];
        for (var i = 0; i < scaledHz.Length; i++)
            scaledHz[i] *= frequencyFactor;
        return Judge.Evaluate(Sweep.Create(run.Form, scaledHz, run.FirstPlane, run.SecondPlane), basis);
    }

    /// <summary>The table's tolerances as a mask sent in JSON; 31.5 kHz has no lower corner.</summary>
    private static MaskDocument Mask(double openedDb)
    {
        var upper = new JsonArray();
        var lower = new JsonArray();
        foreach (var row in ReferenceFiles.Rows("itu-r-bs468-4.csv"))
        {
            var (frequencyHz, responseDb) = (Number(row[0]), Number(row[1]));
            upper.Add(Corner(frequencyHz, responseDb + Number(row[2]) + openedDb));
            if (row[3] != "inf")
                lower.Add(Corner(frequencyHz, responseDb - Number(row[3]) - openedDb));
        }

        var json = new JsonObject
        {
            ["title"] = "Rec. ITU-R BS.468-4, Table 1",
            ["limits"] = new JsonArray(Limit("upper tolerance", "upper", upper), Limit("lower tolerance", "lower", lower)),
            ["requirements"] = new JsonArray(),
        };
        var mask = Masks.MaskDocumentTests.Parsed(json.ToJsonString());
        Assert.Empty(mask.ReleaseProblems());
        return mask;
    }

    private static JsonObject Limit(string name, string side, JsonArray corners) => new()
    {
        ["name"] = name,
        ["quantity"] = "gainDb",
        ["side"] = side,
        ["basis"] = "absolute",
        ["corners"] = corners,
    };

    private static JsonObject Corner(double frequencyHz, double valueDb) => new() { ["frequencyHz"] = frequencyHz, ["value"] = valueDb };

    private static double Number(string text) => double.Parse(text, CultureInfo.InvariantCulture);
}

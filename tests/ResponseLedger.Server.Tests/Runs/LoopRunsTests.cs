using System.Text.Json;
using static ResponseLedger.Server.Tests.Runs.ReferenceCases;

namespace ResponseLedger.Server.Tests.Runs;

/// <summary>tests/reference/loops.json, each case sent as a file for a loop device and measured over HTTP, to the tolerances of the set's README.</summary>
public sealed class LoopRunsTests(Lab lab)
{
    private static readonly Dictionary<string, JsonElement> Loops = Of("loops.json", "loops");

    public static TheoryData<string> Ids => new(Loops.Keys);

    [Fact]
    public void All_fifteen_loops_are_here() => Assert.Equal(15, Loops.Count);

    [Theory, MemberData(nameof(Ids))]
    public async Task Every_margin_of_a_loop_is_met_over_http(string id)
    {
        var loop = Loops[id];
        var scene = await RunScene.NewAsync(lab, mask: false, "loop", loop.GetProperty("criticalPhaseDeg").GetInt32());
        var runId = await scene.AcceptedAsync("U1.csv", FileOf(loop));
        var found = (await scene.MeasureAsync(runId, new { measure = "loopMargins" }))[0];
        var measures = loop.GetProperty("measures");
        var levelDb = id == "resonant-three-gain-crossovers" ? 0.4 : 0.001;
        CheckCrossovers(loop.GetProperty("straightLineOnGrid"), found, 1e-9, 1e-9, 1e-9);
        CheckCrossovers(measures, found, 1e-4, 0.02, levelDb);
        Close(Number(measures, "leastPhaseMarginDeg"), found.Output("phaseMarginDeg"), 0.02, "least phase margin");
        Close(Number(measures, "leastGainMarginIncreaseDb"), found.Output("gainMarginDb"), levelDb, "least gain margin");
        Close(Number(measures, "leastGainMarginDecreaseDb"), found.Output("gainReductionDb"), levelDb, "nearest gain reduction");
        var least = measures.GetProperty("leastDistanceToCriticalPoint");
        Close(least.GetProperty("distance").GetDouble(), found.Output("leastDistance"), 1e-4, "least distance");

        // The distance is flat at its least, so its place is only as sharp as the square root of what the grid costs.
        var placeHz = least.GetProperty("frequencyHz").GetDouble();
        Close(placeHz, found.Output("leastDistanceHz"), 0.01 * placeHz, "place of the least distance");
    }

    private static void CheckCrossovers(JsonElement expected, JsonElement found, double relativeHz, double deg, double db)
    {
        Check("gainCrossovers", "phaseMarginDeg", deg);
        Check("phaseCrossovers", "gainMarginDb", db);

        void Check(string list, string margin, double tolerance)
        {
            Assert.Equal(expected.GetProperty(list).GetArrayLength(), found.GetProperty(list).GetArrayLength());
            foreach (var (one, other) in expected.GetProperty(list).EnumerateArray().Zip(found.GetProperty(list).EnumerateArray()))
            {
                var frequencyHz = one.GetProperty("frequencyHz").GetDouble();
                Close(frequencyHz, Number(other, "frequencyHz"), relativeHz * frequencyHz, list);
                Close(one.GetProperty(margin).GetDouble(), Number(other, margin), tolerance, margin);
            }
        }
    }
}

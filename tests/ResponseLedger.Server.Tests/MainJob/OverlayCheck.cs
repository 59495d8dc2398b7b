namespace ResponseLedger.Server.Tests.MainJob;

/// <summary>The overlay of a lot against the traces of its runs, and those against the circuit that was measured.</summary>
internal static class OverlayCheck
{
    // What unwrapping, a ratio and a real and imaginary part in text cost.
    private const double Tolerance = 1e-9;

    /// <summary>Asks for levels, phases and differences in the first condition, which all runs measured on one grid.</summary>
    /// <param name="client">Who asks.</param>
    /// <param name="lotPath">Path of the lot.</param>
    /// <param name="runs">Run ids by serial number.</param>
    /// <param name="goldenRun">The golden run.</param>
    public static async Task AgreesWithTracesAsync(HttpClient client, string lotPath, IReadOnlyDictionary<string, string> runs, string goldenRun)
    {
        await AgreesAsync(client, lotPath, runs, "gain", "gainDb");
        await AgreesAsync(client, lotPath, runs, "phase", "phaseDeg");

        var golden = await client.SeeAsync($"/api/runs/{goldenRun}/trace");
        IsTheCircuit(golden.Numbers("gainDb"), LowPassDevice.Golden(LowPassDevice.Standard).GainDb);
        IsTheCircuit(golden.Numbers("phaseDeg"), LowPassDevice.Golden(LowPassDevice.Standard).PhaseDeg);
        var differences = await client.SeeAsync($"{lotPath}/overlay?quantity=gain&basis=minusGolden");
        Assert.Equal(goldenRun, differences.GetProperty("golden").Text("runId"));
        foreach (var run in differences.GetProperty("runs").EnumerateArray())
        {
            var own = (await client.SeeAsync($"/api/runs/{run.Text("runId")}/trace")).Numbers("gainDb");
            Same(own.Zip(golden.Numbers("gainDb"), (a, b) => a - b), run.Numbers("values"));
        }
    }

    private static async Task AgreesAsync(HttpClient client, string lotPath, IReadOnlyDictionary<string, string> runs, string quantity, string member)
    {
        var overlay = await client.SeeAsync($"{lotPath}/overlay?quantity={quantity}&basis=asMeasured&points=800");
        Assert.Equal(LowPass.GridHz, overlay.Numbers("frequencyHz"));
        var lines = overlay.GetProperty("runs").EnumerateArray().ToDictionary(r => r.Text("serial"), r => r);
        Assert.Equal(runs.OrderBy(r => r.Key), lines.ToDictionary(l => l.Key, l => l.Value.Text("runId")).OrderBy(r => r.Key));
        foreach (var (serial, runId) in runs)
        {
            var trace = await client.SeeAsync($"/api/runs/{runId}/trace");
            Assert.Equal(LowPass.GridHz, trace.Numbers("frequencyHz"));
            Same(trace.Numbers(member), lines[serial].Numbers("values"));
        }
    }

    private static void IsTheCircuit(List<double> shown, Func<double, double> circuit) => Same(LowPass.GridHz.Select(circuit), shown);

    private static void Same(IEnumerable<double> expected, List<double> shown)
    {
        var all = expected.ToList();
        Assert.Equal(all.Count, shown.Count);
        for (var i = 0; i < all.Count; i++)
            Assert.Equal(all[i], shown[i], Tolerance);
    }
}

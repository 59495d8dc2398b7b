using System.ComponentModel;
using System.Diagnostics;
using System.Globalization;
using System.Runtime.InteropServices;
using System.Text.Json;

namespace ResponseLedger.Benchmarks.Numbers;

/// <summary>Runs numpy_peer.py on the same arrays; absent where no python3 with numpy is found.</summary>
internal sealed record NumpyPeer(double MedianMs, double P95Ms, double[] Margins)
{
    // A python of one's own often hides the system's, and only one of them may have numpy.
    private static readonly string[] Pythons = ["python3", "/usr/bin/python3"];

    public static NumpyPeer? Run(double[] frequencyHz, double[] gainDb, double[] phaseDeg, int rounds)
    {
        var planes = Path.GetTempFileName();
        try
        {
            double[] all = [.. frequencyHz, .. gainDb, .. phaseDeg];
            File.WriteAllBytes(planes, MemoryMarshal.AsBytes(all.AsSpan()));
            return Pythons.Select(python => Run(python, planes, rounds)).FirstOrDefault(found => found is not null);
        }
        finally
        {
            File.Delete(planes);
        }
    }

    private static NumpyPeer? Run(string python, string planes, int rounds)
    {
        var start = new ProcessStartInfo(python, [Path.Combine(AppContext.BaseDirectory, "Numbers", "numpy_peer.py"), planes, rounds.ToString(CultureInfo.InvariantCulture)])
        {
            RedirectStandardOutput = true,
            RedirectStandardError = true,
        };
        start.Environment["OMP_NUM_THREADS"] = "1";
        try
        {
            using var process = Process.Start(start)!;
            var errors = process.StandardError.ReadToEndAsync();
            var told = process.StandardOutput.ReadToEnd();
            process.WaitForExit();
            if (process.ExitCode == 0)
                return JsonSerializer.Deserialize<NumpyPeer>(told, JsonSerializerOptions.Web);
            var said = errors.GetAwaiter().GetResult();
            return said.Contains("No module named 'numpy'", StringComparison.Ordinal) ? null
                : throw new InvalidOperationException($"numpy_peer.py ended with {process.ExitCode}: {said}");
        }
        catch (Win32Exception)
        {
            return null;
        }
    }
}

using ResponseLedger.Benchmarks.Lab;
using ResponseLedger.Benchmarks.Measuring;
using ResponseLedger.Benchmarks.Uploads;

// dotnet run -c Release [--] [--short] [upload|parallel|overlay|lots|start|engine|reader ...]
var effort = new Effort(args.Contains("--short"));
var asked = args.Where(a => !a.StartsWith('-')).ToHashSet();
var report = new Report(Console.Out);
StoreFolder.Choose();

if (Wanted("upload", "parallel", "overlay", "lots"))
{
    await using var lab = await BenchLab.StartAsync();
    await lab.DescribeAsync(report);
    if (Wanted("upload"))
        await UploadBenchmark.RunAsync(lab, report, effort);
}

return report.End();

bool Wanted(params ReadOnlySpan<string> names)
{
    if (asked.Count == 0)
        return true;
    foreach (var name in names)
    {
        if (asked.Contains(name))
            return true;
    }

    return false;
}

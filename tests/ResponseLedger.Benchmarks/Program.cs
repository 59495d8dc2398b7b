using ResponseLedger.Benchmarks.Lab;
using ResponseLedger.Benchmarks.Lots;
using ResponseLedger.Benchmarks.Measuring;
using ResponseLedger.Benchmarks.Numbers;
using ResponseLedger.Benchmarks.Start;
using ResponseLedger.Benchmarks.Uploads;

// dotnet run -c Release [--] [--short] [upload|parallel|overlay|lots|start|engine|reader ...]
var effort = new Effort(args.Contains("--short"));
var asked = args.Where(a => !a.StartsWith('-')).ToHashSet();
var report = new Report(Console.Out);
StoreFolder.Choose();

if (Wanted("engine"))
    EngineBenchmark.Run(report, effort);
if (Wanted("reader"))
    ReaderBenchmark.Run(report, effort);
if (Wanted("upload", "parallel", "overlay", "lots"))
{
    await using var lab = await BenchLab.StartAsync();
    await lab.DescribeAsync(report);
    if (Wanted("upload"))
        await UploadBenchmark.RunAsync(lab, report, effort);
    if (Wanted("parallel"))
        await ParallelUploads.RunAsync(lab, report, effort);
    if (Wanted("overlay"))
        await OverlayBenchmark.RunAsync(lab, report, effort);
    if (Wanted("lots"))
        await LotPageBenchmark.RunAsync(lab, report, effort);
}

if (Wanted("start"))
    await ReadinessBenchmark.RunAsync(report, effort);
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

namespace ResponseLedger.Bench.Tests;

/// <summary>A folder with sweep files, and calls of the tool on them: what it printed and how it ended.</summary>
internal sealed class Call : IDisposable
{
    private readonly StringWriter output = new() { NewLine = "\n" };
    private readonly StringWriter errors = new() { NewLine = "\n" };

    /// <summary>The environment; empty unless a test fills it.</summary>
    public Dictionary<string, string> Variables { get; } = [];

    /// <summary>The waits between two tries, none of which is waited for.</summary>
    public HastyTime Time { get; } = new();

    /// <summary>Makes the client; the network is not touched unless a test gives one.</summary>
    public Func<HttpClient> Connect { get; set; } = () => throw new InvalidOperationException("The tool connects without need.");

    public string Folder { get; } = Directory.CreateTempSubdirectory("responseledger-bench-").FullName;
    public int ExitCode { get; private set; }

    /// <summary>The lines that were printed, the folder's name left out.</summary>
    public string[] Output => Lines(output);

    public string[] Errors => Lines(errors);

    /// <summary>A sweep with a level that is the same everywhere; the remark makes its bytes its own.</summary>
    public static string Csv(double gainDb, string remark = "")
        => FormattableString.Invariant($"# {remark}\nfrequency_hz,gain_db,phase_deg\n10,{gainDb:R},0\n100,{gainDb:R},-1\n10000,{gainDb:R},-2\n");

    /// <summary>Puts a file into the folder and gives its path.</summary>
    public string File(string name, string? content = null)
    {
        var path = Path.Combine(Folder, name);
        System.IO.File.WriteAllText(path, content ?? Csv(0, name));
        return path;
    }

    /// <summary>Calls the tool, and gives its exit code.</summary>
    public async Task<int> RunAsync(string[] args, CancellationToken cancellationToken = default)
    {
        output.GetStringBuilder().Clear();
        errors.GetStringBuilder().Clear();
        var surroundings = new Surroundings(output, errors, Variables.GetValueOrDefault, Connect, Time);
        return ExitCode = await BenchTool.RunAsync(args, surroundings, cancellationToken);
    }

    public void Dispose()
    {
        Directory.Delete(Folder, recursive: true);
        output.Dispose();
        errors.Dispose();
    }

    private string[] Lines(StringWriter written)
        => written.ToString().Replace(Folder + Path.DirectorySeparatorChar, "", StringComparison.Ordinal).TrimEnd('\n') is { Length: > 0 } text ? text.Split('\n') : [];
}

/// <summary>A clock that notes how long somebody would wait, and lets them go on at once.</summary>
internal sealed class HastyTime : TimeProvider
{
    /// <summary>The waits in seconds.</summary>
    public List<double> WaitsSeconds { get; } = [];

    public override ITimer CreateTimer(TimerCallback callback, object? state, TimeSpan dueTime, TimeSpan period)
    {
        WaitsSeconds.Add(dueTime.TotalSeconds);
        return base.CreateTimer(callback, state, TimeSpan.Zero, period);
    }
}

using System.Diagnostics;

namespace ResponseLedger.Store.Embedded;

/// <summary>Runs a program to its end and keeps what it said.</summary>
internal static class ProgramRun
{
    public sealed record Result(int ExitCode, string Output);

    /// <summary>Start information for a program whose streams are ours and whose environment says nothing about another PostgreSQL.</summary>
    public static ProcessStartInfo Prepare(IReadOnlyList<string> commandLine)
    {
        var start = new ProcessStartInfo(commandLine[0], commandLine.Skip(1))
        {
            RedirectStandardInput = true,
            RedirectStandardOutput = true,
            RedirectStandardError = true,
            UseShellExecute = false,
            CreateNoWindow = true,
            WorkingDirectory = Path.GetPathRoot(Environment.CurrentDirectory) ?? Environment.CurrentDirectory,
        };
        foreach (var name in start.Environment.Keys.Where(name => name.StartsWith("PG", StringComparison.Ordinal)).ToArray())
            start.Environment.Remove(name);
        start.Environment["LC_ALL"] = "C";
        return start;
    }

    /// <summary>Runs it; output is both streams, in no sure order.</summary>
    public static async Task<Result> ToEndAsync(IReadOnlyList<string> commandLine, CancellationToken cancellationToken)
    {
        using var process = Process.Start(Prepare(commandLine))
            ?? throw new EmbeddedPostgresException($"{commandLine[0]} could not be started.");
        process.StandardInput.Close();
        var output = process.StandardOutput.ReadToEndAsync(cancellationToken);
        var errors = process.StandardError.ReadToEndAsync(cancellationToken);
        try
        {
            await process.WaitForExitAsync(cancellationToken);
            return new Result(process.ExitCode, (await output + await errors).Trim());
        }
        catch (OperationCanceledException)
        {
            if (!process.HasExited)
                process.Kill();
            throw;
        }
    }
}

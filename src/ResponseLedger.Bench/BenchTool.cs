using System.CommandLine;
using System.CommandLine.Invocation;

namespace ResponseLedger.Bench;

/// <summary>The command line: what is called for, and the exit code that the caller gets.</summary>
internal static class BenchTool
{
    /// <summary>Runs one call of the tool and gives its exit code.</summary>
    public static async Task<int> RunAsync(string[] args, Surroundings surroundings, CancellationToken cancellationToken = default)
    {
        var root = new RootCommand("The bench's side of ResponseLedger: look at sweep files before they are sent, and send them.")
        {
            CheckCommand.Create(surroundings),
            SendCommand.Create(surroundings),
        };
        var parsed = root.Parse(args);
        if (parsed.Action is ParseErrorAction)
        {
            // The framework would end with 1, which here means that files are not in order.
            foreach (var error in parsed.Errors)
                await surroundings.Errors.WriteLineAsync(error.Message);
            await surroundings.Errors.WriteLineAsync("Call it with --help to see what it takes.");
            return ExitCodes.NotDone;
        }

        return await parsed.InvokeAsync(new InvocationConfiguration { Output = surroundings.Output, Error = surroundings.Errors }, cancellationToken);
    }
}

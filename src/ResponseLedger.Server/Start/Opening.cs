using Microsoft.AspNetCore.Hosting.Server;
using Microsoft.AspNetCore.Hosting.Server.Features;
using Microsoft.EntityFrameworkCore;
using ResponseLedger.Ledger;
using ResponseLedger.Server.Demo;
using ResponseLedger.Server.People;
using ResponseLedger.Store;
using ResponseLedger.Store.Acts;
using ResponseLedger.Store.Judging;
using ResponseLedger.Store.Setup;

namespace ResponseLedger.Server.Start;

/// <summary>What happens between listening and being ready, in the order of the contract. A failure stops the server with exit code 1.</summary>
internal sealed class Opening(
    StoreAddress store,
    StartSettings settings,
    Readiness readiness,
    IServiceProvider services,
    IHostApplicationLifetime lifetime,
    ILoggerFactory loggers) : BackgroundService
{
    private readonly ILogger logger = loggers.CreateLogger<Opening>();

    protected override async Task ExecuteAsync(CancellationToken stoppingToken)
    {
        try
        {
            await Listening(stoppingToken);
            readiness.Await("migrations");
            await StoreMigrator.MigrateAsync(store.OwnerConnectionString, store.ServerRoleName, loggers.CreateLogger("ResponseLedger.Store"), stoppingToken);
            readiness.TablesStand = true;

            IReadOnlyDictionary<string, string> demoPasswords = new Dictionary<string, string>();
            readiness.Await("people");
            await services.GetRequiredService<FirstPeople>().EnsureAsync(settings, stoppingToken);

            readiness.Await("bases of the engine's version");
            await EnsureBasesAsync(stoppingToken);

            if (settings.Demo)
            {
                readiness.Await("the demo lab");
                demoPasswords = await DemoLab.RunAsync(services, stoppingToken);
            }

            readiness.Done();
            await TellAsync(demoPasswords);
        }
        catch (OperationCanceledException) when (stoppingToken.IsCancellationRequested)
        {
            // Stopped while starting: nothing is half done, for every step is an act of its own.
        }
        catch (Exception failure)
        {
            if (StartFailure.Tell(failure) is { } message)
                await Console.Error.WriteLineAsync(message);
            else
                logger.LogCritical(failure, "The start failed.");
            Environment.ExitCode = 1;
            lifetime.StopApplication();
        }
    }

    // To the console and not through the log: passwords stay out of logs, and people look here for where to go.
    private async Task TellAsync(IReadOnlyDictionary<string, string> demoPasswords)
    {
        var addresses = services.GetRequiredService<IServer>().Features.Get<IServerAddressesFeature>()?.Addresses ?? [];
        await Console.Out.WriteLineAsync($"ResponseLedger is ready: {string.Join(" ", addresses)}");
        if (!settings.Demo)
            return;

        await Console.Out.WriteLineAsync("This is the invented demo lab, in a database of its own. Sign in as one of:");
        foreach (var (email, password) in demoPasswords.OrderBy(pair => pair.Key, StringComparer.Ordinal))
            await Console.Out.WriteLineAsync($"  {email,-24} {password}");
    }

    private async Task Listening(CancellationToken stoppingToken)
    {
        var started = new TaskCompletionSource(TaskCreationOptions.RunContinuationsAsynchronously);
        await using var onStarted = lifetime.ApplicationStarted.Register(started.SetResult);
        await started.Task.WaitAsync(stoppingToken);
    }

    // A newer engine judges open lots anew: each condition with a released mask gets its basis before anything asks for it.
    private async Task EnsureBasesAsync(CancellationToken cancellationToken)
    {
        await using var db = await services.GetRequiredService<IDbContextFactory<ResponseLedgerContext>>().CreateDbContextAsync(cancellationToken);
        var without = await db.MaskRevisions
            .Where(m => !db.Bases.Any(b => b.ConditionId == m.ConditionId && b.EngineVersion == Records.Verdicts.Judge.EngineVersion))
            .Select(m => m.ConditionId)
            .Distinct()
            .ToListAsync(cancellationToken);
        if (without.Count == 0)
            return;

        await services.GetRequiredService<ActRunner>().RunAsync(
            Actor.Server,
            async (act, ct) =>
            {
                foreach (var condition in without)
                    await CurrentBases.EnsureAsync(act, condition, ct);
                act.Record("verdicts.reevaluated", [], new() { ["reason"] = "newEngine", ["engine"] = Records.Verdicts.Judge.EngineVersion, ["conditions"] = without.Count });
                return without.Count;
            },
            cancellationToken);
    }
}

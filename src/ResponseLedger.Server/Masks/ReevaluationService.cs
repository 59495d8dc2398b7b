using ResponseLedger.Server.Start;
using ResponseLedger.Store.Reevaluation;

namespace ResponseLedger.Server.Masks;

/// <summary>What is left to evaluate after a change.</summary>
/// <param name="Pending">Runs of open lots that still wait for their verdict on the basis in force.</param>
internal sealed record ReevaluationState(int Pending);

/// <summary>Evaluates again after a release or a change of the golden run: for a moment at once, the rest in the background.</summary>
internal sealed class ReevaluationAfterChange(Reevaluator reevaluator, ReevaluationService background)
{
    /// <summary>The longest that a request waits for verdicts.</summary>
    public static readonly TimeSpan LongestWait = TimeSpan.FromSeconds(2);

    public async Task<ReevaluationState> RunAsync(Guid conditionId, CancellationToken cancellationToken)
    {
        var pending = await reevaluator.SweepAsync(conditionId, LongestWait, cancellationToken);
        if (pending > 0)
            background.Wake();
        return new ReevaluationState(pending);
    }
}

/// <summary>
/// Looks for stale verdicts at the start, when woken, and every few seconds: whatever interrupted a re-evaluation, and whatever
/// made verdicts stale (a lot reopened, a run reassigned, an upload that met a release), it goes on by itself.
/// </summary>
internal sealed class ReevaluationService(Reevaluator reevaluator, Readiness readiness, TimeProvider time, ILogger<ReevaluationService> log) : BackgroundService
{
    /// <summary>The longest time between two looks.</summary>
    public static readonly TimeSpan Interval = TimeSpan.FromSeconds(15);

    // How long between two looks at a start that is not done yet; there may be no tables before.
    private static readonly TimeSpan StartInterval = TimeSpan.FromMilliseconds(250);

    private readonly SemaphoreSlim wake = new(0, 1);

    /// <summary>Told when verdicts may have become stale; the next look comes at once.</summary>
    public void Wake()
    {
        try
        {
            wake.Release();
        }
        catch (SemaphoreFullException)
        {
            // Woken already; one look finds everything.
        }
    }

    protected override async Task ExecuteAsync(CancellationToken stoppingToken)
    {
        while (!stoppingToken.IsCancellationRequested)
        {
            if (readiness.IsReady)
                await LookAsync(stoppingToken);
            await WaitAsync(readiness.IsReady ? Interval : StartInterval, stoppingToken);
        }
    }

    public override void Dispose()
    {
        wake.Dispose();
        base.Dispose();
    }

    private async Task LookAsync(CancellationToken stoppingToken)
    {
        try
        {
            await reevaluator.SweepAllAsync(stoppingToken);
        }
        catch (OperationCanceledException) when (stoppingToken.IsCancellationRequested)
        {
            // The server stops; what is stale is found again at the next start.
        }
        catch (Exception exception)
        {
            // The store may be away for a while; the next look tries again, and until then a stale lot cannot be decided.
            log.LogError(exception, "Runs could not be evaluated again; the next try comes in {Interval}.", Interval);
        }
    }

    private async Task WaitAsync(TimeSpan longest, CancellationToken stoppingToken)
    {
        using var either = CancellationTokenSource.CreateLinkedTokenSource(stoppingToken);
        var woken = wake.WaitAsync(either.Token);
        var slept = Task.Delay(longest, time, either.Token);
        await Task.WhenAny(woken, slept);
        await either.CancelAsync();
        await Task.WhenAll(woken, slept).ConfigureAwait(ConfigureAwaitOptions.SuppressThrowing);
    }
}

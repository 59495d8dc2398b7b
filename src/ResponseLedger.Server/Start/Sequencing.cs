using ResponseLedger.Store.Acts;

namespace ResponseLedger.Server.Start;

/// <summary>Gives ledger entries their positions while the server runs.</summary>
internal sealed class Sequencing(LedgerSequencer sequencer, Readiness readiness, TimeProvider time, ILogger<Sequencing> logger) : BackgroundService
{
    private static readonly TimeSpan AfterFailure = TimeSpan.FromSeconds(2);

    protected override async Task ExecuteAsync(CancellationToken stoppingToken)
    {
        while (!stoppingToken.IsCancellationRequested)
        {
            try
            {
                await sequencer.WaitAsync(stoppingToken);
                if (readiness.TablesStand)
                    await sequencer.GiveAsync(stoppingToken);
            }
            catch (OperationCanceledException) when (stoppingToken.IsCancellationRequested)
            {
                return;
            }
            catch (Exception failure)
            {
                logger.LogError(failure, "Ledger entries wait for their positions; trying again.");
                await Task.Delay(AfterFailure, time, stoppingToken).ConfigureAwait(ConfigureAwaitOptions.SuppressThrowing);
            }
        }
    }
}

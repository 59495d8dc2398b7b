using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Engine.Tests.Sweeps;

public sealed class SharingTests
{
    [Fact]
    public void Threads_that_ask_a_fresh_sweep_at_once_get_the_one_set_of_curves()
    {
        var f = Measuring.LogGrid(1, 1e6, 20_000);
        var re = Array.ConvertAll(f, x => 1 / (1 + x));
        for (int round = 0; round < 20; round++)
        {
            var run = Sweep.Create(SweepForm.RealImaginary, f, re, Array.ConvertAll(re, x => -x));
            var addresses = new (bool Level, bool Phase, bool Delay)[8];
            using var barrier = new Barrier(8);
            Parallel.For(0, 8, new ParallelOptions { MaxDegreeOfParallelism = 8 }, i =>
            {
                barrier.SignalAndWait(TimeSpan.FromMilliseconds(200));
                var level = run.GainDb;
                var phase = run.PhaseDeg;
                var delay = run.DelaySeconds;
                addresses[i] = (level == run.GainDb, phase == run.PhaseDeg, delay == run.DelaySeconds);
            });
            // Spans are equal when they are the same memory: every ask gave the same array.
            Assert.All(addresses, a => Assert.Equal((true, true, true), a));
        }
    }
}

namespace ResponseLedger.Server.Tests.MainJob;

/// <summary>What the server has acknowledged survives kill -9 of server and database at any moment; what it has not can be sent again.</summary>
public sealed class KillTests(ITestOutputHelper output)
{
    private const int Benches = 4;
    private const int LotsARound = 8;
    private const int FilesBeforeTheKill = 12;
    private const int DecisionsBeforeTheKill = 2;

    private static readonly Victim[] Rounds = [Victim.ServerAndDatabase, Victim.Server, Victim.Database, Victim.Postmaster, Victim.ServerAndDatabase];

    [Fact]
    public async Task Nothing_acknowledged_is_lost_and_nothing_is_half_written_whatever_is_killed()
    {
        Assert.SkipUnless(OperatingSystem.IsLinux(), "needs /proc");
        await using var server = new ServerProcess();
        await server.StartAsync();
        using var lab = new KilledLab(server);
        await lab.PrepareAsync();
        foreach (var victim in Rounds)
        {
            await lab.OpenLotsAsync(LotsARound);
            await KillAtWorkAsync(server, lab, victim);
            await StoreLaws.HoldAsync(server);
            await lab.EverythingAcknowledgedIsThereAsync();
            await lab.EverythingCanBeSentAgainAsync();
            await lab.EveryLotIsDecidedOrOpenAsync();
            await StoreLaws.HoldAsync(server);
        }
    }

    private async Task KillAtWorkAsync(ServerProcess server, KilledLab lab, Victim victim)
    {
        using var stop = new CancellationTokenSource();
        var (files, decisions) = (lab.AcknowledgedFiles + FilesBeforeTheKill, lab.AcknowledgedDecisions + DecisionsBeforeTheKill);
        Task[] work =
        [
            .. Enumerable.Range(0, Benches).Select(_ => lab.SendUntilAsync(stop.Token)),
            .. Enumerable.Range(0, 2).Select(half => lab.SignUntilAsync(lab.LotsToSign(half), stop.Token)),
        ];
        while (lab.AcknowledgedFiles < files || lab.AcknowledgedDecisions < decisions)
        {
            Assert.False(work.All(w => w.IsCompleted), $"Nobody works any more.\n{string.Join('\n', lab.OtherAnswers)}\n{server.Said}");
            await Task.Delay(5);
        }

        var (postmaster, since) = (server.PostmasterId, TimeProvider.System.GetTimestamp());
        await server.KillAsync(victim);
        await stop.CancelAsync();
        if (!server.IsAlive)
            await server.StartAsync();
        await server.ReadyAsync();
        var back = TimeProvider.System.GetElapsedTime(since);
        await Task.WhenAll(work);
        Assert.NotEqual(postmaster, server.PostmasterId);
        output.WriteLine($"{victim}: ready again after {back.TotalSeconds:F1} s; all answered after {TimeProvider.System.GetElapsedTime(since).TotalSeconds:F1} s; {lab.AcknowledgedFiles} files");
    }
}

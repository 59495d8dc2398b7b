namespace ResponseLedger.Server.Tests.MainJob;

/// <summary>What the server has acknowledged survives kill -9 of server and database at any moment; what it has not can be sent again.</summary>
public sealed class KillTests(ITestOutputHelper output)
{
    private const int Benches = 4;
    private const int Signers = 2;
    private const int LotsARound = 6;
    private const int FilesBeforeTheKill = 10;
    private const int DecisionsBeforeTheKill = 2;

    private static readonly Victim[] Rounds = [Victim.ServerAndDatabase, Victim.Server, Victim.Database, Victim.Postmaster];

    [Fact]
    public async Task Nothing_acknowledged_is_lost_and_nothing_is_half_written_whatever_is_killed()
    {
        Assert.SkipUnless(OperatingSystem.IsLinux(), "needs /proc");
        await using var server = new ServerProcess();
        await server.StartAsync();
        using var lab = await KilledLab.PrepareAsync(server);
        var all = new List<FilesInFlight>();
        foreach (var victim in Rounds)
        {
            var files = await FilesInFlight.OpenAsync(lab);
            var lots = await LotsInFlight.OpenAsync(lab, LotsARound);
            await KillAtWorkAsync(server, files, lots, victim);

            await StoreLaws.HoldAsync(server);
            await files.AreThereAsync();
            await files.CanBeSentAgainAsync();
            await lots.AreDecidedOrOpenAsync();
            all.Add(files);
        }

        await StoreLaws.HoldAsync(server);
        foreach (var files in all)
            await files.AreThereAsync();
    }

    private async Task KillAtWorkAsync(ServerProcess server, FilesInFlight files, LotsInFlight lots, Victim victim)
    {
        using var stop = new CancellationTokenSource();
        Task[] work =
        [
            .. Enumerable.Range(0, Benches).Select(_ => files.SendAsync(stop.Token)),
            .. Enumerable.Range(0, Signers).Select(signer => lots.SignAsync(signer, Signers, stop.Token)),
        ];
        while (files.Acknowledged < FilesBeforeTheKill || lots.Acknowledged < DecisionsBeforeTheKill)
        {
            if (work.FirstOrDefault(w => w.IsFaulted) is { } failed)
                await failed;
            await Task.Delay(5);
        }

        var (postmaster, since) = (server.PostmasterId, TimeProvider.System.GetTimestamp());
        await server.KillAsync(victim);
        await stop.CancelAsync();
        if (!server.IsAlive)
            await server.StartAsync();
        await Task.WhenAll(work);
        var answered = TimeProvider.System.GetElapsedTime(since);
        await server.ReadyAsync();
        Assert.NotEqual(postmaster, server.PostmasterId);
        output.WriteLine($"{victim}: ready again within {TimeProvider.System.GetElapsedTime(since).TotalSeconds:F1} s, all answered within {answered.TotalSeconds:F1} s; {files.Acknowledged} files and {lots.Acknowledged} decisions were acknowledged");
    }
}

using System.Net;
using System.Net.Sockets;
using Npgsql;

namespace ResponseLedger.Server.Tests.MainJob;

/// <summary>A line between server and database that a test cuts and mends: bytes go through it as they come.</summary>
internal sealed class CutLine : IAsyncDisposable
{
    private readonly string host;
    private readonly int port;
    private readonly TcpListener listener = new(IPAddress.Loopback, 0);
    private readonly CancellationTokenSource over = new();
    private readonly Task accepting;
    private CancellationTokenSource cut = new();
    private volatile bool isCut;

    /// <summary>Lays a line to the database of a connection string.</summary>
    public CutLine(string connectionString)
    {
        var target = new NpgsqlConnectionStringBuilder(connectionString);
        (host, port) = (target.Host!, target.Port);
        listener.Start();
        (target.Host, target.Port) = ("127.0.0.1", ((IPEndPoint)listener.LocalEndpoint).Port);
        ConnectionString = target.ConnectionString;
        accepting = AcceptAsync();
    }

    /// <summary>The same database through the line.</summary>
    public string ConnectionString { get; }

    /// <summary>Ends every connection, and every new one at once.</summary>
    public async Task CutAsync()
    {
        isCut = true;
        await cut.CancelAsync();
    }

    /// <summary>Lets new connections through.</summary>
    public void Mend()
    {
        cut.Dispose();
        cut = new CancellationTokenSource();
        isCut = false;
    }

    public async ValueTask DisposeAsync()
    {
        await over.CancelAsync();
        await CutAsync();
        await accepting;
        listener.Dispose();
        cut.Dispose();
        over.Dispose();
    }

    private async Task AcceptAsync()
    {
        var lines = new List<Task>();
        try
        {
            while (true)
            {
                var near = await listener.AcceptTcpClientAsync(over.Token);
                if (isCut)
                    near.Dispose();
                else
                    lines.Add(CarryAsync(near, cut.Token));
            }
        }
        catch (OperationCanceledException)
        {
            await Task.WhenAll(lines);
        }
    }

    private async Task CarryAsync(TcpClient near, CancellationToken ends)
    {
        using var far = new TcpClient();
        using (near)
        {
            try
            {
                await far.ConnectAsync(host, port, ends);
                await Task.WhenAny(near.GetStream().CopyToAsync(far.GetStream(), ends), far.GetStream().CopyToAsync(near.GetStream(), ends));
            }
            catch (Exception broken) when (broken is OperationCanceledException or IOException or SocketException)
            {
                // One of the ends is gone; the other goes with it.
            }
        }
    }
}

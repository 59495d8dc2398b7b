using System.Net;
using Microsoft.AspNetCore.Builder;
using Microsoft.AspNetCore.Hosting.Server;
using Microsoft.AspNetCore.Hosting.Server.Features;
using Microsoft.Extensions.DependencyInjection;
using Microsoft.Extensions.Logging;

namespace ResponseLedger.Server.Tests;

/// <summary>The real server on real Kestrel, on a free port, in this process; settings are given like a command line's.</summary>
public sealed class RunningServer : IAsyncDisposable
{
    private readonly WebApplication app;
    private readonly IAsyncDisposable house;

    private RunningServer(WebApplication app, IAsyncDisposable house, Uri address)
    {
        this.app = app;
        this.house = house;
        Address = address;
    }

    /// <summary>Where it listens.</summary>
    public Uri Address { get; }

    /// <summary>Its services.</summary>
    public IServiceProvider Services => app.Services;

    /// <summary>Starts it; it listens, and may not be ready yet.</summary>
    public static async Task<RunningServer> StartAsync(IReadOnlyDictionary<string, string?> settings, Action<WebApplicationBuilder>? adjust = null)
    {
        var builder = WebApplication.CreateBuilder(new WebApplicationOptions
        {
            ApplicationName = "ResponseLedger.Server",
            ContentRootPath = AppContext.BaseDirectory,
            EnvironmentName = "Production",
            Args = [.. settings.Where(s => s.Value is not null).Select(s => $"--{s.Key}={s.Value}")],
        });
        builder.Logging.ClearProviders().AddProvider(new FaultLog());
        adjust?.Invoke(builder);
        var house = await Start.House.OpenAsync(builder);
        var app = builder.Build();
        Start.House.Use(app);
        await app.StartAsync();
        var address = app.Services.GetRequiredService<IServer>().Features.Get<IServerAddressesFeature>()!.Addresses.First();
        return new RunningServer(app, house, new Uri(address));
    }

    /// <summary>Waits until the server is ready.</summary>
    public async Task<RunningServer> ReadyAsync()
    {
        using var client = Client();
        var since = TimeProvider.System.GetTimestamp();
        while (true)
        {
            using var response = await client.GetAsync("/health/ready");
            if (response.StatusCode == HttpStatusCode.OK)
                return this;
            if (TimeProvider.System.GetElapsedTime(since) > TimeSpan.FromSeconds(60))
                throw new InvalidOperationException($"Not ready after 60 s: {await response.Content.ReadAsStringAsync()}");
            await Task.Delay(20);
        }
    }

    /// <summary>A client without a session, with its own cookies, that follows no redirect. It carries the header that unsafe requests need.</summary>
    public HttpClient Client(bool withHeader = true)
    {
        var client = new HttpClient(new SocketsHttpHandler { AllowAutoRedirect = false, CookieContainer = new CookieContainer() }) { BaseAddress = Address };
        if (withHeader)
            client.DefaultRequestHeaders.Add("X-ResponseLedger", "1");
        return client;
    }

    public async ValueTask DisposeAsync()
    {
        await app.StopAsync();
        await app.DisposeAsync();
        await house.DisposeAsync();
    }
}

using System.IO.Compression;
using System.Net.Sockets;
using FluentValidation;
using Microsoft.AspNetCore.Http.Features;
using Microsoft.AspNetCore.ResponseCompression;
using Microsoft.Extensions.DependencyInjection.Extensions;
using ResponseLedger.Server.Benches;
using ResponseLedger.Server.Devices;
using ResponseLedger.Server.Http;
using ResponseLedger.Server.Lots;
using ResponseLedger.Server.Masks;
using ResponseLedger.Server.People;
using ResponseLedger.Server.Runs;
using ResponseLedger.Server.SignOff;
using ResponseLedger.Server.Trail;
using ResponseLedger.Store;

namespace ResponseLedger.Server.Start;

/// <summary>Puts the server together: store, people, features, in this order; holds the embedded store for as long as the server runs.</summary>
internal sealed class House : IAsyncDisposable
{
    private const string UsualAddress = "http://127.0.0.1:5080";

    private readonly OpenStore store;

    private House(OpenStore store) => this.store = store;

    /// <summary>Opens the store and registers everything. Nothing listens yet.</summary>
    /// <exception cref="StartFailure">A setting cannot stand.</exception>
    public static async Task<House> OpenAsync(WebApplicationBuilder builder)
    {
        var settings = StartSettings.From(builder.Configuration);
        var store = await OpenStore.OpenAsync(settings, builder.Configuration);
        try
        {
            Listen(builder);
            var services = builder.Services;
            services.TryAddSingleton(TimeProvider.System);
            services.AddSingleton(settings);
            services.AddSingleton(store.Address);
            services.AddSingleton<Readiness>();
            services.AddLedgerStore(store.Address.ConnectionString);

            AddHttp(services);
            PeopleServices.Add(services, builder.Configuration);
            AddFeatures(services);

            services.AddHostedService<Opening>();
            services.AddHostedService<Sequencing>();
            return new House(store);
        }
        catch
        {
            await store.DisposeAsync();
            throw;
        }
    }

    /// <summary>Lays the pipeline and maps every route.</summary>
    public static void Use(WebApplication app)
    {
        app.UseMiddleware<SecurityHeaders>();
        app.UseExceptionHandler();
        app.UseStatusCodePages(EmptyAnswers.FillAsync);
        app.UseWhen(WebFiles.AreAskedFor, files => files.UseResponseCompression());
        app.UseMiddleware<WebFiles>();
        app.UseMiddleware<ShellAddresses>();
        app.UseRouting();
        app.UseMiddleware<RequestGuard>();
        app.UseMiddleware<WaitUntilReady>();
        app.UseAuthentication();
        app.UseRateLimiter();
        app.UseAuthorization();
        app.UseMiddleware<QueryGuard>();

        app.MapHealth();
        app.MapShell();
        app.MapOpenApi("/openapi/{documentName}.json").AllowAnonymous().ExcludeFromDescription();
        var api = app.MapGroup("/api").WithReadAsDefault();
        AboutRoutes.Map(api);
        PeopleRoutes.Map(api);
        SessionRoutes.Map(api);
        TokensRoutes.Map(api);
        DevicesRoutes.Map(api);
        MasksRoutes.Map(api);
        BenchesRoutes.Map(api);
        LotsRoutes.Map(api);
        SignOffRoutes.Map(api);
        RunsRoutes.Map(api);
        TrailRoutes.Map(api);
    }

    /// <summary>Starts to listen.</summary>
    /// <exception cref="StartFailure">An address that was set cannot be listened at.</exception>
    public static async Task ListenAsync(WebApplication app)
    {
        try
        {
            await app.StartAsync();
        }
        catch (Exception failure) when (failure is SocketException or IOException)
        {
            var addresses = app.Configuration[WebHostDefaults.ServerUrlsKey] ?? UsualAddress;
            throw new StartFailure($"it cannot listen at {addresses}. {failure.Message} Set ASPNETCORE_URLS to an address of this machine that is free.", failure);
        }
    }

    /// <summary>Stops the embedded store.</summary>
    public ValueTask DisposeAsync() => store.DisposeAsync();

    private static void Listen(WebApplicationBuilder builder)
    {
        var told = new[] { WebHostDefaults.ServerUrlsKey, "HTTP_PORTS", "HTTPS_PORTS" }.Any(key => !string.IsNullOrEmpty(builder.Configuration[key]))
            || builder.Configuration.GetSection("Kestrel:Endpoints").Exists();
        if (!told)
            builder.WebHost.UseUrls(UsualAddress);
        builder.WebHost.ConfigureKestrel(kestrel =>
        {
            kestrel.AddServerHeader = false;
            kestrel.Limits.MaxRequestBodySize = RequestGuard.UsualBodyBytes;
        });
    }

    private static void AddHttp(IServiceCollection services)
    {
        services.ConfigureHttpJsonOptions(options => Json.Configure(options.SerializerOptions));
        services.Configure<RouteHandlerOptions>(options => options.ThrowOnBadRequest = true);
        services.Configure<FormOptions>(options => options.MultipartBodyLengthLimit = RequestGuard.UploadBodyBytes);
        services.AddSingleton<IProblemDetailsWriter, ProblemWriter>();
        services.AddProblemDetails();
        services.AddExceptionHandler<RefusalMapping>();
        services.AddSingleton(new WebRoot(AppContext.BaseDirectory));
        services.AddResponseCompression(WebFiles.Compress);
        services.Configure<BrotliCompressionProviderOptions>(options => options.Level = CompressionLevel.Optimal);
        services.Configure<GzipCompressionProviderOptions>(options => options.Level = CompressionLevel.Optimal);
        Description.Add(services);
        foreach (var found in AssemblyScanner.FindValidatorsInAssembly(typeof(House).Assembly, includeInternalTypes: true))
            services.AddSingleton(found.InterfaceType, found.ValidatorType);
    }

    private static void AddFeatures(IServiceCollection services)
    {
        DevicesRoutes.AddServices(services);
        MasksRoutes.AddServices(services);
        BenchesRoutes.AddServices(services);
        LotsRoutes.AddServices(services);
        SignOffRoutes.AddServices(services);
        RunsRoutes.AddServices(services);
        TrailRoutes.AddServices(services);
    }
}

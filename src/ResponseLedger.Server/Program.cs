using ResponseLedger.Server.Start;

try
{
    var builder = WebApplication.CreateBuilder(new WebApplicationOptions { Args = args, ContentRootPath = AppContext.BaseDirectory });
    await using var house = await House.OpenAsync(builder);
    var app = builder.Build();
    House.Use(app);
    await House.ListenAsync(app);
    await app.WaitForShutdownAsync();
    return Environment.ExitCode;
}
catch (Exception failure) when (StartFailure.Tell(failure) is { } message)
{
    await Console.Error.WriteLineAsync(message);
    return 1;
}

/// <summary>The entry point; public so that tests can start the server.</summary>
public partial class Program;

using ResponseLedger.Server.Start;

var builder = WebApplication.CreateBuilder(args);
await using var house = await House.OpenAsync(builder);
var app = builder.Build();
house.Use(app);
await app.RunAsync();

/// <summary>The entry point; public so that tests can start the server.</summary>
public partial class Program;

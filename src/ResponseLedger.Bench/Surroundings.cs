using System.Net;

namespace ResponseLedger.Bench;

/// <summary>All that the tool needs from outside itself.</summary>
/// <param name="Output">What became of each file, and the summary.</param>
/// <param name="Errors">Why nothing can be done, and why it takes longer.</param>
/// <param name="Variable">The environment.</param>
/// <param name="Connect">Makes the client for one call of the tool.</param>
/// <param name="Time">The clock that waits between two tries.</param>
internal sealed record Surroundings(
    TextWriter Output, TextWriter Errors, Func<string, string?> Variable, Func<HttpClient> Connect, TimeProvider Time)
{
    public static Surroundings OfThisProcess() => new(Console.Out, Console.Error, Environment.GetEnvironmentVariable, Client, TimeProvider.System);

    /// <summary>A client that follows no redirect: the token goes where it was told to go, and nowhere else.</summary>
    public static HttpClient Client() => new(new SocketsHttpHandler { AllowAutoRedirect = false, UseCookies = false, AutomaticDecompression = DecompressionMethods.None });
}

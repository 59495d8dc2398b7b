using System.Globalization;
using System.Net;
using System.Threading.RateLimiting;
using ResponseLedger.Server.Http;

namespace ResponseLedger.Server.People;

/// <summary>
/// Limits on sign-in, by address and by account, and on requests of nobody. Guessing a password is the lockout's to stop;
/// these keep the cost of hashing and of strangers in bounds. Health and signed-in requests are never limited.
/// </summary>
internal sealed class RateLimits : IDisposable
{
    private static readonly TimeSpan Window = TimeSpan.FromMinutes(1);

    private readonly PartitionedRateLimiter<string> byAccount;

    private RateLimits(int signInsByAccount)
        => byAccount = PartitionedRateLimiter.Create<string, string>(account => Fixed(account, signInsByAccount));

    public static void Add(IServiceCollection services, IConfiguration configuration)
    {
        var section = configuration.GetSection("RateLimits");
        var signInsByAddress = section.GetValue("SignInsPerMinuteByAddress", 240);
        var anonymousByAddress = section.GetValue("AnonymousPerMinuteByAddress", 1200);
        services.AddSingleton(new RateLimits(section.GetValue("SignInsPerMinuteByAccount", 120)));
        services.AddRateLimiter(options =>
        {
            options.RejectionStatusCode = StatusCodes.Status429TooManyRequests;
            options.OnRejected = (rejected, _) => new ValueTask(RejectAsync(rejected.HttpContext, rejected.Lease));
            options.GlobalLimiter = PartitionedRateLimiter.Create<HttpContext, (string Of, IPAddress? Address)>(http =>
            {
                if (http.Request.Path.StartsWithSegments("/health"))
                    return RateLimitPartition.GetNoLimiter(("health", (IPAddress?)null));

                var address = http.Connection.RemoteIpAddress;
                if (HttpMethods.IsPost(http.Request.Method) && http.Request.Path.StartsWithSegments("/api/session"))
                    return Fixed(("signIn", address), signInsByAddress);
                return http.User.Identity is { IsAuthenticated: true }
                    ? RateLimitPartition.GetNoLimiter(("person", (IPAddress?)null))
                    : Fixed(("anonymous", address), anonymousByAddress);
            });
        });
    }

    /// <summary>Whether an account may be tried once more now; whether it exists makes no difference.</summary>
    public RateLimitLease TryAccount(string normalizedEmail) => byAccount.AttemptAcquire(normalizedEmail);

    /// <summary>Answers 429 with the time to wait.</summary>
    public static Task RejectAsync(HttpContext http, RateLimitLease lease)
    {
        var wait = lease.TryGetMetadata(MetadataName.RetryAfter, out var told) ? told : Window;
        http.Response.Headers.RetryAfter = Math.Max(1, (int)Math.Ceiling(wait.TotalSeconds)).ToString(CultureInfo.InvariantCulture);
        return new Answer(429, "tooMany", "Too many requests in a short time. Wait as long as Retry-After says, then go on.").WriteAsync(http);
    }

    public void Dispose() => byAccount.Dispose();

    private static RateLimitPartition<TKey> Fixed<TKey>(TKey key, int permits)
        => RateLimitPartition.GetFixedWindowLimiter(key, _ => new FixedWindowRateLimiterOptions { PermitLimit = permits, Window = Window, QueueLimit = 0 });
}

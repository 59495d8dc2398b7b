using System.Security.Claims;
using System.Security.Cryptography;
using System.Text.Encodings.Web;
using Microsoft.AspNetCore.Authentication;
using Microsoft.EntityFrameworkCore;
using Microsoft.Extensions.Options;
using ResponseLedger.Store;

namespace ResponseLedger.Server.People;

/// <summary>Lets benches in by their tokens. The row is asked for at every request, so that a revocation holds at once.</summary>
internal sealed class TokenScheme(
    IOptionsMonitor<AuthenticationSchemeOptions> options,
    ILoggerFactory loggers,
    UrlEncoder encoder,
    ResponseLedgerContext db,
    TimeProvider time) : AuthenticationHandler<AuthenticationSchemeOptions>(options, loggers, encoder)
{
    /// <summary>The scheme's name.</summary>
    public const string Name = "benchToken";

    private const string Lead = "Bearer ";

    // Asked at every request of a bench, so the question is put together once.
    private static readonly Func<ResponseLedgerContext, Guid, CancellationToken, Task<Found?>> FindAsync = EF.CompileAsyncQuery(
        (ResponseLedgerContext db, Guid id, CancellationToken cancellationToken) => db.BenchTokens
            .AsNoTracking()
            .Where(t => t.Id == id)
            .Select(t => new Found(
                t.Name,
                t.SecretHash,
                t.Scopes,
                t.ExpiresAt,
                t.BenchId ?? db.TokenBindings.Where(b => b.TokenId == id).Select(b => (Guid?)b.BenchId).FirstOrDefault(),
                db.TokenRevocations.Any(r => r.TokenId == id)))
            .SingleOrDefault());

    protected override async Task<AuthenticateResult> HandleAuthenticateAsync()
    {
        var header = Request.Headers.Authorization.ToString();
        if (!header.StartsWith(Lead, StringComparison.OrdinalIgnoreCase))
            return AuthenticateResult.NoResult();
        if (!TokenSecret.TryRead(header.AsSpan(Lead.Length).Trim(), out var id, out var hash))
            return AuthenticateResult.Fail("This is no bench token.");

        var found = await FindAsync(db, id, Context.RequestAborted);
        if (found is null || !CryptographicOperations.FixedTimeEquals(found.SecretHash, hash))
            return AuthenticateResult.Fail("There is no such token.");
        if (found.Revoked || found.ExpiresAt <= time.GetUtcNow())
            return AuthenticateResult.Fail("The token was revoked or has expired.");

        var identity = new ClaimsIdentity(
            [
                new Claim(ClaimTypes.Name, found.Name),
                new Claim(CurrentActor.TokenClaim, id.ToString()),
                .. found.Scopes.Select(scope => new Claim(CurrentActor.ScopeClaim, scope)),
            ],
            Name);
        if (found.BenchId is { } bench)
            identity.AddClaim(new Claim(CurrentActor.BenchClaim, bench.ToString()));
        return AuthenticateResult.Success(new AuthenticationTicket(new ClaimsPrincipal(identity), Name));
    }

    private sealed record Found(string Name, byte[] SecretHash, string[] Scopes, DateTimeOffset ExpiresAt, Guid? BenchId, bool Revoked);
}

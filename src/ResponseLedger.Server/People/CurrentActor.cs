using System.Security.Claims;
using ResponseLedger.Ledger;

namespace ResponseLedger.Server.People;

/// <summary>Who sent the request, as the ledger names them.</summary>
internal static class CurrentActor
{
    /// <summary>Claim type of a bench token's id; present on bench requests only.</summary>
    public const string TokenClaim = "responseledger:token";

    /// <summary>Claim type of the bench that a token is bound to; absent while it is not bound.</summary>
    public const string BenchClaim = "responseledger:bench";

    /// <summary>Claim type of a token's scope, one claim a scope.</summary>
    public const string ScopeClaim = "responseledger:scope";

    /// <summary>The signed-in person, or the bench by its token.</summary>
    public static Actor Of(ClaimsPrincipal principal)
    {
        var name = principal.FindFirstValue(ClaimTypes.Name) ?? throw new InvalidOperationException("The route let in somebody without a name.");
        return TokenId(principal) is { } token
            ? Actor.Bench(token, name)
            : Actor.Person(Guid.Parse(principal.FindFirstValue(ClaimTypes.NameIdentifier)!), name);
    }

    /// <summary>The token's id, or null when a person is signed in.</summary>
    public static Guid? TokenId(ClaimsPrincipal principal)
        => principal.FindFirstValue(TokenClaim) is { } id ? Guid.Parse(id) : null;

    /// <summary>The bench that the token is bound to, or null.</summary>
    public static Guid? BoundBench(ClaimsPrincipal principal)
        => principal.FindFirstValue(BenchClaim) is { } id ? Guid.Parse(id) : null;

    /// <summary>Whether the person has one of these roles; a manager holds operator, engineer and quality too.</summary>
    public static bool Holds(ClaimsPrincipal principal, params ReadOnlySpan<string> roles)
    {
        foreach (var role in roles)
        {
            if (principal.IsInRole(role) || (role != Roles.Auditor && principal.IsInRole(Roles.Manager)))
                return true;
        }

        return false;
    }
}

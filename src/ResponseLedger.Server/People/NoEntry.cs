using Microsoft.AspNetCore.Authorization;
using Microsoft.AspNetCore.Authorization.Policy;
using ResponseLedger.Server.Http;

namespace ResponseLedger.Server.People;

/// <summary>Says 401 and 403 as problem details on every route; nothing is ever sent on to a sign-in page.</summary>
internal sealed class NoEntry : IAuthorizationMiddlewareResultHandler
{
    public Task HandleAsync(RequestDelegate next, HttpContext context, AuthorizationPolicy policy, PolicyAuthorizationResult authorizeResult)
    {
        if (authorizeResult.Succeeded)
            return next(context);

        // The policies are assertions, which nobody fulfils who is nobody: the framework calls that forbidden, and it is a 401.
        if (context.User.Identity is not { IsAuthenticated: true })
        {
            context.Response.Headers.WWWAuthenticate = "Bearer realm=\"ResponseLedger\"";
            return new Answer(401, "signInNeeded", "Sign in, or send a valid bench token.").WriteAsync(context);
        }

        return context.User.HasClaim(PersonClaims.MustChangePassword, "true")
            ? new Answer(403, "passwordChangeDue", "The password was given for one time. Change it with POST /api/session/password, then go on.").WriteAsync(context)
            : new Answer(403, "notAllowed", "Your roles, or the token's scopes, do not reach for this.").WriteAsync(context);
    }
}

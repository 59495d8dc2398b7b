using Microsoft.AspNetCore.Authentication.Cookies;
using Microsoft.AspNetCore.Identity;
using Microsoft.Extensions.Options;
using ResponseLedger.Store.Model;

namespace ResponseLedger.Server.People;

/// <summary>Asks the store, once an interval and before every act, whether a session's account still stands as it did when the session began. The framework's own check also ends sessions of schemes that this server does not have, and fails at it.</summary>
internal sealed class SessionStamp(IOptions<SecurityStampValidatorOptions> options, SignInManager<Person> signIn, ILoggerFactory loggers)
    : SecurityStampValidator<Person>(options, signIn, loggers)
{
    public override async Task ValidateAsync(CookieValidatePrincipalContext context)
    {
        var isDue = context.Properties.IssuedUtc is not { } issued || TimeProvider.GetUtcNow() - issued > Options.ValidationInterval;

        // Reading may lag behind for the interval; what changes something may not, or a manager who was one could make themselves one again.
        if (!isDue && HttpMethods.IsGet(context.Request.Method))
            return;

        if (await VerifySecurityStamp(context.Principal) is not { } person)
            context.RejectPrincipal();
        else if (isDue)
            await SecurityStampVerified(person, context);
    }
}

using Microsoft.AspNetCore.Authentication.Cookies;
using Microsoft.AspNetCore.Identity;
using Microsoft.Extensions.Options;
using ResponseLedger.Store.Model;

namespace ResponseLedger.Server.People;

/// <summary>Asks the store, once an interval, whether a session's account still stands as it did when the session began. The framework's own check also ends sessions of schemes that this server does not have, and fails at it.</summary>
internal sealed class SessionStamp(IOptions<SecurityStampValidatorOptions> options, SignInManager<Person> signIn, ILoggerFactory loggers)
    : SecurityStampValidator<Person>(options, signIn, loggers)
{
    public override async Task ValidateAsync(CookieValidatePrincipalContext context)
    {
        if (context.Properties.IssuedUtc is { } issued && TimeProvider.GetUtcNow() - issued <= Options.ValidationInterval)
            return;

        if (await VerifySecurityStamp(context.Principal) is { } person)
            await SecurityStampVerified(person, context);
        else
            context.RejectPrincipal();
    }
}

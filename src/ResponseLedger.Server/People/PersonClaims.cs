using System.Security.Claims;
using Microsoft.AspNetCore.Identity;
using Microsoft.Extensions.Options;
using ResponseLedger.Store.Model;

namespace ResponseLedger.Server.People;

/// <summary>What a session says of its person: the printed name, as it stands beside signatures, the e-mail, the granted roles, and whether the password is due to be changed.</summary>
internal sealed class PersonClaims(UserManager<Person> people, RoleManager<IdentityRole<Guid>> roles, IOptions<IdentityOptions> options)
    : UserClaimsPrincipalFactory<Person, IdentityRole<Guid>>(people, roles, options)
{
    /// <summary>Claim type: "true" while the password must be changed before anything else.</summary>
    public const string MustChangePassword = "responseledger:mustChangePassword";

    protected override async Task<ClaimsIdentity> GenerateClaimsAsync(Person user)
    {
        var identity = await base.GenerateClaimsAsync(user);
        foreach (var name in identity.FindAll(ClaimTypes.Name).ToArray())
            identity.RemoveClaim(name);
        identity.AddClaim(new Claim(ClaimTypes.Name, user.DisplayName));
        if (user.MustChangePassword)
            identity.AddClaim(new Claim(MustChangePassword, "true"));
        return identity;
    }
}

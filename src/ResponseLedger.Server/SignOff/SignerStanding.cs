using System.Security.Claims;
using Microsoft.EntityFrameworkCore;
using ResponseLedger.Server.Http;
using ResponseLedger.Server.People;
using ResponseLedger.Store;
using ResponseLedger.Store.Acts;

namespace ResponseLedger.Server.SignOff;

/// <summary>
/// Asks the store what a signer may do now. A session's claims are up to a minute old, and a signature must not rest on a role
/// that was taken away, or come from an account that was disabled, while the request was under way.
/// </summary>
internal static class SignerStanding
{
    /// <summary>Goes on if the acting person can act now and holds one of the roles; a manager holds all of them.</summary>
    /// <exception cref="RefusedException">403.</exception>
    public static async Task RequireAsync(Act act, string[] roles, CancellationToken cancellationToken)
        => Require(await RolesNowAsync(act.Db, act.PersonId, cancellationToken), roles);

    /// <inheritdoc cref="RequireAsync(Act, string[], CancellationToken)"/>
    public static async Task RequireAsync(ResponseLedgerContext db, ClaimsPrincipal user, string[] roles, CancellationToken cancellationToken)
        => Require(await RolesNowAsync(db, CurrentActor.Of(user).Id, cancellationToken), roles);

    private static void Require(IReadOnlyList<string> now, string[] roles)
    {
        if (!now.Contains(Roles.Manager) && !now.Intersect(roles).Any())
            throw new RefusedException(new NotAllowed(now.Count == 0
                ? "Your account is disabled or holds no role any more."
                : $"This needs the role {string.Join(" or ", roles)}, which your account does not hold now."));
    }

    private static async Task<IReadOnlyList<string>> RolesNowAsync(ResponseLedgerContext db, Guid? personId, CancellationToken cancellationToken)
        => await (
            from person in db.Users
            where person.Id == personId && (person.LockoutEnd == null || person.LockoutEnd < Accounts.Disabled)
            join granted in db.UserRoles on person.Id equals granted.UserId
            join role in db.Roles on granted.RoleId equals role.Id
            select role.Name!).ToListAsync(cancellationToken);
}

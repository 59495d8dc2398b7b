using System.Security.Claims;
using ResponseLedger.Server.Http;

namespace ResponseLedger.Server.People;

/// <summary>Asks a signed-in person for the password again, as a signature needs it (21 CFR 11.200).</summary>
internal sealed class PasswordAsked(PasswordCheck check)
{
    /// <summary>Goes on if the password is the signed-in person's; a wrong one counts against the account.</summary>
    /// <exception cref="RefusedException">422 with <c>errors.password</c>: it is wrong, or the account is locked for a while.</exception>
    public async Task CheckAsync(ClaimsPrincipal principal, string? password, CancellationToken cancellationToken = default)
    {
        if (CurrentActor.TokenId(principal) is not null)
            throw new RefusedException(new NotAllowed("A bench token does not sign."));
        if (string.IsNullOrEmpty(password))
            throw new RefusedException(new FieldRefused("password", "Give your password again."));

        var person = Guid.Parse(principal.FindFirstValue(ClaimTypes.NameIdentifier)!);
        var finding = await check.CheckAsync(person, password, cancellationToken);
        if (finding == PasswordFinding.Wrong)
            throw new RefusedException(new FieldRefused("password", $"This is not your password. After {PasswordCheck.FailuresToLock} wrong ones the account is locked for {PasswordCheck.LockLength.TotalMinutes:0} minutes."));
        if (finding == PasswordFinding.Locked)
            throw new RefusedException(new FieldRefused("password", $"The account is locked after {PasswordCheck.FailuresToLock} wrong passwords. Wait {PasswordCheck.LockLength.TotalMinutes:0} minutes."));
    }
}

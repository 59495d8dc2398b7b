using System.Security.Claims;
using System.Text.Json.Nodes;
using FluentValidation;
using Microsoft.AspNetCore.Authentication;
using Microsoft.AspNetCore.Http.HttpResults;
using Microsoft.AspNetCore.Identity;
using Microsoft.EntityFrameworkCore;
using ResponseLedger.Server.Devices;
using ResponseLedger.Server.Http;
using ResponseLedger.Store;
using ResponseLedger.Store.Acts;
using ResponseLedger.Store.Model;

namespace ResponseLedger.Server.People;

/// <summary>The answer to every sign-in that fails: the same whether the e-mail, the password or the lockout was the cause.</summary>
internal sealed record SignInRefused() : Refusal(
    401, "signInRefused", $"E-mail or password is wrong, or the account takes no sign-in now: it is locked for {PasswordCheck.LockLength.TotalMinutes:0} minutes after {PasswordCheck.FailuresToLock} wrong passwords.");

/// <summary>Signing in and out, and one's own password.</summary>
internal static class SessionRoutes
{
    public static void Map(IEndpointRouteBuilder api)
    {
        var session = api.MapGroup("/session").WithTags("Session");
        session.MapPost("", SignInAsync).AllowAnonymous().Validated<SignIn>()
            .WithName("SignIn").WithSummary("Signs in; the answer sets the session cookie.")
            .ProducesProblem(StatusCodes.Status401Unauthorized);
        session.MapGet("", Show).RequireAuthorization(Policies.Person)
            .WithName("ShowSession").WithSummary("Who is signed in. The roles are those granted and, for a manager, those held with it.");
        session.MapDelete("", SignOutAsync).RequireAuthorization(Policies.Person)
            .WithName("SignOut").WithSummary("Signs out; the cookie is worth nothing afterwards.");
        session.MapPost("/password", ChangePasswordAsync).RequireAuthorization(Policies.Person).Validated<PasswordChange>()
            .WithName("ChangePassword").WithSummary("Changes one's own password; other sessions of the account end within a minute.");
    }

    internal sealed record SignIn(string? Email, string? Password);

    internal sealed record PasswordChange(string? Current, string? New);

    /// <summary>Who is signed in.</summary>
    internal sealed record Session(string Email, string Name, IReadOnlyList<string> Roles, bool MustChangePassword);

    internal sealed class SignInValidator : AbstractValidator<SignIn>
    {
        public SignInValidator()
        {
            RuleFor(r => r.Email).IsName(Accounts.LongestEmail);
            RuleFor(r => r.Password).NotEmpty().WithMessage("Give the password.");
        }
    }

    internal sealed class PasswordChangeValidator : AbstractValidator<PasswordChange>
    {
        public PasswordChangeValidator()
        {
            RuleFor(r => r.Current).NotEmpty().WithMessage("Give the present password.");
            RuleFor(r => r.New).NotEmpty().WithMessage("Give the new password.")
                .NotEqual(r => r.Current).WithMessage("The new password is the old one.");
        }
    }

    private static async Task<IResult> SignInAsync(
        SignIn request,
        HttpContext http,
        ResponseLedgerContext db,
        Accounts accounts,
        PasswordCheck check,
        RateLimits limits,
        SignInManager<Person> signIn,
        TimeProvider time,
        CancellationToken cancellationToken)
    {
        var email = accounts.Normalized(request.Email!.Trim());
        using var lease = limits.TryAccount(email);
        if (!lease.IsAcquired)
        {
            await RateLimits.RejectAsync(http, lease);
            return Results.Empty;
        }

        var person = await db.Users.AsNoTracking().SingleOrDefaultAsync(p => p.NormalizedUserName == email, cancellationToken);

        // A longer one is nobody's; it is not worth hashing megabytes.
        var password = request.Password!.Length <= PasswordRules.LongestLength ? request.Password : "";
        if (await check.CheckAsync(person?.Id, password, cancellationToken) != PasswordFinding.Right)
            throw new RefusedException(new SignInRefused());

        await OpenAsync(http, signIn, person!, time);
        return TypedResults.NoContent();
    }

    private static Ok<Session> Show(ClaimsPrincipal user)
        => TypedResults.Ok(new Session(
            user.FindFirstValue(ClaimTypes.Email)!,
            user.FindFirstValue(ClaimTypes.Name)!,
            [.. Roles.All.Where(role => CurrentActor.Holds(user, role)).Order(StringComparer.Ordinal)],
            user.HasClaim(PersonClaims.MustChangePassword, "true")));

    private static async Task<NoContent> SignOutAsync(HttpContext http, EndedSessions sessions)
    {
        await EndAsync(http, sessions);
        await http.SignOutAsync(IdentityConstants.ApplicationScheme);
        return TypedResults.NoContent();
    }

    private static async Task<NoContent> ChangePasswordAsync(
        PasswordChange request,
        HttpContext http,
        ClaimsPrincipal user,
        PasswordCheck check,
        Accounts accounts,
        ActRunner acts,
        EndedSessions sessions,
        SignInManager<Person> signIn,
        TimeProvider time,
        CancellationToken cancellationToken)
    {
        var id = Guid.Parse(user.FindFirstValue(ClaimTypes.NameIdentifier)!);
        if (await check.CheckAsync(id, request.Current!, cancellationToken) != PasswordFinding.Right)
            throw new RefusedException(new FieldRefused("current", "This is not your present password, or the account is locked for some minutes after wrong ones."));

        var person = await acts.RunAsync(CurrentActor.Of(user), async (act, ct) =>
        {
            var changed = await act.Db.Users.SingleAsync(p => p.Id == id, ct);
            accounts.Require(request.New, changed.Email!, changed.DisplayName, "new");
            accounts.SetPassword(changed, request.New!, mustChange: false);
            act.Record("person.changed", new JsonObject { ["personId"] = id.ToString() }, new JsonObject { ["password"] = "changed" });
            return changed;
        }, cancellationToken);

        await EndAsync(http, sessions);
        await OpenAsync(http, signIn, person, time);
        return TypedResults.NoContent();
    }

    private static async Task OpenAsync(HttpContext http, SignInManager<Person> signIn, Person person, TimeProvider time)
    {
        var properties = new AuthenticationProperties { Items = { [EndedSessions.IdProperty] = Guid.CreateVersion7(time.GetUtcNow()).ToString() } };
        await http.SignInAsync(IdentityConstants.ApplicationScheme, await signIn.CreateUserPrincipalAsync(person), properties);
    }

    private static async Task EndAsync(HttpContext http, EndedSessions sessions)
    {
        var ticket = await http.AuthenticateAsync(IdentityConstants.ApplicationScheme);
        if (ticket.Properties?.Items.TryGetValue(EndedSessions.IdProperty, out var id) == true && id is not null)
            sessions.End(id);
    }
}

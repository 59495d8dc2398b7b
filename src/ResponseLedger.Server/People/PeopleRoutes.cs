using System.Security.Claims;
using System.Text.Json.Nodes;
using FluentValidation;
using Microsoft.AspNetCore.Http.HttpResults;
using Microsoft.EntityFrameworkCore;
using Npgsql;
using ResponseLedger.Server.Devices;
using ResponseLedger.Server.Http;
using ResponseLedger.Store;
using ResponseLedger.Store.Acts;
using ResponseLedger.Store.Model;

namespace ResponseLedger.Server.People;

/// <summary>People and their roles, for managers; auditors see them.</summary>
internal static class PeopleRoutes
{
    public static void Map(IEndpointRouteBuilder api)
    {
        var people = api.MapGroup("/people").WithTags("People");
        people.MapGet("", ListAsync).RequireAuthorization(Policies.Oversee)
            .WithName("ListPeople").WithSummary("Everybody who has an account, in the order in which they were made.")
            .ProducesProblem(StatusCodes.Status422UnprocessableEntity);
        people.MapPost("", CreateAsync).Validated<NewPerson>().RequireAuthorization(Policies.Manage)
            .WithName("CreatePerson").WithSummary("Makes an account. Without a password a one-time password is made and told in this answer alone.")
            .ProducesProblem(StatusCodes.Status409Conflict);
        people.MapPatch("/{id:guid}", ChangeAsync).Validated<PersonChange>().RequireAuthorization(Policies.Manage)
            .WithName("ChangePerson").WithSummary("Changes name or roles, disables, or resets the password to a one-time password; sessions of the person follow within a minute.")
            .ProducesProblem(StatusCodes.Status404NotFound).ProducesProblem(StatusCodes.Status409Conflict);
    }

    internal sealed record NewPerson(string? Email, string? Name, string? Password, IReadOnlyList<string>? Roles);

    internal sealed record PersonChange(string? Name, IReadOnlyList<string>? Roles, bool? Disabled, bool? ResetPassword);

    /// <summary>A person. Roles are those granted; a manager holds operator, engineer and quality with them.</summary>
    internal sealed record PersonShown(
        Guid Id, string Email, string Name, IReadOnlyList<string> Roles, bool Disabled, bool MustChangePassword, DateTimeOffset CreatedAt)
    {
        /// <summary>Told once, by the request that made it.</summary>
        public string? OneTimePassword { get; init; }
    }

    internal sealed class NewPersonValidator : AbstractValidator<NewPerson>
    {
        public NewPersonValidator()
        {
            RuleFor(r => r.Email).IsName(Accounts.LongestEmail).EmailAddress().WithMessage("This is no e-mail address.");

            // It is printed beside signatures.
            RuleFor(r => r.Name).IsName(Accounts.LongestName);
            RuleFor(r => r.Roles).Must(AreKnown).WithMessage(KnownRoles);
        }
    }

    internal sealed class PersonChangeValidator : AbstractValidator<PersonChange>
    {
        public PersonChangeValidator()
        {
            RuleFor(r => r.Name).IsName(Accounts.LongestName).When(r => r.Name is not null);
            RuleFor(r => r.Roles).Must(AreKnown).WithMessage(KnownRoles);
        }
    }

    private static string KnownRoles => $"Roles are {string.Join(", ", Roles.All)}.";

    private static bool AreKnown(IReadOnlyList<string>? roles) => roles is null || roles.All(Roles.All.Contains);

    private static async Task<Page<PersonShown>> ListAsync(ResponseLedgerContext db, string? cursor, int? limit, CancellationToken cancellationToken)
    {
        var take = Paging.Limit(limit);
        var after = Paging.Key<string>(cursor) is { } key ? Guid.TryParse(key, out var id) ? id : throw new RefusedException(new FieldRefused("cursor", "This cursor was not given by this list.")) : Guid.Empty;
        var rows = await Shown(db, db.Users.AsNoTracking().Where(p => p.Id > after).OrderBy(p => p.Id).Take(take + 1)).ToListAsync(cancellationToken);
        return Paging.Cut(rows, take, row => row, row => row.Id.ToString());
    }

    private static async Task<Created<PersonShown>> CreateAsync(
        NewPerson request, ClaimsPrincipal user, ActRunner acts, Accounts accounts, CancellationToken cancellationToken)
    {
        var oneTime = string.IsNullOrEmpty(request.Password) ? Accounts.OneTimePassword() : null;
        string[] roles = [.. (request.Roles ?? []).Distinct().Order(StringComparer.Ordinal)];
        Person person;
        try
        {
            person = await acts.RunAsync(
                CurrentActor.Of(user),
                (act, ct) => accounts.CreateAsync(act, request.Email!.Trim(), request.Name!.Trim(), oneTime ?? request.Password!, oneTime is not null, roles, ct),
                cancellationToken);
        }
        catch (DbUpdateException race) when (race.InnerException is PostgresException { SqlState: PostgresErrorCodes.UniqueViolation })
        {
            throw new RefusedException(new EmailTaken());
        }

        var shown = new PersonShown(person.Id, person.Email!, person.DisplayName, roles, false, person.MustChangePassword, person.CreatedAt) { OneTimePassword = oneTime };
        return TypedResults.Created($"/api/people/{person.Id}", shown);
    }

    private static async Task<Ok<PersonShown>> ChangeAsync(
        Guid id, PersonChange request, ClaimsPrincipal user, ActRunner acts, Accounts accounts, CancellationToken cancellationToken)
    {
        var oneTime = request.ResetPassword == true ? Accounts.OneTimePassword() : null;
        try
        {
            var shown = await acts.RunAsync(CurrentActor.Of(user), (act, ct) => ApplyAsync(act, id, request, oneTime, accounts, ct), cancellationToken);
            return TypedResults.Ok(shown with { OneTimePassword = oneTime });
        }
        catch (NothingToChange unchanged)
        {
            // An entry that tells of no change would be noise in the ledger.
            return TypedResults.Ok(unchanged.Person);
        }
    }

    private static async Task<PersonShown> ApplyAsync(
        Act act, Guid id, PersonChange request, string? oneTime, Accounts accounts, CancellationToken ct)
    {
        await Accounts.TakeTurnAsync(act, ct);
        var person = await act.Db.Users.SingleOrDefaultAsync(p => p.Id == id, ct) ?? throw new RefusedException(new NothingThere("person"));
        var detail = new JsonObject();
        if (request.Name?.Trim() is { } name && name != person.DisplayName)
        {
            detail["name"] = new JsonObject { ["old"] = person.DisplayName, ["new"] = name };
            person.DisplayName = name;
        }

        if (request.Roles is { } wanted)
            await ChangeRolesAsync(act, person, [.. wanted.Distinct()], detail, ct);
        if (request.Disabled is { } disable && disable != (person.LockoutEnd == Accounts.Disabled))
        {
            detail["disabled"] = new JsonObject { ["old"] = !disable, ["new"] = disable };
            person.LockoutEnd = disable ? Accounts.Disabled : null;
            person.AccessFailedCount = 0;
            Accounts.EndSessions(person);
        }

        if (oneTime is not null)
        {
            detail["password"] = "reset";
            accounts.SetPassword(person, oneTime, mustChange: true);
        }

        if (detail.Count == 0)
            throw new NothingToChange(await Shown(act.Db, act.Db.Users.Where(p => p.Id == id)).SingleAsync(ct));
        act.Record("person.changed", new JsonObject { ["personId"] = id.ToString(), ["email"] = person.Email }, detail);
        await act.Db.SaveChangesAsync(ct);
        await Accounts.RequireManagerAsync(act.Db, ct);
        return await Shown(act.Db, act.Db.Users.Where(p => p.Id == id)).SingleAsync(ct);
    }

    private sealed class NothingToChange(PersonShown person) : Exception
    {
        public PersonShown Person { get; } = person;
    }

    private static async Task ChangeRolesAsync(Act act, Person person, string[] wanted, JsonObject detail, CancellationToken cancellationToken)
    {
        var granted = await act.Db.UserRoles.Where(r => r.UserId == person.Id)
            .Join(act.Db.Roles, r => r.RoleId, role => role.Id, (r, role) => new { Grant = r, role.Name })
            .ToListAsync(cancellationToken);
        var old = granted.Select(g => g.Name!).ToArray();
        if (old.ToHashSet().SetEquals(wanted))
            return;

        detail["roles"] = new JsonObject { ["old"] = Accounts.Words(old), ["new"] = Accounts.Words(wanted) };
        act.Db.UserRoles.RemoveRange(granted.Where(g => !wanted.Contains(g.Name)).Select(g => g.Grant));
        await Accounts.GrantAsync(act.Db, person.Id, [.. wanted.Except(old)], cancellationToken);

        // The stamp ends sessions that still carry the old roles.
        Accounts.EndSessions(person);
    }

    private static IQueryable<PersonShown> Shown(ResponseLedgerContext db, IQueryable<Person> people)
        => people.Select(p => new PersonShown(
            p.Id,
            p.Email!,
            p.DisplayName,
            db.UserRoles.Where(r => r.UserId == p.Id).Join(db.Roles, r => r.RoleId, role => role.Id, (r, role) => role.Name!).OrderBy(n => n).ToList(),
            p.LockoutEnd == Accounts.Disabled,
            p.MustChangePassword,
            p.CreatedAt));
}

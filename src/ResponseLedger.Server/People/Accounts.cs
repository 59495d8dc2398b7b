using System.Security.Cryptography;
using System.Text.Json.Nodes;
using Microsoft.AspNetCore.Identity;
using Microsoft.EntityFrameworkCore;
using ResponseLedger.Server.Http;
using ResponseLedger.Store;
using ResponseLedger.Store.Acts;
using ResponseLedger.Store.Model;

namespace ResponseLedger.Server.People;

/// <summary>Somebody has an account under this e-mail already.</summary>
internal sealed record EmailTaken() : Refusal(409, "emailTaken", "There is a person with this e-mail already.");

/// <summary>The change would leave nobody who manages people.</summary>
internal sealed record LastManager() : Refusal(409, "lastManager", "This is the last manager who can sign in. Make somebody else a manager first.");

/// <summary>What accounts are made and changed by, inside acts. Passwords and one-time passwords never enter an entry of the ledger.</summary>
internal sealed class Accounts(IPasswordHasher<Person> hasher, PasswordRules rules, ILookupNormalizer normalizer)
{
    /// <summary>The end of lockout of an account that was disabled; the wrong passwords' lockouts end within minutes.</summary>
    public static readonly DateTimeOffset Disabled = DateTimeOffset.MaxValue;

    /// <summary>Longest e-mail.</summary>
    public const int LongestEmail = 256;

    /// <summary>Longest printed name.</summary>
    public const int LongestName = 200;

    // Without i, l, o, u, 0, 1: nothing that is misread from a console. 20 of 30 letters hold 98 bits.
    private const string OneTimeLetters = "abcdefghjkmnpqrstvwxyz23456789";
    private const long RosterLock = 0x5245_534C_5045_4F; // "RESLPEO"

    /// <summary>A password for one time, from the system's random numbers.</summary>
    public static string OneTimePassword()
        => string.Join('-', Enumerable.Range(0, 4).Select(_ => RandomNumberGenerator.GetString(OneTimeLetters, 5)));

    /// <summary>Acts that make or change accounts take turns, so that the last manager is never removed by two of them together.</summary>
    public static Task TakeTurnAsync(Act act, CancellationToken cancellationToken)
        => act.Db.Database.ExecuteSqlAsync($"select pg_advisory_xact_lock({RosterLock})", cancellationToken);

    /// <summary>Makes an account and saves it into the act.</summary>
    /// <param name="act">The act.</param>
    /// <param name="email">E-mail, by which the person signs in.</param>
    /// <param name="name">The printed name.</param>
    /// <param name="password">Password, or a one-time password.</param>
    /// <param name="mustChange">Whether it must be changed at the first sign-in.</param>
    /// <param name="roles">The roles granted.</param>
    /// <param name="cancellationToken">Stops.</param>
    /// <exception cref="RefusedException">The e-mail is taken, or the password cannot stand.</exception>
    public async Task<Person> CreateAsync(
        Act act, string email, string name, string password, bool mustChange, IReadOnlyCollection<string> roles, CancellationToken cancellationToken)
    {
        Require(password, email, name, "password");
        await TakeTurnAsync(act, cancellationToken);
        var normalized = Normalized(email);
        if (await act.Db.Users.AnyAsync(p => p.NormalizedUserName == normalized, cancellationToken))
            throw new RefusedException(new EmailTaken());

        var person = new Person
        {
            Id = act.NewId(),
            DisplayName = name,
            Email = email,
            NormalizedEmail = normalized,
            UserName = email,
            NormalizedUserName = normalized,
            EmailConfirmed = true,
            LockoutEnabled = true,
            MustChangePassword = mustChange,
            CreatedAt = act.At,
        };
        SetPassword(person, password, mustChange);
        act.Db.Users.Add(person);
        await GrantAsync(act.Db, person.Id, roles, cancellationToken);
        act.Record(
            "person.created",
            new JsonObject { ["personId"] = person.Id.ToString(), ["email"] = email },
            new JsonObject { ["name"] = name, ["roles"] = Words(roles), ["oneTimePassword"] = mustChange });
        await act.Db.SaveChangesAsync(cancellationToken);
        return person;
    }

    /// <summary>Sets a password and ends every session that was opened with the old one.</summary>
    public void SetPassword(Person person, string password, bool mustChange)
    {
        person.PasswordHash = hasher.HashPassword(person, password);
        person.MustChangePassword = mustChange;
        EndSessions(person);
    }

    /// <summary>Ends every session of a person, within the interval at which sessions ask for the stamp.</summary>
    public static void EndSessions(Person person)
    {
        person.SecurityStamp = RandomNumberGenerator.GetHexString(32);
        person.ConcurrencyStamp = RandomNumberGenerator.GetHexString(32);
    }

    /// <summary>Refuses a password that cannot stand.</summary>
    /// <exception cref="RefusedException">422 with the field named.</exception>
    public void Require(string? password, string email, string name, string field)
    {
        if (rules.Against(password, email, name) is { } sentence)
            throw new RefusedException(new FieldRefused(field, sentence));
    }

    /// <summary>The form in which e-mails are compared.</summary>
    public string Normalized(string email) => normalizer.NormalizeName(email)!;

    /// <summary>Refuses where nobody would be left who manages people and can sign in.</summary>
    /// <exception cref="RefusedException">409.</exception>
    public static async Task RequireManagerAsync(ResponseLedgerContext db, CancellationToken cancellationToken)
    {
        var left = await (
            from granted in db.UserRoles
            join role in db.Roles on granted.RoleId equals role.Id
            join person in db.Users on granted.UserId equals person.Id
            where role.Name == Roles.Manager && (person.LockoutEnd == null || person.LockoutEnd < Disabled)
            select granted.UserId).AnyAsync(cancellationToken);
        if (!left)
            throw new RefusedException(new LastManager());
    }

    /// <summary>Grants roles to a person who has none of them yet; the act saves them.</summary>
    public static async Task GrantAsync(ResponseLedgerContext db, Guid personId, IReadOnlyCollection<string> roles, CancellationToken cancellationToken)
    {
        var ids = await db.Roles.Where(role => roles.Contains(role.Name)).Select(role => role.Id).ToListAsync(cancellationToken);
        db.UserRoles.AddRange(ids.Select(id => new IdentityUserRole<Guid> { UserId = personId, RoleId = id }));
    }

    /// <summary>Words as a JSON array in the order of bytes.</summary>
    public static JsonArray Words(IEnumerable<string> words) => [.. words.Order(StringComparer.Ordinal).Select(word => JsonValue.Create(word))];
}

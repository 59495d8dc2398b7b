using System.Security.Claims;
using System.Text.Json;
using Microsoft.EntityFrameworkCore;
using ResponseLedger.Ledger;
using ResponseLedger.Server.People;
using ResponseLedger.Server.Start;
using ResponseLedger.Store;
using ResponseLedger.Store.Acts;

namespace ResponseLedger.Server.Demo;

/// <summary>
/// The people of the demo lab: one a role, at example.test, with passwords made at random for this store. The passwords stand
/// in a file of the data folder that only the server's user reads, so that each start can print them again.
/// </summary>
internal sealed class DemoPeople(IDbContextFactory<ResponseLedgerContext> contexts, ActRunner acts, Accounts accounts, StartSettings settings)
{
    private const string PasswordFile = "demo-passwords.json";

    /// <summary>E-mail of the demo person with a role.</summary>
    public static string EmailOf(string role) => $"{role}@example.test";

    /// <summary>Makes those who are missing, leaves existing addresses alone, and gives the passwords that are known.</summary>
    public async Task<IReadOnlyDictionary<string, string>> EnsureAsync(CancellationToken cancellationToken)
    {
        var passwords = await ReadAsync(cancellationToken);
        await using var db = await contexts.CreateDbContextAsync(cancellationToken);
        var present = await db.Users.Select(person => person.Email!).ToHashSetAsync(StringComparer.OrdinalIgnoreCase, cancellationToken);
        var missing = Roles.All.Where(role => !present.Contains(EmailOf(role))).ToList();
        if (missing.Count > 0)
        {
            foreach (var role in missing)
                passwords[EmailOf(role)] = Accounts.OneTimePassword();

            // Written before the accounts are made: a password that stands in the file without its account does no harm.
            await WriteAsync(passwords, cancellationToken);
            await acts.RunAsync(
                Actor.Server,
                async (act, token) =>
                {
                    foreach (var role in missing)
                        await accounts.CreateAsync(act, EmailOf(role), $"Demo {role}", passwords[EmailOf(role)], mustChange: false, [role], token);
                    return missing.Count;
                },
                cancellationToken);
        }

        return passwords;
    }

    /// <summary>The demo person with a role, as a request of theirs would carry it.</summary>
    public async Task<ClaimsPrincipal> PrincipalAsync(string role, CancellationToken cancellationToken)
    {
        await using var db = await contexts.CreateDbContextAsync(cancellationToken);
        var email = EmailOf(role);
        var person = await db.Users.AsNoTracking().SingleAsync(p => p.Email == email, cancellationToken);
        return new ClaimsPrincipal(new ClaimsIdentity(
            [
                new Claim(ClaimTypes.NameIdentifier, person.Id.ToString()),
                new Claim(ClaimTypes.Name, person.DisplayName),
                new Claim(ClaimTypes.Email, email),
                new Claim(ClaimTypes.Role, role),
            ],
            "demo"));
    }

    private string PasswordPath => Path.Combine(settings.DataFolder, PasswordFile);

    private async Task<Dictionary<string, string>> ReadAsync(CancellationToken cancellationToken)
        => File.Exists(PasswordPath)
            ? JsonSerializer.Deserialize<Dictionary<string, string>>(await File.ReadAllTextAsync(PasswordPath, cancellationToken)) ?? []
            : [];

    private async Task WriteAsync(Dictionary<string, string> passwords, CancellationToken cancellationToken)
    {
        Directory.CreateDirectory(settings.DataFolder);
        var options = new FileStreamOptions { Mode = FileMode.Create, Access = FileAccess.Write };
        if (!OperatingSystem.IsWindows())
            options.UnixCreateMode = UnixFileMode.UserRead | UnixFileMode.UserWrite;
        await using var file = new FileStream(PasswordPath, options);
        await JsonSerializer.SerializeAsync(file, passwords, cancellationToken: cancellationToken);
    }
}

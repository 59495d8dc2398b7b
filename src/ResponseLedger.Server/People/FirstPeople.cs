using Microsoft.EntityFrameworkCore;
using ResponseLedger.Ledger;
using ResponseLedger.Server.Http;
using ResponseLedger.Server.Start;
using ResponseLedger.Store;
using ResponseLedger.Store.Acts;

namespace ResponseLedger.Server.People;

/// <summary>Makes the roles, and the first manager where there are no people.</summary>
internal sealed class FirstPeople(IDbContextFactory<ResponseLedgerContext> contexts, ActRunner acts, Accounts accounts, TimeProvider time)
{
    private const string ManagerName = "Lab manager";

    /// <summary>Does so; does nothing in a store that has people.</summary>
    /// <exception cref="StartFailure">The password that was set for the manager cannot stand.</exception>
    public async Task EnsureAsync(StartSettings settings, CancellationToken cancellationToken)
    {
        await using var db = await contexts.CreateDbContextAsync(cancellationToken);
        foreach (var role in Roles.All)
        {
            await db.Database.ExecuteSqlAsync(
                $"""
                 insert into role (id, name, normalized_name) values ({Guid.CreateVersion7(time.GetUtcNow())}, {role}, {role.ToUpperInvariant()})
                 on conflict do nothing
                 """,
                cancellationToken);
        }

        // The demo lab brings a manager of its own; one set from outside comes first all the same.
        if (await db.Users.AnyAsync(cancellationToken) || (settings.Demo && settings.AdminPassword is null))
            return;

        var oneTime = settings.AdminPassword is null ? Accounts.OneTimePassword() : null;
        try
        {
            await acts.RunAsync(
                Actor.Server,
                (act, ct) => accounts.CreateAsync(act, settings.AdminEmail, ManagerName, oneTime ?? settings.AdminPassword!, oneTime is not null, [Roles.Manager], ct),
                cancellationToken);
        }
        catch (RefusedException refused) when (refused.Refusal is EmailTaken)
        {
            // Another node of the same store was quicker.
            return;
        }
        catch (RefusedException refused)
        {
            throw new StartFailure($"RESPONSELEDGER_ADMIN_PASSWORD cannot stand: {refused.Message}", refused);
        }

        if (oneTime is not null)
        {
            // To the console, once, and not through the log, which others may read and which is kept.
            await Console.Out.WriteLineAsync($"First manager: {settings.AdminEmail}   one-time password: {oneTime}   (to be changed at the first sign-in)");
        }
    }
}

using Microsoft.AspNetCore.Identity;
using Microsoft.EntityFrameworkCore;
using ResponseLedger.Store;
using ResponseLedger.Store.Model;

namespace ResponseLedger.Server.People;

/// <summary>How a password was found.</summary>
internal enum PasswordFinding
{
    /// <summary>It is the account's.</summary>
    Right,

    /// <summary>It is not, or there is no such account.</summary>
    Wrong,

    /// <summary>The account takes none for now, right or wrong.</summary>
    Locked,
}

/// <summary>
/// The one place that compares passwords and counts failures. It takes the same time whether or not the account exists, and
/// checks of one account go one after the other, so that guesses sent all at once are counted before the next one is tried.
/// </summary>
internal sealed class PasswordCheck(
    IDbContextFactory<ResponseLedgerContext> contexts,
    IPasswordHasher<Person> hasher,
    TimeProvider time,
    ILogger<PasswordCheck> logger) : IDisposable
{
    /// <summary>Wrong passwords in a row that lock an account.</summary>
    public const int FailuresToLock = 5;

    /// <summary>How long it stays locked.</summary>
    public static readonly TimeSpan LockLength = TimeSpan.FromMinutes(5);

    private static readonly Person Nobody = new() { DisplayName = "nobody" };

    private readonly string nobodysHash = hasher.HashPassword(Nobody, Guid.CreateVersion7(time.GetUtcNow()).ToString());
    private readonly SemaphoreSlim[] turns = [.. Enumerable.Range(0, 64).Select(_ => new SemaphoreSlim(1, 1))];

    /// <summary>Checks a password against the account of a person; null is an account that does not exist.</summary>
    public async Task<PasswordFinding> CheckAsync(Guid? personId, string password, CancellationToken cancellationToken)
    {
        var turn = turns[(uint)(personId ?? Guid.Empty).GetHashCode() % (uint)turns.Length];
        await turn.WaitAsync(cancellationToken);
        try
        {
            await using var db = await contexts.CreateDbContextAsync(cancellationToken);
            var id = personId ?? Guid.Empty;
            var person = await db.Users.AsNoTracking().SingleOrDefaultAsync(p => p.Id == id, cancellationToken);
            var locked = person?.LockoutEnd is { } until && until > time.GetUtcNow();
            var right = hasher.VerifyHashedPassword(person ?? Nobody, person?.PasswordHash ?? nobodysHash, password) != PasswordVerificationResult.Failed
                && person?.PasswordHash is not null;
            if (locked)
                return PasswordFinding.Locked;

            // Somebody who gives up waiting must not get a guess for nothing.
            if (right)
                await ForgetFailuresAsync(db, person!, CancellationToken.None);
            else
                await CountFailureAsync(db, id, CancellationToken.None);
            return right ? PasswordFinding.Right : PasswordFinding.Wrong;
        }
        finally
        {
            turn.Release();
        }
    }

    public void Dispose()
    {
        foreach (var turn in turns)
            turn.Dispose();
    }

    private async Task CountFailureAsync(ResponseLedgerContext db, Guid id, CancellationToken cancellationToken)
    {
        DateTimeOffset? lockedUntil = time.GetUtcNow() + LockLength;
        await db.Users.Where(p => p.Id == id).ExecuteUpdateAsync(
            set => set
                .SetProperty(p => p.LockoutEnd, p => p.AccessFailedCount + 1 >= FailuresToLock ? lockedUntil : p.LockoutEnd)
                .SetProperty(p => p.AccessFailedCount, p => p.AccessFailedCount + 1 >= FailuresToLock ? 0 : p.AccessFailedCount + 1),
            cancellationToken);
        if (id != Guid.Empty)
            logger.LogWarning("A wrong password was given for person {PersonId}.", id);
    }

    private static async Task ForgetFailuresAsync(ResponseLedgerContext db, Person person, CancellationToken cancellationToken)
    {
        if (person.AccessFailedCount > 0 || person.LockoutEnd is not null)
        {
            await db.Users.Where(p => p.Id == person.Id).ExecuteUpdateAsync(
                set => set.SetProperty(p => p.AccessFailedCount, 0).SetProperty(p => p.LockoutEnd, (DateTimeOffset?)null),
                cancellationToken);
        }
    }
}

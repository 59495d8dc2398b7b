using Microsoft.AspNetCore.Identity;

namespace ResponseLedger.Store.Model;

/// <summary>Somebody who signs in. Accounts change (passwords, lockout), so they are no facts; what people did is in the ledger.</summary>
public sealed class Person : IdentityUser<Guid>
{
    /// <summary>The printed name that stands beside a signature.</summary>
    public required string DisplayName { get; set; }

    /// <summary>Whether the next sign-in must be followed by a change of password.</summary>
    public bool MustChangePassword { get; set; }

    /// <summary>When the account was made, UTC.</summary>
    public DateTimeOffset CreatedAt { get; init; }
}

using System.Security.Claims;
using Microsoft.EntityFrameworkCore;
using ResponseLedger.Server.People;
using ResponseLedger.Server.SignOff;
using ResponseLedger.Store;
using ResponseLedger.Store.Acts;
using ResponseLedger.Store.Judging;
using ResponseLedger.Store.Queries;

namespace ResponseLedger.Server.Demo;

/// <summary>Signs the lots of the demo lab that are signed, as its quality engineer does: with the password, on what the lot holds.</summary>
internal sealed class DemoSigning(
    IDbContextFactory<ResponseLedgerContext> contexts, ActRunner acts, PasswordAsked password, JudgingMaterial material)
{
    /// <summary>Ends a lot as planned; a lot that is decided already is left as it is.</summary>
    public async Task EndAsync(Guid lotId, DemoLot lot, ClaimsPrincipal signer, string? signersPassword, CancellationToken cancellationToken)
    {
        await using var db = await contexts.CreateDbContextAsync(cancellationToken);
        if (signersPassword is null || await db.Decisions.AnyAsync(decision => decision.LotId == lotId, cancellationToken))
            return;

        var concession = lot.Ending == DemoEnding.ApprovedWithConcession;
        if (concession)
        {
            var standing = await LotStanding.ReadAsync(db, lotId, cancellationToken);
            foreach (var unit in standing.Units.Where(unit => !unit.Passes))
            {
                await DispositionUnit.HandleAsync(
                    lotId, unit.UnitId,
                    new NewDisposition("concession", "Early roll-off above 40 kHz; the customer's band ends at 20 kHz and accepts it"),
                    signer, acts, cancellationToken);
            }
        }

        await DecideLot.HandleAsync(
            lotId,
            concession
                ? new NewDecision("approveWithConcession", "One unit rolls off early and is accepted for a band of 20 kHz", signersPassword)
                : new NewDecision("approve", "Every unit passes in its first run", signersPassword),
            signer, acts, password, material, db, cancellationToken);
    }
}

using System.Text.Json;
using ResponseLedger.Records.Decisions;
using ResponseLedger.Server.Lots;
using ResponseLedger.Store.Model;

namespace ResponseLedger.Server.SignOff;

/// <summary>A signed decision.</summary>
/// <param name="Id">The decision.</param>
/// <param name="LotId">The lot.</param>
/// <param name="Decision">approve, approveWithConcession or reject.</param>
/// <param name="Ordinal">1 for the lot's first decision, 2 for the one after a reopening, and so on.</param>
/// <param name="Reason">The signer's reason; may be empty for a plain approval.</param>
/// <param name="SignedBy">Who signed.</param>
/// <param name="Meaning">What the signature means.</param>
/// <param name="SignedAt">When.</param>
/// <param name="Sha256">SHA-256 of the record's bytes, which <c>/api/decisions/{id}/record</c> gives exactly.</param>
/// <param name="Reopening">The reopening that undid it, or null while it is in force.</param>
/// <param name="Record">What the bytes say; left out of lists.</param>
internal sealed record DecisionView(
    Guid Id,
    Guid LotId,
    string Decision,
    int Ordinal,
    string Reason,
    SignerView SignedBy,
    string Meaning,
    DateTimeOffset SignedAt,
    string Sha256,
    ReopeningView? Reopening,
    JsonElement? Record)
{
    /// <summary>Everything shown is read out of the bytes that were signed.</summary>
    /// <exception cref="InvalidDataException">The stored record cannot be read: the store was changed behind the server's back.</exception>
    public static DecisionView Of(Decision decision, Reopening? undone, string? undoneBy, bool withRecord)
    {
        if (!DecisionDocument.TryParse(decision.Record, out var document, out var problems))
            throw new InvalidDataException($"The record of decision {decision.Id} cannot be read: {problems[0].Sentence}");

        var record = document.Record;
        return new DecisionView(
            decision.Id,
            decision.LotId,
            DecisionWords.Format(record.Decision),
            record.Lot.DecisionOrdinal,
            record.Reason,
            new SignerView(record.Signer.PersonId, record.Signer.Name, record.Signer.Email),
            record.Meaning,
            record.SignedAt,
            Convert.ToHexStringLower(document.Sha256.Span),
            undone is null ? null : new ReopeningView(undone.DecisionId, undone.LotId, undone.DecisionId, undone.Reason, undone.At, undone.ById, undoneBy),
            withRecord ? JsonElement.Parse(decision.Record) : null);
    }
}

/// <summary>The reopening of a decided lot.</summary>
/// <param name="Id">The decision that it undoes; there is one reopening of a decision at most.</param>
/// <param name="LotId">The lot.</param>
/// <param name="DecisionId">The same decision.</param>
/// <param name="Reason">Why.</param>
/// <param name="At">When.</param>
/// <param name="ById">Who.</param>
/// <param name="By">Their name.</param>
internal sealed record ReopeningView(Guid Id, Guid LotId, Guid DecisionId, string Reason, DateTimeOffset At, Guid ById, string? By);

/// <summary>A disposition of a unit.</summary>
/// <param name="Id">The disposition.</param>
/// <param name="LotId">The lot.</param>
/// <param name="UnitId">The unit.</param>
/// <param name="Disposition">rework, scrap, return or concession.</param>
/// <param name="Reason">Why.</param>
/// <param name="Number">The highest is in force.</param>
/// <param name="At">When.</param>
/// <param name="ById">Who.</param>
internal sealed record NewDispositionView(Guid Id, Guid LotId, Guid UnitId, string Disposition, string Reason, int Number, DateTimeOffset At, Guid ById);

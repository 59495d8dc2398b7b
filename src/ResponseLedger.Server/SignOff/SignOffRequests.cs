using FluentValidation;
using ResponseLedger.Records.Decisions;
using ResponseLedger.Server.Devices;

namespace ResponseLedger.Server.SignOff;

/// <summary>A decision on a lot, to be signed.</summary>
/// <param name="Decision">approve, approveWithConcession or reject.</param>
/// <param name="Reason">Needed for a rejection and for a concession; at most 1,000 characters.</param>
/// <param name="Password">The signer's password, given again.</param>
/// <param name="Seen">The digest of what the signer was shown (<c>GET /api/lots/{id}/signing</c>); left out, nothing is compared.</param>
internal sealed record NewDecision(string? Decision, string? Reason, string? Password, string? Seen = null);

/// <summary>What becomes of a unit that does not pass.</summary>
/// <param name="Disposition">rework, scrap, return or concession.</param>
/// <param name="Reason">Why; 1 to 1,000 characters.</param>
internal sealed record NewDisposition(string? Disposition, string? Reason);

/// <summary>A decided lot to be opened again, signed like a decision.</summary>
/// <param name="Reason">Why; 1 to 1,000 characters.</param>
/// <param name="Password">The signer's password, given again.</param>
internal sealed record NewReopening(string? Reason, string? Password);

internal sealed class NewDecisionValidator : AbstractValidator<NewDecision>
{
    public NewDecisionValidator()
    {
        RuleFor(d => d.Decision).Must(word => DecisionWords.TryParse(word, out _)).WithMessage("The decision is approve, approveWithConcession or reject.");
        RuleFor(d => d.Reason).IsReason().When(d => !string.IsNullOrWhiteSpace(d.Reason) || d.Decision != DecisionWords.Format(DecisionWord.Approve));
        RuleFor(d => d.Password).NotEmpty().WithMessage("Give your password again: it signs.");
    }
}

internal sealed class NewDispositionValidator : AbstractValidator<NewDisposition>
{
    public NewDispositionValidator()
    {
        RuleFor(d => d.Disposition).Must(word => word is "rework" or "scrap" or "return" or "concession").WithMessage("The disposition is rework, scrap, return or concession.");
        RuleFor(d => d.Reason).IsReason();
    }
}

internal sealed class NewReopeningValidator : AbstractValidator<NewReopening>
{
    public NewReopeningValidator()
    {
        RuleFor(r => r.Reason).IsReason();
        RuleFor(r => r.Password).NotEmpty().WithMessage("Give your password again: it signs.");
    }
}

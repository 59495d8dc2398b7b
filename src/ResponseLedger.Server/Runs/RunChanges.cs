using FluentValidation;
using ResponseLedger.Server.Devices;
using ResponseLedger.Server.Runs.Upload;

namespace ResponseLedger.Server.Runs;

/// <summary>An engineer's finding that a run does not count.</summary>
/// <param name="Cause">The assignable cause (ISO/IEC 17025:2017, 7.10), in a few words.</param>
/// <param name="Reason">How it was found and why it concerns this run.</param>
internal sealed record InvalidationAsked(string? Cause, string? Reason);

internal sealed class InvalidationAskedValidator : AbstractValidator<InvalidationAsked>
{
    private const int LongestCause = 200;

    public InvalidationAskedValidator()
    {
        RuleFor(i => i.Cause).IsName(LongestCause);
        RuleFor(i => i.Reason).IsReason();
    }
}

/// <summary>Where a run belongs in truth; what is left out stays.</summary>
/// <param name="Serial">The unit's serial number; a new one makes the unit.</param>
/// <param name="Lot">Id or number of a lot of the same device.</param>
/// <param name="Condition">Id or name of a condition of the device.</param>
/// <param name="Reason">What was wrong.</param>
internal sealed record ReassignmentAsked(string? Serial, string? Lot, string? Condition, string? Reason);

internal sealed class ReassignmentAskedValidator : AbstractValidator<ReassignmentAsked>
{
    public ReassignmentAskedValidator()
    {
        RuleFor(r => r.Serial).IsName().Must(s => s is null || SerialNumber.IsSound(s)).WithMessage(SerialNumber.Rule).When(r => r.Serial is not null);
        RuleFor(r => r.Lot).IsName().When(r => r.Lot is not null);
        RuleFor(r => r.Condition).IsName().When(r => r.Condition is not null);
        RuleFor(r => r.Reason).IsReason();
        RuleFor(r => r.Serial)
            .Must((asked, serial) => serial is not null || asked.Lot is not null || asked.Condition is not null)
            .WithMessage("Say what was wrong: serial, lot or condition.");
    }
}

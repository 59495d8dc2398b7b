using FluentValidation;
using ResponseLedger.Records;

namespace ResponseLedger.Server.Devices;

/// <summary>Rules for texts that people type, in one wording.</summary>
internal static class TypedText
{
    /// <summary>Longest name, part number, revision or title, after trimming.</summary>
    public const int LongestName = 100;

    /// <summary>Longest reason, after trimming.</summary>
    public const int LongestReason = 1_000;

    /// <summary>There, not blank, not longer than said, and one plain line.</summary>
    public static IRuleBuilderOptions<T, string?> IsName<T>(this IRuleBuilder<T, string?> rule, int longest = LongestName)
        => rule
            .Must(text => !string.IsNullOrWhiteSpace(text)).WithMessage("This text is needed and must not be blank.")
            .Must(text => text is null || text.Trim().Length <= longest).WithMessage($"At most {longest} characters.")
            .HasNothingAgainst(text => TextRules.AgainstName(text.Trim()));

    /// <summary>A reason: there, not blank, not longer than said; line breaks may stand in it.</summary>
    public static IRuleBuilderOptions<T, string?> IsReason<T>(this IRuleBuilder<T, string?> rule)
        => rule
            .Must(text => !string.IsNullOrWhiteSpace(text)).WithMessage("A reason is needed: it stays in the record.")
            .Must(text => text is null || text.Trim().Length <= LongestReason).WithMessage($"At most {LongestReason} characters.")
            .HasNothingAgainst(TextRules.AgainstProse);

    private static IRuleBuilderOptions<T, string?> HasNothingAgainst<T>(this IRuleBuilder<T, string?> rule, Func<string, string?> against)
        => rule.Must(text => text is null || against(text) is null).WithMessage((_, text) => against(text!)!);
}

internal sealed class NewDeviceValidator : AbstractValidator<NewDevice>
{
    private const int LongestUnit = 20;

    public NewDeviceValidator()
    {
        RuleFor(d => d.PartNumber).IsName()
            .Must(text => text is null || !text.Contains('/')).WithMessage("A slash cannot stand in a part number, because PART/REV names a device.");
        RuleFor(d => d.Revision).IsName();
        RuleFor(d => d.Title).IsName();
        RuleFor(d => d.Kind).Must(kind => kind is DeviceKinds.Transfer or DeviceKinds.Loop).WithMessage("The kind is \"transfer\" or \"loop\".");
        RuleFor(d => d.GainUnit).IsName(LongestUnit).When(d => d.GainUnit is not null);
        RuleFor(d => d.CriticalPhaseDeg)
            .Must(phase => phase is null or -180 or 0).WithMessage("The critical phase is -180 or 0 degrees.")
            .Must((device, phase) => phase is null || device.Kind == DeviceKinds.Loop).WithMessage("Only a loop has a critical phase; leave it out.");
    }
}

internal sealed class DeviceChangeValidator : AbstractValidator<DeviceChange>
{
    private const int MostRetests = 100;

    public DeviceChangeValidator()
    {
        RuleFor(c => c.Title).IsName().When(c => c.Title is not null);
        RuleFor(c => c.SigningNeedsTwo).Must(two => two is not true)
            .WithMessage("This version takes one signature a lot; it cannot ask for two signers yet, so it does not promise to.");
        RuleFor(c => c.DecisionRule).Must(rule => rule is null or DeviceKinds.SimpleRule)
            .WithMessage("This version offers the decision rule \"simple\" only: guarded acceptance and the four outcomes are not offered yet.");
        RuleFor(c => c.RetestsAllowed).Must(n => n.Value is null or (>= 0 and <= MostRetests))
            .WithMessage($"The number of retests is 0 to {MostRetests}, or null for any number.");
    }
}

internal sealed class NewConditionValidator : AbstractValidator<NewCondition>
{
    public NewConditionValidator() => RuleFor(c => c.Name).IsName();
}

internal sealed class NewGoldenValidator : AbstractValidator<NewGolden>
{
    public NewGoldenValidator()
    {
        RuleFor(g => g.RunId).NotNull().WithMessage("The id of a run is needed.");
        RuleFor(g => g.Reason).IsReason();
    }
}

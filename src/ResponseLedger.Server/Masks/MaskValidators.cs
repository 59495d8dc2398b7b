using FluentValidation;
using ResponseLedger.Server.Devices;

namespace ResponseLedger.Server.Masks;

internal sealed class MaskContentValidator : AbstractValidator<MaskContent>
{
    public MaskContentValidator()
    {
        RuleFor(m => m).Custom((mask, context) =>
        {
            mask.Read(out var problems);
            foreach (var problem in problems)
                context.AddFailure(problem.Path, problem.Sentence);
        });
        RuleFor(m => m.Condition).IsName().When(m => m.Condition is not null);
    }
}

internal sealed class NewMaskValidator : AbstractValidator<NewMask>
{
    public NewMaskValidator()
    {
        When(m => m.From is null, () => Include(new MaskContentValidator()));
        When(m => m.From is not null, () =>
        {
            RuleFor(m => m.Title).IsName(LongestTitle).When(m => m.Title is not null);
            RuleFor(m => m.Condition).IsName().When(m => m.Condition is not null);
            RuleFor(m => m.Limits).Null().WithMessage("A copy takes its limits from the mask that it is made from; leave this out.");
            RuleFor(m => m.Requirements).Null().WithMessage("A copy takes its requirements from the mask that it is made from; leave this out.");
            RuleFor(m => m.Others).Custom((others, context) =>
            {
                foreach (var name in others?.Keys ?? [])
                    context.AddFailure(name, "This member is not known here.");
            });
        });
    }

    private const int LongestTitle = 200;
}

internal sealed class MaskReleaseValidator : AbstractValidator<MaskRelease>
{
    public MaskReleaseValidator() => RuleFor(r => r.Reason).IsReason();
}

using System.Text.RegularExpressions;
using FluentValidation;
using ResponseLedger.Records;
using ResponseLedger.Server.Devices;

namespace ResponseLedger.Server.Benches;

internal sealed class NewBenchValidator : AbstractValidator<NewBench>
{
    public NewBenchValidator() => RuleFor(b => b.Name).IsName();
}

internal sealed class BenchChangeValidator : AbstractValidator<BenchChange>
{
    private const int LongestPattern = 200;
    private const int LongestRemark = 2_000;
    private const double LowestFloorDb = -400;
    private const double HighestFloorDb = 200;
    private static readonly TimeSpan LongestMatch = TimeSpan.FromMilliseconds(100);

    public BenchChangeValidator()
    {
        RuleFor(c => c.SerialPattern).Custom((pattern, context) =>
        {
            if (pattern.Value is { } text && Complaint(text) is { } complaint)
                context.AddFailure(complaint);
        });
        RuleFor(c => c.NoiseFloorDb).Must(floor => floor.Value is null or (>= LowestFloorDb and <= HighestFloorDb))
            .WithMessage($"A noise floor lies between {LowestFloorDb} and {HighestFloorDb} dB; null where none is stated.");
        RuleFor(c => c.Remark).Must(remark => remark.Value is null || remark.Value.Length <= LongestRemark)
            .WithMessage($"At most {LongestRemark} characters.");
        RuleFor(c => c.Remark).Must(remark => remark.Value is null || TextRules.AgainstProse(remark.Value) is null)
            .WithMessage((_, remark) => TextRules.AgainstProse(remark.Value!)!);
    }

    private static string? Complaint(string pattern)
    {
        if (string.IsNullOrWhiteSpace(pattern))
            return "A pattern must not be blank; null goes back to the usual rule: the part before the first underscore.";
        if (pattern.Length > LongestPattern)
            return $"At most {LongestPattern} characters.";
        if (TextRules.AgainstName(pattern) is { } problem)
            return problem;
        try
        {
            var regex = new Regex(pattern, RegexOptions.CultureInvariant, LongestMatch);
            return regex.IsMatch(string.Empty)
                ? "This pattern is content with an empty name, so it would find empty serials; ask for at least one character, such as [A-Z0-9]+."
                : null;
        }
        catch (ArgumentException exception)
        {
            return $"This is no regular expression: {exception.Message}";
        }
    }
}

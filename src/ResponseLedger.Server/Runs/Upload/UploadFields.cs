using System.Globalization;
using FluentValidation;
using ResponseLedger.Formats;
using ResponseLedger.Ledger;
using ResponseLedger.Server.Devices;
using ResponseLedger.Store.Intake;

namespace ResponseLedger.Server.Runs.Upload;

/// <summary>The fields of an upload as they were written; null where left out or empty.</summary>
internal sealed record UploadFields(
    string? Device, string? Lot, string? Bench, string? Serial, string? Purpose, string? Condition, string? MeasuredAt,
    string? Columns, string? Circumstances, string? Acknowledge)
{
    private static readonly string[] TimePatterns =
        ["yyyy-MM-dd'T'HH:mm:ssK", "yyyy-MM-dd'T'HH:mm:ss.FFFFFFFK", "yyyy-MM-dd'T'HH:mmK", "yyyy-MM-dd HH:mm:ssK", "yyyy-MM-dd"];

    public static IReadOnlyList<string> Names { get; } =
        ["device", "lot", "bench", "serial", "purpose", "condition", "measuredAt", "columns", "circumstances", "acknowledge"];

    public static UploadFields Of(IReadOnlyDictionary<string, string> fields)
    {
        string? Get(string name) => fields.GetValueOrDefault(name) is { Length: > 0 } value ? value : null;
        return new UploadFields(
            Get("device"), Get("lot"), Get("bench"), Get("serial"), Get("purpose"), Get("condition"), Get("measuredAt"),
            Get("columns"), Get("circumstances"), Get("acknowledge"));
    }

    /// <summary>What the run is for; production unless said otherwise.</summary>
    public string PurposeWord => Purpose ?? RunPurposes.Production;

    /// <summary>The time of measuring; null for the time of receipt. A time without an offset is UTC.</summary>
    public DateTimeOffset? MeasuredAtTime => TryTime(MeasuredAt, out var time) ? time : null;

    /// <summary>The columns chosen.</summary>
    public ColumnChoices? ColumnChoices => Columns is not null && Formats.ColumnChoices.TryParse(Columns, out var choices, out _) ? choices : null;

    /// <summary>The circumstances as they are kept.</summary>
    public string? KeptCircumstances => Circumstances is null ? null : RunCircumstances.Kept(Circumstances);

    public static bool TryTime(string? text, out DateTimeOffset time)
    {
        var known = DateTimeOffset.TryParseExact(
            text, TimePatterns, CultureInfo.InvariantCulture, DateTimeStyles.AssumeUniversal | DateTimeStyles.AdjustToUniversal, out time);
        time = Microseconds.Cut(time);
        return known;
    }
}

/// <summary>Judges the fields before anything is looked up.</summary>
internal sealed class UploadFieldsValidator : AbstractValidator<UploadFields>
{
    // Part number and revision with a stroke between.
    private const int LongestName = 2 * TypedText.LongestName + 1;

    public UploadFieldsValidator()
    {
        RuleFor(f => f.Device).IsName(LongestName).When(f => f.Device is not null);
        RuleFor(f => f.Lot).IsName().When(f => f.Lot is not null);
        RuleFor(f => f.Bench).IsName().When(f => f.Bench is not null);
        RuleFor(f => f.Condition).IsName().When(f => f.Condition is not null);
        RuleFor(f => f.Purpose)
            .Must(p => p is null || RunPurposes.All.Contains(p))
            .WithMessage($"The purpose is one of {string.Join(", ", RunPurposes.All)}.");
        RuleFor(f => f.Serial).Must(s => s is null || SerialNumber.IsSound(s)).WithMessage(SerialNumber.Rule);
        RuleFor(f => f.MeasuredAt)
            .Must(t => t is null || UploadFields.TryTime(t, out _))
            .WithMessage("The time of measuring is written as RFC 3339, such as 2026-03-01T09:30:00Z.");
        RuleFor(f => f.Acknowledge)
            .Must(a => a is null or IntakeNotes.SameFileOtherUnit)
            .WithMessage($"Only {IntakeNotes.SameFileOtherUnit} can be acknowledged.");
        RuleFor(f => f.Columns).Custom((text, context) =>
        {
            if (text is not null && !Formats.ColumnChoices.TryParse(text, out _, out var problem))
                context.AddFailure("columns", problem!);
        });
        RuleFor(f => f.Circumstances).Custom((text, context) =>
        {
            if (text is not null && RunCircumstances.ProblemOf(text) is { } problem)
                context.AddFailure("circumstances", problem);
        });
    }
}
